import { logGamma } from './log-gamma.ts';

const EULER = 0.5772156649015329;

/** Generalised extreme value distribution, G(x) = exp(-(1 - k (x - location) / scale)^(1/k)); k = 0 is Gumbel's. */
export interface ExtremeValues {
  readonly location: number;
  readonly scale: number;
  /** Hosking's k: negative for a heavy tail, positive for one that ends. */
  readonly shape: number;
}

/** Maxima over a part of a periodogram's trials, and their distribution. */
export interface PartMaxima extends ExtremeValues {
  /** Part of all trials that each maximum was taken over. */
  readonly gridFraction: number;
}

/**
 * Fits the distribution of maxima by L-moments. Where the fit's tail would end (k > 0), Gumbel's distribution is
 * fitted instead: no strength is then impossible for noise, which errs on the careful side.
 *
 * @param maxima at least two values, any order
 * Source: Hosking (1990), J. R. Stat. Soc. B 52, 105, and Hosking, Wallis & Wood (1985), Technometrics 27, 251.
 */
export function fitExtremeValues(maxima: ArrayLike<number>): ExtremeValues {
  const { mean, spread, skew } = lMoments(Float64Array.from(maxima).sort());
  const c = 2 / (3 + skew) - Math.log(2) / Math.log(3);
  const shape = 7.859 * c + 2.9554 * c * c;
  if (!(shape < 0)) return { location: mean - (EULER * spread) / Math.LN2, scale: spread / Math.LN2, shape: 0 };
  const gamma = Math.exp(logGamma(1 + shape));
  const scale = (spread * shape) / ((1 - 2 ** -shape) * gamma);
  return { location: mean - (scale * (1 - gamma)) / shape, scale, shape };
}

/** First two L-moments and the third over the second, from ascending values. */
function lMoments(ascending: Float64Array): { mean: number; spread: number; skew: number } {
  const n = ascending.length;
  let b0 = 0;
  let b1 = 0;
  let b2 = 0;
  for (let i = 0; i < n; i += 1) {
    b0 += ascending[i]! / n;
    b1 += (ascending[i]! * i) / (n * (n - 1));
    if (n > 2) b2 += (ascending[i]! * i * (i - 1)) / (n * (n - 1) * (n - 2));
  }
  const spread = 2 * b1 - b0;
  return { mean: b0, spread, skew: spread > 0 ? (6 * b2 - 6 * b1 + b0) / spread : 0 };
}

/** Probability that noise alone makes a peak as strong anywhere in the whole grid, its parts taken as independent. */
export function falseAlarmProbability(maxima: PartMaxima, strength: number): number {
  const logBelow = -exponent(maxima, strength);
  return -Math.expm1(logBelow / maxima.gridFraction);
}

/** The strength that noise alone reaches with this probability in the whole grid. */
export function strengthAt({ location, scale, shape, gridFraction }: PartMaxima, probability: number): number {
  const y = -Math.log1p(-probability) * gridFraction;
  return shape === 0 ? location - scale * Math.log(y) : location + (scale / shape) * (1 - y ** shape);
}

/** -ln G(x). */
function exponent({ location, scale, shape }: ExtremeValues, x: number): number {
  const reduced = (x - location) / scale;
  if (shape === 0) return Math.exp(-reduced);
  const base = 1 - shape * reduced;
  return base > 0 ? base ** (1 / shape) : Number.POSITIVE_INFINITY;
}
