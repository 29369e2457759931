import { median, medianInPlace, pointToPointScatter } from '../../src/core/robust-statistics.ts';
import { piecesOf } from './detrend/pieces.ts';
import { type Stretch, staysLow } from './drop-shape.ts';
import { createSlidingMedian } from './sliding-median.ts';

/** Levels are medians of so many points; the point right after a fall may be half of it. */
const LEVEL_POINTS = 5;
const REACH = LEVEL_POINTS;
/** A fall of so many times the scatter of a point ... */
const FALL_SIGMA = 5;
/** ... and so many times what 95 % of the series' own changes over as long stay under. */
const TIMES_USUAL = 3;
const USUAL_PART = 0.95;
/** Of the whole fall, so much happens between two neighbours and the point between: an ingress is spread over many. */
const LEAST_SUDDEN = 0.6;
/** The whole fall ends at the lowest level, over so many points, of what is so near. */
const LOWEST_DAYS = 0.1;
const LOWEST_POINTS = 6;
const LOWEST_BLOCK = 11;
/** What follows is looked at over so many days, or five points where those are longer. */
const SMOOTH_DAYS = 0.03;
/** A longer pause, in cadences, is a gap: what happened in it was not seen. */
const LONGEST_PAUSE = 3.5;
/** Changes over a gap's length are looked up at so many places. */
const GAP_SAMPLES = 200;

/**
 * Sudden drops of sensitivity: the flux falls by over 5 sigma between neighbouring points or across a gap, and comes
 * back slowly, over hours to days, or never (see `staysLow`). A dip comes back as suddenly as it went, and is none.
 * Such drops are described for detectors hit by particles (common practice); the thresholds are ours.
 *
 * @param time days, ascending, length n; @param flux relative; @param isProtected 1 where no drop is looked for
 * @param splits indices at which a segment of the file begins
 * @returns indices of the first points after a drop, ascending
 */
export function findDrops(
  time: Float64Array,
  flux: Float64Array,
  isProtected: Uint8Array,
  splits: readonly number[],
): number[] {
  const sigma = pointToPointScatter(flux);
  if (!(sigma > 0)) return [];
  const cadenceDays = median(time.subarray(1).map((value, i) => value - time[i]!));
  return piecesOf(time, splits, Number.POSITIVE_INFINITY).flatMap(({ first, end }) => {
    if (end - first < 2 * REACH + 1) return [];
    const stretch = levelled(time.subarray(first, end), flux.subarray(first, end), cadenceDays, sigma);
    return findInStretch(stretch, isProtected.subarray(first, end)).map((index) => first + index);
  });
}

function levelled(time: Float64Array, flux: Float64Array, cadenceDays: number, sigma: number): Stretch {
  const level = medians(flux, LEVEL_POINTS);
  const smooth = medians(flux, Math.max(LEVEL_POINTS, 2 * Math.floor(SMOOTH_DAYS / cadenceDays / 2) + 1));
  return { time, flux, level, smooth, cadenceDays, sigma };
}

/** Of an odd number of points around each, fewer at the ends. */
function medians(flux: Float64Array, points: number): Float64Array {
  const half = (points - 1) / 2;
  const sliding = createSlidingMedian(flux);
  return flux.map((_, i) => {
    sliding.moveTo(Math.max(0, i - half), Math.min(flux.length, i + half + 1));
    return sliding.median();
  });
}

function findInStretch(stretch: Stretch, isProtected: Uint8Array): number[] {
  const { time, flux, level, sigma } = stretch;
  const falls = new Float64Array(time.length);
  for (let i = REACH; i + REACH < time.length; i += 1) falls[i] = level[i - 3]! - level[i + 3]!;
  const least = Math.max(FALL_SIGMA * sigma, TIMES_USUAL * usualOf(falls.map(Math.abs)));
  const drops: number[] = [];
  for (let i = REACH; i + REACH < time.length; i += 1) {
    if (falls[i]! < least || falls[i]! < falls[i - 1]! || falls[i]! < falls[i + 1]!) continue;
    const index = steepestNear(flux, i);
    const isOwn = isProtected[index] === 0 && isProtected[index - 1] === 0;
    if (!isOwn || index <= (drops.at(-1) ?? 0) + REACH || !isDrop(stretch, index, falls[i]!)) continue;
    drops.push(index);
  }
  return drops;
}

function isDrop(stretch: Stretch, index: number, fall: number): boolean {
  const { time, level, cadenceDays } = stretch;
  const gapDays = time[index]! - time[index - 1]!;
  const isAcrossGap = gapDays > LONGEST_PAUSE * cadenceDays;
  if (isAcrossGap && fall < TIMES_USUAL * usualChange(time, level, gapDays)) return false;
  return isSudden(stretch, index) && staysLow(stretch, index, fall, isAcrossGap);
}

/** The first point after the largest fall between two neighbours. */
function steepestNear(flux: Float64Array, around: number): number {
  let best = around;
  for (let i = around - 3; i <= around + 3; i += 1)
    if (flux[i - 1]! - flux[i]! > flux[best - 1]! - flux[best]!) best = i;
  return best;
}

function isSudden({ time, flux, level }: Stretch, index: number): boolean {
  const before = medianInPlace(flux.slice(Math.max(0, index - 3), index));
  const after = Math.min(medianInPlace(flux.slice(index, index + 3)), medianInPlace(flux.slice(index + 1, index + 4)));
  let end = index + 1;
  while (end < time.length && (end <= index + LOWEST_POINTS || time[end]! - time[index]! <= LOWEST_DAYS)) end += 1;
  const lowest = Math.min(after, lowestBlock(flux, index + 1, end));
  const high = Math.max(before, level[Math.max(0, index - 3)]!);
  return before - after >= LEAST_SUDDEN * (high - lowest);
}

/** The lowest median of the blocks of some points, from one on. */
function lowestBlock(flux: Float64Array, first: number, end: number): number {
  let lowest = Number.POSITIVE_INFINITY;
  for (let i = first; i + LEVEL_POINTS <= end; i += LOWEST_BLOCK)
    lowest = Math.min(lowest, medianInPlace(flux.slice(i, Math.min(end, i + LOWEST_BLOCK))));
  return lowest;
}

function usualOf(values: Float64Array): number {
  const sorted = values.sort();
  return sorted[Math.floor(USUAL_PART * (sorted.length - 1))] ?? 0;
}

/** What most changes of the level over so many days stay under. */
function usualChange(time: Float64Array, level: Float64Array, days: number): number {
  const changes: number[] = [];
  const step = Math.max(1, Math.floor(time.length / GAP_SAMPLES));
  let later = 0;
  for (let i = 0; i < time.length; i += step) {
    while (later < time.length && time[later]! < time[i]! + days) later += 1;
    if (later === time.length) break;
    changes.push(Math.abs(level[later]! - level[i]!));
  }
  return usualOf(Float64Array.from(changes));
}
