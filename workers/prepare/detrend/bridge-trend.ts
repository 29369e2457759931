import { piecesOf } from './pieces.ts';

/**
 * Fills NaN by interpolation in time from the nearest known values, flat beyond the first and last: first between two
 * splits, then, where nothing is known between two of them, from beyond. 1 where nothing is known at all.
 */
export function bridgeTrend(time: Float64Array, trend: Float64Array, splits: readonly number[]): void {
  for (const { first, end } of piecesOf(time, splits, Number.POSITIVE_INFINITY)) {
    const part = trend.subarray(first, end);
    if (part.some((value) => !Number.isNaN(value))) bridge(time.subarray(first, end), part);
  }
  bridge(time, trend);
}

function bridge(time: Float64Array, trend: Float64Array): void {
  let known = -1;
  for (let i = 0; i <= trend.length; i += 1) {
    if (i < trend.length && Number.isNaN(trend[i]!)) continue;
    for (let gap = known + 1; gap < i; gap += 1) trend[gap] = between(time, trend, known, i, gap);
    known = i;
  }
}

function between(time: Float64Array, trend: Float64Array, before: number, after: number, at: number): number {
  if (before < 0) return trend[after] ?? 1;
  if (after >= trend.length) return trend[before]!;
  const part = (time[at]! - time[before]!) / (time[after]! - time[before]!);
  return trend[before]! + part * (trend[after]! - trend[before]!);
}
