import { medianInPlace } from './robust-statistics.ts';

const MOST_STEPS = 30;
/** In units of the MAD. */
const CONVERGED = 1e-10;

/**
 * Tukey's biweight location, one step from the median M:
 * M + sum (x-M)(1-u^2)^2 / sum (1-u^2)^2 over |u| < 1, u = (x-M)/(c MAD), MAD unscaled.
 * Sources: Mosteller & Tukey (1977), Data Analysis and Regression, p. 205; Beers, Flynn & Gebhardt (1990), AJ 100,
 * 32, eq. 5.
 *
 * @param values any order, without NaN; left as they are
 * @param c cut in MADs: 6 is usual, 5 is usual for transits
 * @returns NaN when empty, the median when the MAD is zero
 */
export function biweightLocation(values: ArrayLike<number>, c: number): number {
  const own = Float64Array.from(values);
  return iterateBiweight(own, new Float64Array(own.length), own.length, c, 1);
}

/** The same, iterated to convergence from the median with the MAD held at its first value. */
export function iteratedBiweightLocation(values: ArrayLike<number>, c: number): number {
  const own = Float64Array.from(values);
  return iterateBiweight(own, new Float64Array(own.length), own.length, c, MOST_STEPS);
}

/**
 * The iterated location without allocation, for sliding windows.
 *
 * @param values its first `length` are read, and reordered
 * @param scratch as long as `values`; overwritten
 */
export function iterateBiweight(
  values: Float64Array,
  scratch: Float64Array,
  length: number,
  c: number,
  mostSteps: number = MOST_STEPS,
): number {
  const centre = medianInPlace(values, length);
  for (let i = 0; i < length; i += 1) scratch[i] = Math.abs(values[i]! - centre);
  const mad = medianInPlace(scratch, length);
  if (!(mad > 0)) return centre;
  let location = centre;
  for (let step = 0; step < mostSteps; step += 1) {
    const next = stepBiweight(values, length, location, 1 / (c * mad));
    const moved = Math.abs(next - location);
    location = next;
    if (moved <= CONVERGED * mad) break;
  }
  return location;
}

function stepBiweight(values: Float64Array, length: number, location: number, perUnit: number): number {
  let sum = 0;
  let weights = 0;
  for (let i = 0; i < length; i += 1) {
    const deviation = values[i]! - location;
    const u = deviation * perUnit;
    const rest = 1 - u * u;
    if (rest <= 0) continue;
    const weight = rest * rest;
    sum += weight * deviation;
    weights += weight;
  }
  return weights > 0 ? location + sum / weights : location;
}
