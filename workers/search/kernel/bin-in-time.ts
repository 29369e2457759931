/** A weighted series, points that fall into one bin of time merged. */
export interface BinnedSeries {
  /** Days after the first point, the weighted mean of each bin's, ascending. */
  readonly time: Float64Array;
  readonly weight: Float64Array;
  readonly weighted: Float64Array;
}

/** Merging pays when bins hold this many points on average. */
const LEAST_POINTS_PER_BIN = 1.6;

/**
 * Merges the points of each bin of time of this width; the series itself where that would hardly thin it.
 *
 * @param elapsed days after the first point, ascending, length n or more; weight, weighted length n
 */
export function binInTime(
  elapsed: Float64Array,
  weight: Float64Array,
  weighted: Float64Array,
  widthDays: number,
): BinnedSeries {
  const n = weight.length;
  const own = { time: elapsed.subarray(0, n), weight, weighted };
  if (n < 2 || !(widthDays > 0)) return own;
  const time = new Float64Array(n);
  const weights = new Float64Array(n);
  const sums = new Float64Array(n);
  let count = 0;
  let last = -1;
  for (let i = 0; i < n; i += 1) {
    const bin = Math.floor(elapsed[i]! / widthDays);
    if (bin !== last) count += 1;
    last = bin;
    time[count - 1]! += weight[i]! * elapsed[i]!;
    weights[count - 1]! += weight[i]!;
    sums[count - 1]! += weighted[i]!;
  }
  if (n < LEAST_POINTS_PER_BIN * count) return own;
  for (let bin = 0; bin < count; bin += 1) time[bin]! /= weights[bin]!;
  return { time: time.slice(0, count), weight: weights.slice(0, count), weighted: sums.slice(0, count) };
}
