/** What the values of a column look like, however it is named. */

export interface ValueSummary {
  readonly count: number;
  readonly missing: number;
  readonly smallest: number;
  readonly largest: number;
  readonly median: number;
}

export function summarise(values: Float64Array): ValueSummary {
  const sorted = finiteSorted(values);
  return {
    count: sorted.length,
    missing: values.length - sorted.length,
    smallest: sorted[0] ?? Number.NaN,
    largest: sorted.at(-1) ?? Number.NaN,
    median: sorted[sorted.length >> 1] ?? Number.NaN,
  };
}

/** 0 to 2: distinct values, most of them one cadence apart once sorted; ascending rows count a little more. */
export function looksLikeTime(values: Float64Array): number {
  const sorted = finiteSorted(values);
  if (sorted.length < 3 || sorted.length < values.length * 0.9) return 0;
  const steps = sorted.slice(1).map((value, index) => value - sorted[index]!);
  const distinct = steps.filter((step) => step > 0).length / steps.length;
  const cadence = steps.toSorted()[steps.length >> 1]!;
  if (distinct < 0.98 || !(cadence > 0)) return 0;
  const even = steps.filter((step) => Math.abs(step - cadence) < 0.2 * cadence).length / steps.length;
  const ascending = values.every((value, index) => index === 0 || !(value < values[index - 1]!)) ? 0.5 : 0;
  const julian = sorted[0]! > 2.3e6 && sorted.at(-1)! < 2.6e6 ? 0.5 : 0;
  return even < 0.3 && julian === 0 ? 0 : even + ascending + julian;
}

/** 0 to 1: a level with a scatter small beside it. */
export function looksLikeFlux(values: Float64Array): number {
  const { count, median } = summarise(values);
  if (count < 3 || !(Math.abs(median) > 0)) return 0;
  const scatter = interquartile(values) / Math.abs(median);
  // A constant column is no measurement.
  return scatter > 0 && scatter < 1 ? 1 / (1 + Math.abs(Math.log10(Math.abs(median))) / 10 + scatter) : 0;
}

/** 0 to 1: all positive, and about as large as the scatter of the flux. */
export function looksLikeError(values: Float64Array, flux: Float64Array): number {
  const { count, smallest, median } = summarise(values);
  const scatter = interquartile(flux) / 1.349;
  if (count < 3 || !(smallest > 0) || !(scatter > 0)) return 0;
  const distance = Math.abs(Math.log10(median / scatter));
  return distance > 1.5 ? 0 : 1 - distance / 2;
}

function interquartile(values: Float64Array): number {
  const sorted = finiteSorted(values);
  return (sorted[(3 * sorted.length) >> 2] ?? 0) - (sorted[sorted.length >> 2] ?? 0);
}

function finiteSorted(values: Float64Array): Float64Array {
  return values.filter(Number.isFinite).sort();
}
