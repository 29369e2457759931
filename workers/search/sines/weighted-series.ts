/** A series made ready for sines: times about the middle of the span, weights that add up to one, no mean. */
export interface WeightedSeries {
  /** Days from `middleDays`, length n. */
  readonly time: Float64Array;
  readonly weight: Float64Array;
  /** Less its weighted mean. */
  readonly flux: Float64Array;
  readonly middleDays: number;
  readonly spanDays: number;
  /** Sum of 1 / error^2 before it was made one. */
  readonly totalWeight: number;
}

export function weighSeries(series: {
  readonly time: Float64Array;
  readonly flux: Float64Array;
  readonly error: Float64Array;
}): WeightedSeries {
  const { error } = series;
  const middleDays = (series.time[0]! + series.time.at(-1)!) / 2;
  const weight = error.map((sigma) => 1 / (sigma * sigma));
  const totalWeight = weight.reduce((sum, own) => sum + own, 0);
  for (let i = 0; i < weight.length; i += 1) weight[i] = weight[i]! / totalWeight;
  return {
    time: series.time.map((value) => value - middleDays),
    weight,
    flux: withoutMean(series.flux, weight),
    middleDays,
    spanDays: series.time.at(-1)! - series.time[0]!,
    totalWeight,
  };
}

/** @param weight adds up to one */
export function withoutMean(flux: Float64Array, weight: Float64Array): Float64Array {
  const mean = flux.reduce((sum, value, i) => sum + weight[i]! * (value - 1), 0);
  return flux.map((value) => value - 1 - mean);
}
