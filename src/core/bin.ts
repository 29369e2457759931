import type { Interval } from './interval.ts';

/** Arrays of one length, the number of bins. */
export interface BinnedFold {
  readonly centre: Float64Array;
  /** Weighted by 1/error^2; NaN in an empty bin. */
  readonly mean: Float64Array;
  /** One sigma of the mean from the scatter inside the bin, not from the given errors; NaN under two points. */
  readonly error: Float64Array;
  readonly count: Uint32Array;
}

export function makeBinnedFold(binCount: number): BinnedFold {
  return {
    centre: new Float64Array(binCount),
    mean: new Float64Array(binCount),
    error: new Float64Array(binCount),
    count: new Uint32Array(binCount),
  };
}

/**
 * Weighted means of folded points in equal bins over [range.start, range.end).
 *
 * @param x phases or hours, length n, any order; a point with NaN in x or flux is passed over
 * @param flux length n; @param error one sigma, length n; @param range in the unit of x
 */
export function binFold(
  x: Float64Array,
  flux: Float64Array,
  error: Float64Array,
  range: Interval,
  binCount: number,
): BinnedFold {
  const out = makeBinnedFold(binCount);
  binFoldInto(x, flux, error, range, out, new Float64Array(binCount));
  return out;
}

/**
 * The same into arrays that are kept between frames: nothing is allocated.
 * Error of a mean: sqrt(sum w (y - mean)^2 / ((n - 1) sum w)), by one pass, West (1979), Comm. ACM 22, 532.
 *
 * @param weights scratch, as long as the bins
 */
export function binFoldInto(
  x: Float64Array,
  flux: Float64Array,
  error: Float64Array,
  range: Interval,
  out: BinnedFold,
  weights: Float64Array,
): void {
  const { mean, error: spread, count } = out;
  const bins = mean.length;
  const perUnit = bins / (range.end - range.start);
  mean.fill(0);
  spread.fill(0);
  count.fill(0);
  weights.fill(0);
  for (let i = 0; i < x.length; i += 1) {
    const place = (x[i]! - range.start) * perUnit;
    const value = flux[i]!;
    if (!(place >= 0 && place < bins) || Number.isNaN(value)) continue;
    const bin = Math.floor(place);
    const weight = 1 / (error[i]! * error[i]!);
    const total = weights[bin]! + weight;
    const delta = value - mean[bin]!;
    const step = (delta * weight) / total;
    mean[bin]! += step;
    spread[bin]! += weights[bin]! * delta * step;
    weights[bin] = total;
    count[bin]! += 1;
  }
  finishBins(range, out, weights);
}

function finishBins(range: Interval, { centre, mean, error, count }: BinnedFold, weights: Float64Array): void {
  const width = (range.end - range.start) / mean.length;
  for (let bin = 0; bin < mean.length; bin += 1) {
    const n = count[bin]!;
    centre[bin] = range.start + (bin + 0.5) * width;
    if (n === 0) mean[bin] = Number.NaN;
    error[bin] = n < 2 ? Number.NaN : Math.sqrt(error[bin]! / ((n - 1) * weights[bin]!));
  }
}
