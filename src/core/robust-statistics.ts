/**
 * 1 / Phi^-1(3/4): the MAD of a normal sample times this is its standard deviation.
 * Source: Rousseeuw & Croux (1993), J. Am. Stat. Assoc. 88, 1273.
 */
export const MAD_TO_SIGMA = 1.482602218505602;

/**
 * The k-th smallest (from 0) of the first `length` values; reorders them. Quickselect, Hoare (1961), Comm. ACM 4, 321.
 * NaN must have been removed.
 */
export function selectInPlace(values: Float64Array, k: number, length: number): number {
  let low = 0;
  let high = length - 1;
  while (low < high) {
    const pivot = values[(low + high) >> 1]!;
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i]! < pivot) i += 1;
      while (values[j]! > pivot) j -= 1;
      if (i > j) break;
      const held = values[i]!;
      values[i] = values[j]!;
      values[j] = held;
      i += 1;
      j -= 1;
    }
    if (k <= j) high = j;
    else if (k >= i) low = i;
    else break;
  }
  return values[k]!;
}

/** Median of the first `length` values, which are reordered; NaN when there are none. NaN must have been removed. */
export function medianInPlace(values: Float64Array, length: number = values.length): number {
  if (length === 0) return Number.NaN;
  const middle = length >> 1;
  const upper = selectInPlace(values, middle, length);
  if (length % 2 === 1) return upper;
  let lower = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < middle; i += 1) if (values[i]! > lower) lower = values[i]!;
  return (lower + upper) / 2;
}

/** Median; the mean of the middle two for an even count; NaN when empty. The input is left as it is. */
export function median(values: ArrayLike<number>): number {
  return medianInPlace(Float64Array.from(values));
}

/** Median of |value - centre|, unscaled; the centre is the median unless given. */
export function medianAbsoluteDeviation(values: ArrayLike<number>, centre: number = median(values)): number {
  const deviations = Float64Array.from(values);
  for (let i = 0; i < deviations.length; i += 1) deviations[i] = Math.abs(deviations[i]! - centre);
  return medianInPlace(deviations);
}

/** Standard deviation of the core of a sample: 1.4826 MAD. Half the sample may be outliers. */
export function robustSigma(values: ArrayLike<number>): number {
  return MAD_TO_SIGMA * medianAbsoluteDeviation(values);
}

/**
 * White noise of one point from differences of neighbours, which slow variability hardly enters:
 * 1.4826 MAD of (y[i+1] - y[i]), over sqrt(2).
 *
 * @param values length n, in time order, without NaN
 * @returns same unit; NaN for fewer than two values
 */
export function pointToPointScatter(values: ArrayLike<number>): number {
  const differences = new Float64Array(Math.max(0, values.length - 1));
  for (let i = 0; i < differences.length; i += 1) differences[i] = values[i + 1]! - values[i]!;
  return robustSigma(differences) / Math.SQRT2;
}
