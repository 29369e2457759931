import { medianInPlace } from '../../src/core/robust-statistics.ts';

/** A series without what is slow. All arrays of length n. */
export interface FlatSeries {
  /** Days, ascending. */
  readonly time: Float64Array;
  /** Less a spline that does not follow eclipses or flares. */
  readonly flux: Float64Array;
  /** Also less its local median. */
  readonly above: Float64Array;
  /** Noise of `above` around each point. */
  readonly sigma: Float64Array;
  readonly cadenceDays: number;
  /** Indices of points that nothing reaches across to. */
  readonly splits: ReadonlySet<number>;
}

/** Points first to last are left out. */
export interface FlareShape {
  readonly first: number;
  readonly peak: number;
  readonly last: number;
}

const PEAK_SIGMA = 4;
/** A tail ends where it falls under this. */
const TAIL_SIGMA = 1;
/** The levels before and after come from the nearest points, so many and no further away. */
const SIDE_POINTS = 7;
const LEAST_SIDE = 3;
const SIDE_DAYS = 0.5;
/** The two levels may differ by this part of the height: beside an eclipse or a step they differ by all of it. */
const LARGEST_STEP = 0.4;
/** Where in its length a flare has its peak at the latest, and its centre of area. A hump has both at one half. */
const LATEST_PEAK = 0.3;
const LATEST_CENTRE = 0.45;
/** The mean height of the second half over that of the first, at most: a plateau between two dips has 1. */
const LARGEST_DECAY = 0.75;
/** A tail may reach this many times as far as the run of high points, and no further than so many days. */
const LONGEST_TAIL = 2;
const LONGEST_DAYS = 0.6;

/**
 * Whether a run of high points is a flare: it stands over the levels on both sides of it, which are nearly the same; it
 * rises fast and decays slowly. The tail reaches to where an exponential through the decay falls under 1 sigma, or the
 * points do, whichever is later. The shape is that of Davenport et al. (2014), ApJ 797, 122; the thresholds are ours.
 *
 * @param first and @param end the run, end excluded
 */
export function describeFlare(flat: FlatSeries, first: number, end: number): FlareShape | undefined {
  const { time, above, sigma, cadenceDays } = flat;
  let peak = first;
  for (let i = first; i < end; i += 1) if (above[i]! > above[peak]!) peak = i;
  if (above[peak]! < PEAK_SIGMA * sigma[peak]!) return undefined;
  const start = extend(flat, first, -1);
  const stop = extend(flat, end - 1, 1);
  if (!standsOverBothSides(flat, start, peak, stop) || !fallsSlower(flat, start, peak, stop)) return undefined;
  const tailDays = decayDays(flat, peak, stop) * Math.log(above[peak]! / (TAIL_SIGMA * sigma[peak]!));
  const seenDays = time[stop]! - time[peak]!;
  const runDays = time[end - 1]! - time[peak]! + cadenceDays;
  const endDays = time[peak]! + Math.min(Math.max(tailDays, seenDays), LONGEST_TAIL * runDays, LONGEST_DAYS);
  let last = peak;
  while (last + 1 < time.length && time[last + 1]! <= endDays && !flat.splits.has(last + 1)) last += 1;
  return { first: start, peak, last };
}

/** The last point in a direction before two of three fall under the tail's limit. */
function extend({ time, above, sigma, cadenceDays, splits }: FlatSeries, from: number, direction: 1 | -1): number {
  const isHigh = (i: number): boolean => above[i]! > TAIL_SIGMA * sigma[i]!;
  let at = from;
  for (;;) {
    const next = at + direction;
    if (next < 0 || next >= time.length || splits.has(Math.max(at, next))) return at;
    if (Math.abs(time[next]! - time[at]!) > SIDE_POINTS * cadenceDays) return at;
    const ahead = [next, next + direction, next + 2 * direction].filter((i) => i >= 0 && i < time.length);
    // The rise ends at the first quiet point; the tail only where the noise alone is left.
    if (direction === -1 ? !isHigh(next) : ahead.filter(isHigh).length < 2) return at;
    at = next;
  }
}

function standsOverBothSides({ time, flux, sigma }: FlatSeries, start: number, peak: number, stop: number): boolean {
  const before = sideLevel(time, flux, start, -1);
  const after = sideLevel(time, flux, stop, 1);
  const height = flux[peak]! - Math.max(before, after);
  // Also false where a side has no level: the start of the data in a decay is not told from an egress.
  return height >= PEAK_SIGMA * sigma[peak]! && Math.abs(before - after) <= LARGEST_STEP * height;
}

/** NaN with too few points near by. */
function sideLevel(time: Float64Array, flux: Float64Array, from: number, direction: 1 | -1): number {
  const values = new Float64Array(SIDE_POINTS);
  let count = 0;
  for (let i = from + direction; i >= 0 && i < time.length && count < SIDE_POINTS; i += direction) {
    if (Math.abs(time[i]! - time[from]!) > SIDE_DAYS) break;
    values[count] = flux[i]!;
    count += 1;
  }
  return count < LEAST_SIDE ? Number.NaN : medianInPlace(values, count);
}

function fallsSlower({ time, above, cadenceDays }: FlatSeries, start: number, peak: number, stop: number): boolean {
  const from = time[start]! - cadenceDays / 2;
  const length = time[stop]! + cadenceDays / 2 - from;
  let [area, moment, early, late, earlyCount, lateCount] = [0, 0, 0, 0, 0, 0];
  for (let i = start; i <= stop; i += 1) {
    const place = (time[i]! - from) / length;
    area += above[i]!;
    moment += above[i]! * place;
    if (place < 0.5) {
      early += above[i]!;
      earlyCount += 1;
    } else {
      late += above[i]!;
      lateCount += 1;
    }
  }
  const decay = late / Math.max(1, lateCount) / (early / Math.max(1, earlyCount));
  const risesFast = peak - start <= 1 || (time[peak]! - from) / length <= LATEST_PEAK;
  return risesFast && moment / area <= LATEST_CENTRE && decay <= LARGEST_DECAY;
}

/** Of an exponential through the decay: least squares of the logarithm, each point as heavy as its height squared. */
function decayDays({ time, above, sigma }: FlatSeries, peak: number, stop: number): number {
  let [weights, x, y, xx, xy] = [0, 0, 0, 0, 0];
  for (let i = peak; i <= stop; i += 1) {
    if (!(above[i]! > TAIL_SIGMA * sigma[i]!)) continue;
    const weight = above[i]! * above[i]!;
    const since = time[i]! - time[peak]!;
    const logarithm = Math.log(above[i]!);
    weights += weight;
    x += weight * since;
    y += weight * logarithm;
    xx += weight * since * since;
    xy += weight * since * logarithm;
  }
  const slope = (weights * xy - x * y) / (weights * xx - x * x);
  return slope < 0 ? -1 / slope : 0;
}

const FEWEST_INTERVALS = 5;
/** Intervals within this part of a whole number of the shortest are even; the part of them that must be. */
const EVEN_PART = 0.12;
const LEAST_EVEN = 0.75;

/** Whether times come at even intervals, some left out: pulsations with sharp peaks do, flares do not. */
export function isRecurring(times: readonly number[]): boolean {
  const intervals = times.slice(1).map((time, i) => time - times[i]!);
  if (intervals.length < FEWEST_INTERVALS) return false;
  const sorted = intervals.slice().sort((a, b) => a - b);
  const shortest = sorted[Math.floor(sorted.length / 5)]!;
  const even = intervals.filter((interval) => {
    const cycles = interval / shortest;
    return cycles > 0.5 && Math.abs(cycles - Math.round(cycles)) < EVEN_PART;
  });
  return even.length >= LEAST_EVEN * intervals.length;
}
