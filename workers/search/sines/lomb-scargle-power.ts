import { runSteps, type Steps } from './steps.ts';
import { type FrequencySums, planSums, type SumsPlan, sumAtFrequencies } from './sums-at-frequencies.ts';
import { varianceOf, type WeightedSeries } from './weighted-series.ts';

/** Below this the determinant of a frequency's sine and cosine has no digits by plain sums. */
const LEAST_DETERMINANT = 1e-12;
/** Below this it has too few by the fast sums for a power to 1e-8. */
const LEAST_FAST_DETERMINANT = 0.01;
/** Plain evaluations, points times frequencies: some seconds. */
const MOST_PLAIN = 5e7;

/** Weighted sums of cosine and sine, at once and twice the frequency, and of flux times cosine and sine. */
interface SineSums {
  readonly c: number;
  readonly s: number;
  readonly c2: number;
  readonly s2: number;
  readonly yc: number;
  readonly ys: number;
}

/** The inverse of the 2x2 matrix of cosine and sine about their means, at each frequency k of a grid. */
export interface SamplingMatrices {
  readonly cc: Float64Array;
  readonly ss: Float64Array;
  readonly cs: Float64Array;
  /** Frequencies at which cosine and sine are too alike for the fast sums. */
  readonly plain: Int32Array;
}

/** Frequencies k * step, k = 1..count, of which those from `first` on are wanted. */
export interface EvenFrequencies {
  readonly step: number;
  readonly first: number;
  readonly plan: SumsPlan;
  readonly sum: typeof sumAtFrequencies;
}

/**
 * What the times and weights alone give, for any flux on them.
 * Source: Zechmeister & Kürster (2009), A&A 496, 577, eqs. 13-15, where the weighted mean of the flux is zero.
 */
export function* sampleFrequencies(
  { time, weight }: WeightedSeries,
  { step, first, plan, sum }: EvenFrequencies,
): Steps<SamplingMatrices> {
  const once = yield* sum(plan, inCycles(time, step), weight);
  const twice = yield* sum(plan, inCycles(time, 2 * step), weight);
  return invertMatrices(once, twice, first);
}

function inCycles(time: Float64Array, step: number): Float64Array {
  const cycles = new Float64Array(time.length);
  for (let i = 0; i < time.length; i += 1) cycles[i] = time[i]! * step;
  return cycles;
}

function multiply(a: Float64Array, b: Float64Array): Float64Array {
  const product = new Float64Array(a.length);
  for (let i = 0; i < a.length; i += 1) product[i] = a[i]! * b[i]!;
  return product;
}

function invertMatrices(once: FrequencySums, twice: FrequencySums, first: number): SamplingMatrices {
  const length = once.real.length;
  const [cc, ss, cs] = [new Float64Array(length), new Float64Array(length), new Float64Array(length)];
  const plain: number[] = [];
  for (let k = first; k < length; k += 1) {
    const c = once.real[k]!;
    const s = once.imaginary[k]!;
    const c2 = twice.real[k]!;
    const s2 = twice.imaginary[k]!;
    const ofCosine = (1 + c2) / 2 - c * c;
    const ofSine = (1 - c2) / 2 - s * s;
    const ofBoth = s2 / 2 - c * s;
    const determinant = ofCosine * ofSine - ofBoth * ofBoth;
    if (determinant < LEAST_FAST_DETERMINANT) plain.push(k);
    if (!(determinant > LEAST_DETERMINANT)) continue;
    cc[k] = ofSine / determinant;
    ss[k] = ofCosine / determinant;
    cs[k] = -ofBoth / determinant;
  }
  return { cc, ss, cs, plain: Int32Array.from(plain) };
}

/**
 * Power of the best sine with a floating mean, 0 to 1 (standard normalisation), at frequencies k * step, k = 0..count
 * (0 below the first wanted one); to 1e-8 of the plain sums.
 * Source: Zechmeister & Kürster (2009), A&A 496, 577, eqs. 4-15.
 */
export function* findPowers(
  series: WeightedSeries,
  matrices: SamplingMatrices,
  { step, plan, sum }: EvenFrequencies,
): Steps<Float64Array> {
  const { time, weight, flux, variance } = series;
  const weighted = multiply(flux, weight);
  const sums = yield* sum(plan, inCycles(time, step), weighted);
  const power = fastPowers(matrices, sums, variance);
  const { plain } = matrices;
  if (plain.length * time.length > MOST_PLAIN) return power;
  for (const k of plain) {
    power[k] = powerAt(series, k * step);
    yield 0;
  }
  return power;
}

/** The same in one go, for the flux as it stands: power at k * stepPerDay, k = 0..count. */
export function powersAt(series: WeightedSeries, stepPerDay: number, count: number): Float64Array {
  const frequencies = { step: stepPerDay, first: 1, plan: planSums(count), sum: sumAtFrequencies };
  const matrices = runSteps(sampleFrequencies(series, frequencies));
  const variance = varianceOf(series.flux, series.weight);
  return runSteps(findPowers({ ...series, variance }, matrices, frequencies));
}

function fastPowers({ cc, ss, cs }: SamplingMatrices, { real, imaginary }: FrequencySums, variance: number) {
  const power = new Float64Array(real.length);
  if (!(variance > 0 && Number.isFinite(variance))) return power;
  for (let k = 1; k < power.length; k += 1) {
    const yc = real[k]!;
    const ys = imaginary[k]!;
    const value = (cc[k]! * yc * yc + ss[k]! * ys * ys + 2 * cs[k]! * yc * ys) / variance;
    power[k] = value < 0 ? 0 : Math.min(value, 1);
  }
  return power;
}

/** Power at one frequency by the plain sums. */
export function powerAt({ time, weight, flux, variance }: WeightedSeries, frequencyPerDay: number): number {
  let [c, s, c2, s2, yc, ys] = [0, 0, 0, 0, 0, 0];
  const omega = 2 * Math.PI * frequencyPerDay;
  for (let i = 0; i < time.length; i += 1) {
    const cosine = Math.cos(omega * time[i]!);
    const sine = Math.sin(omega * time[i]!);
    const w = weight[i]!;
    const wy = w * flux[i]!;
    c += w * cosine;
    s += w * sine;
    c2 += w * (cosine * cosine - sine * sine);
    s2 += 2 * w * sine * cosine;
    yc += wy * cosine;
    ys += wy * sine;
  }
  return powerOf({ c, s, c2, s2, yc, ys }, variance);
}

/** Zechmeister & Kürster (2009), eqs. 5 and 11-15. */
export function powerOf({ c, s, c2, s2, yc, ys }: SineSums, variance: number): number {
  const cc = (1 + c2) / 2 - c * c;
  const ss = (1 - c2) / 2 - s * s;
  const cs = s2 / 2 - c * s;
  const determinant = cc * ss - cs * cs;
  if (!(determinant > LEAST_DETERMINANT) || !(variance > 0 && Number.isFinite(variance))) return 0;
  const power = (ss * yc * yc + cc * ys * ys - 2 * cs * yc * ys) / (variance * determinant);
  return Math.min(1, Math.max(0, power));
}
