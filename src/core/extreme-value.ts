import { logGamma } from './log-gamma.ts';
import { minimiseSimplex } from './minimise-simplex.ts';

const EULER = 0.5772156649015329;
/** With fewer maxima the likelihood's shape wanders, and L-moments stand (Hosking, Wallis & Wood 1985). */
const LEAST_FOR_LIKELIHOOD = 25;
/** Heavier tails have no variance; a fit that goes there has too few maxima. */
const HEAVIEST_SHAPE = -0.5;
/** Of the negative log-likelihood. */
const TOLERANCE = 1e-10;

/** Generalised extreme value distribution, G(x) = exp(-(1 - k (x - location) / scale)^(1/k)); k = 0 is Gumbel's. */
export interface ExtremeValues {
  readonly location: number;
  /** 0 where the maxima do not vary, or are fewer than two: then nothing can be said of probabilities. */
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
 * Fits the distribution of maxima: by L-moments, and from there, where there are at least 25, by maximum likelihood.
 * Where the fit's tail would end (k > 0), Gumbel's distribution is fitted instead: no strength is then impossible for
 * noise, which errs on the careful side.
 *
 * @param maxima any order
 * Source: Hosking (1990), J. R. Stat. Soc. B 52, 105, and Hosking, Wallis & Wood (1985), Technometrics 27, 251.
 */
export function fitExtremeValues(maxima: ArrayLike<number>): ExtremeValues {
  const sorted = Float64Array.from(maxima).sort();
  const n = sorted.length;
  if (n < 2 || !(sorted[n - 1]! > sorted[0]!)) return { location: sorted[0] ?? 0, scale: 0, shape: 0 };
  const moments = fitByMoments(sorted);
  if (n < LEAST_FOR_LIKELIHOOD) return moments.shape < 0 ? moments : gumbelOfMoments(sorted);
  const likely = fitByLikelihood(sorted, moments);
  return likely.shape < 0 ? likely : fitGumbel(sorted);
}

/** L-moment estimators of the three parameters; Hosking, Wallis & Wood (1985), eqs. 14 and 15. */
export function fitByMoments(ascending: Float64Array): ExtremeValues {
  const { mean, spread, skew } = lMoments(ascending);
  const c = 2 / (3 + skew) - Math.log(2) / Math.log(3);
  const shape = 7.859 * c + 2.9554 * c * c;
  if (Math.abs(shape) < 1e-9) return gumbelOfMoments(ascending);
  const gamma = Math.exp(logGamma(1 + shape));
  const scale = (spread * shape) / ((1 - 2 ** -shape) * gamma);
  return { location: mean - (scale * (1 - gamma)) / shape, scale, shape };
}

function gumbelOfMoments(ascending: Float64Array): ExtremeValues {
  const { mean, spread } = lMoments(ascending);
  return { location: mean - (EULER * spread) / Math.LN2, scale: spread / Math.LN2, shape: 0 };
}

/** First two L-moments and the third over the second. */
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

/** Maximum likelihood near a first guess, all three parameters free. */
export function fitByLikelihood(maxima: Float64Array, guess: ExtremeValues): ExtremeValues {
  const parametersAt = (at: Float64Array): ExtremeValues => ({
    location: guess.location + at[0]! * guess.scale,
    scale: guess.scale * Math.exp(at[1]!),
    shape: at[2]!,
  });
  const start = [0, 0, Math.max(HEAVIEST_SHAPE + 0.05, guess.shape)];
  const best = minimiseSimplex((at) => badness(maxima, parametersAt(at)), start, [0.1, 0.1, 0.05], TOLERANCE);
  return Number.isFinite(best.value) ? parametersAt(best.at) : guess;
}

/** -ln likelihood; infinite where a maximum lies beyond the end of the tail. */
function badness(maxima: Float64Array, { location, scale, shape }: ExtremeValues): number {
  if (shape < HEAVIEST_SHAPE) return Number.POSITIVE_INFINITY;
  let sum = maxima.length * Math.log(scale);
  for (let i = 0; i < maxima.length; i += 1) {
    const reduced = (maxima[i]! - location) / scale;
    const base = 1 - shape * reduced;
    if (!(base > 0)) return Number.POSITIVE_INFINITY;
    const z = Math.abs(shape) < 1e-8 ? reduced : -Math.log(base) / shape;
    sum += (1 - shape) * z + Math.exp(-z);
  }
  return sum;
}

/**
 * Gumbel's distribution by maximum likelihood: scale = mean(x) - sum x w / sum w with w = exp(-x / scale), solved by
 * bisection. Source: Johnson, Kotz & Balakrishnan (1995), Continuous Univariate Distributions 2, ch. 22.9.
 */
export function fitGumbel(ascending: Float64Array): ExtremeValues {
  const mean = ascending.reduce((sum, value) => sum + value, 0) / ascending.length;
  const excess = (scale: number): number => scale - mean + weighByTail(ascending, scale).mean;
  let low = 0;
  let high = ascending.at(-1)! - ascending[0]!;
  while (excess(high) < 0) high *= 2;
  for (let halving = 0; halving < 80; halving += 1) {
    const middle = (low + high) / 2;
    if (excess(middle) < 0) low = middle;
    else high = middle;
  }
  const { sum } = weighByTail(ascending, high);
  return { location: ascending[0]! - high * Math.log(sum / ascending.length), scale: high, shape: 0 };
}

/** Sum of exp(-(x - least) / scale), and the mean of x with these for weights. */
function weighByTail(ascending: Float64Array, scale: number): { sum: number; mean: number } {
  let sum = 0;
  let weighted = 0;
  for (let i = 0; i < ascending.length; i += 1) {
    const weight = Math.exp(-(ascending[i]! - ascending[0]!) / scale);
    sum += weight;
    weighted += weight * ascending[i]!;
  }
  return { sum, mean: weighted / sum };
}

/**
 * Probability that noise alone makes a peak as strong anywhere in the whole grid, its parts taken as independent:
 * 1 - (1 - p)^(1 / gridFraction). 1 where the maxima say nothing.
 * Source: Süveges (2014), MNRAS 440, 2099, section 2.
 */
export function falseAlarmProbability(maxima: PartMaxima, strength: number): number {
  if (!(maxima.scale > 0)) return 1;
  return -Math.expm1(-exponent(maxima, strength) / maxima.gridFraction);
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
  if (base > 0) return base ** (1 / shape);
  return shape > 0 ? 0 : Number.POSITIVE_INFINITY;
}
