import type { Interval } from '../../src/core/interval.ts';
import { median, pointToPointScatter, robustSigma } from '../../src/core/robust-statistics.ts';
import { fitByPieces } from './detrend/fit-by-pieces.ts';
import { fillMedians } from './detrend/running-median.ts';
import { fillSpline } from './detrend/spline.ts';
import { describeFlare, type FlareShape, type FlatSeries, isRecurring } from './flare-shape.ts';

/** Flattening looks at so many days around a point, or at so many cadences where those are longer. */
const SPLINE_DAYS = 0.5;
const LEVEL_DAYS = 0.4;
const LEAST_CADENCES = 15;
/** The noise is that of the whole series or of the points within so many days, whichever is larger. */
const NOISE_DAYS = 3;
const LEAST_NOISE_POINTS = 20;
/** Points in a row this far above the level make a flare, if so many. */
const RISE_SIGMA = 3;
const LEAST_RUN = 3;
/** Longer pauses, in cadences, end a run. */
const LONGEST_PAUSE = 3.5;
/** A level may be lifted so many lengths beyond a flare's last estimate. */
const TAIL_LENGTHS = 3;
const MOST_ROUNDS = 2;
/** A flaring star flares now and then: what takes up more of the time is its common variation. */
const LARGEST_SHARE = 0.15;

export interface FlaresFound {
  /** From the first to the last point left out of each. */
  readonly flares: readonly Interval[];
  /** Length n, 1 at the points of flares and tails. */
  readonly isFlare: Uint8Array;
  readonly warnings: readonly string[];
}

/**
 * Flares by their shape: at least three points in a row over 3 robust sigma of the locally flattened flux, that rise
 * fast, decay slowly (see `describeFlare`), and come neither periodically nor most of the time. Each is left out with
 * its tail. Protected points are never part of one.
 *
 * @param time days, ascending, length n; @param flux relative; @param isProtected 1 at protected points
 * @param splits indices at which a segment of the file begins
 */
export async function findFlares(
  time: Float64Array,
  flux: Float64Array,
  isProtected: Uint8Array,
  splits: readonly number[],
): Promise<FlaresFound> {
  const isFlare = new Uint8Array(time.length);
  let found: FlareShape[] = [];
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    // A long tail lifts the level under it: in later rounds flares have no weight in the level.
    const isOut = isProtected.slice();
    for (const { first, last } of found) isOut.fill(1, first, last + TAIL_LENGTHS * (last - first) + 1);
    const flat = await flatten(time, flux, isOut, splits);
    const next = flat === undefined ? [] : findRuns(flat, isProtected);
    const isSettled = pointsOf(next) <= pointsOf(found);
    if (!isSettled || round === 0) found = next;
    if (isSettled) break;
  }
  const doubt = doubtOf(found, time);
  if (doubt !== undefined) return { flares: [], isFlare, warnings: [doubt] };
  for (const { first, last } of found) for (let i = first; i <= last; i += 1) if (isProtected[i] === 0) isFlare[i] = 1;
  return { flares: found.map(({ first, last }) => ({ start: time[first]!, end: time[last]! })), isFlare, warnings: [] };
}

const pointsOf = (found: readonly FlareShape[]): number =>
  found.reduce((sum, { first, last }) => sum + last - first + 1, 0);

/** The runs of high points that have the shape of a flare. */
function findRuns(flat: FlatSeries, isProtected: Uint8Array): FlareShape[] {
  const found: FlareShape[] = [];
  for (let i = 0; i < flat.time.length; i += 1) {
    const end = endOfRun(flat, i, isProtected);
    if (end - i < LEAST_RUN) continue;
    const flare = describeFlare(flat, i, end);
    if (flare !== undefined) found.push(flare);
    i = Math.max(end, flare?.last ?? end);
  }
  return found;
}

/**
 * Slow slopes are taken off by a spline that leaves outliers aside, then a running median, with the noise around each
 * point. A median alone would lean to one side of a slope next to a dip. Undefined where nothing varies.
 */
async function flatten(
  time: Float64Array,
  flux: Float64Array,
  isOut: Uint8Array,
  splits: readonly number[],
): Promise<FlatSeries | undefined> {
  if (time.length < 3 * LEAST_RUN) return undefined;
  const cadenceDays = median(time.subarray(1).map((value, i) => value - time[i]!));
  const [knotDays, windowDays] = [SPLINE_DAYS, LEVEL_DAYS].map((days) => Math.max(days, LEAST_CADENCES * cadenceDays));
  const input = { time, splits, protectedEvents: [], hasWeight: isOut.map((own) => 1 - own) };
  const slow = await fitByPieces({ ...input, flux }, knotDays!, (piece) => fillSpline(piece, knotDays!));
  const quick = flux.map((value, i) => value - slow![i]!);
  const level = await fitByPieces({ ...input, flux: quick }, windowDays!, (piece) => fillMedians(piece, windowDays!));
  const above = quick.map((value, i) => value - level![i]!);
  const least = Math.max(pointToPointScatter(flux), robustSigma(above));
  if (!(least > 0)) return undefined;
  return { time, flux: quick, above, sigma: noiseAround(time, above, least), cadenceDays, splits: new Set(splits) };
}

/** In blocks: the star's variation is louder at times. */
function noiseAround(time: Float64Array, above: Float64Array, least: number): Float64Array {
  const sigma = new Float64Array(time.length).fill(least);
  for (let first = 0; first < time.length; ) {
    let end = first;
    while (end < time.length && time[end]! - time[first]! <= NOISE_DAYS) end += 1;
    if (end - first >= LEAST_NOISE_POINTS) {
      const own = robustSigma(above.subarray(first, end));
      if (own > least) sigma.fill(own, first, end);
    }
    first = end;
  }
  return sigma;
}

/** One beyond the last of the points from `first` on that stand high in a row. */
function endOfRun(flat: FlatSeries, first: number, isProtected: Uint8Array): number {
  const { time, above, sigma, cadenceDays, splits } = flat;
  let end = first;
  while (end < time.length && above[end]! > RISE_SIGMA * sigma[end]! && isProtected[end] === 0) {
    if (end > first && (splits.has(end) || time[end]! - time[end - 1]! > LONGEST_PAUSE * cadenceDays)) break;
    end += 1;
  }
  return end;
}

/** Why what was found is the star's own variation and no flares, if so. */
function doubtOf(found: readonly FlareShape[], time: Float64Array): string | undefined {
  const points = pointsOf(found);
  if (points > LARGEST_SHARE * time.length)
    return `What looks like ${found.length} flares takes up ${Math.round((100 * points) / time.length)} % of the points: it was taken as the star's variation, and no flare was left out.`;
  if (!isRecurring(found.map(({ peak }) => time[peak]!))) return undefined;
  return `${found.length} peaks shaped like flares come at even intervals: they were taken as the star's variation, and no flare was left out.`;
}
