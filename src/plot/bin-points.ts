/** Means of points in equal bins; arrays may be longer than `count`. */
export interface Bins {
  count: number;
  centre: Float64Array;
  mean: Float64Array;
  /** One sigma of the mean from the scatter inside the bin; NaN under three points. */
  error: Float64Array;
  points: Uint32Array;
}

export function makeBins(capacity: number): Bins {
  return {
    count: 0,
    centre: new Float64Array(capacity),
    mean: new Float64Array(capacity),
    error: new Float64Array(capacity),
    points: new Uint32Array(capacity),
  };
}

/**
 * Bins points into `count` equal bins from `first` to `last`, into arrays kept between frames.
 *
 * @param x, y length n, any order; NaN in either are passed over
 * @param out filled in place; its capacity bounds `count`
 */
export function binPoints(
  x: Float64Array,
  y: Float64Array,
  first: number,
  last: number,
  count: number,
  out: Bins,
): void {
  const bins = Math.max(1, Math.min(count, out.centre.length));
  const width = (last - first) / bins;
  const { centre, mean, error, points } = out;
  out.count = bins;
  mean.fill(0, 0, bins);
  error.fill(0, 0, bins);
  points.fill(0, 0, bins);
  for (let i = 0; i < x.length; i += 1) {
    const bin = Math.floor((x[i]! - first) / width);
    const value = y[i]!;
    if (!(bin >= 0 && bin < bins) || Number.isNaN(value)) continue;
    // Welford (1962), Technometrics 4, 419: mean and sum of squares in one pass without cancellation.
    points[bin]! += 1;
    const delta = value - mean[bin]!;
    mean[bin]! += delta / points[bin]!;
    error[bin]! += delta * (value - mean[bin]!);
  }
  for (let bin = 0; bin < bins; bin += 1) {
    const n = points[bin]!;
    centre[bin] = first + (bin + 0.5) * width;
    error[bin] = n < 3 ? Number.NaN : Math.sqrt(error[bin]! / (n - 1) / n);
  }
}

const NICE_MINUTES = [1, 2, 5, 10, 15, 20, 30, 60, 120, 240];

/** A round bin width: about a ninth of the event, and between 20 and 120 bins over the plot. */
export function binMinutesFor(durationDays: number, halfWidthHours: number): number {
  const least = (halfWidthHours * 120) / 120;
  const most = (halfWidthHours * 120) / 20;
  const wanted = Math.min(Math.max((durationDays * 1440) / 9, least), most);
  return NICE_MINUTES.findLast((minutes) => minutes <= wanted * 1.001) ?? wanted;
}
