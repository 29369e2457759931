import { sumAtFrequencies } from './sums-at-frequencies.ts';
import type { WeightedSeries } from './weighted-series.ts';

/** Below this part of its largest value the determinant of a frequency's sine and cosine has no digits. */
const LEAST_DETERMINANT = 1e-7;

/** The weighted sums of one frequency. */
interface Sums {
  readonly c: number;
  readonly s: number;
  readonly c2: number;
  readonly s2: number;
  readonly yc: number;
  readonly ys: number;
}

/**
 * Power of the best sine with a floating mean, 0 to 1 (standard normalisation).
 * Source: Zechmeister & Kürster (2009), A&A 496, 577, eqs. 4-15.
 *
 * @param variance weighted mean of flux^2
 */
function powerOf({ c, s, c2, s2, yc, ys }: Sums, variance: number): number {
  const cc = (1 + c2) / 2 - c * c;
  const ss = (1 - c2) / 2 - s * s;
  const cs = s2 / 2 - c * s;
  const determinant = cc * ss - cs * cs;
  if (!(determinant > LEAST_DETERMINANT) || !(variance > 0)) return 0;
  const power = (ss * yc * yc + cc * ys * ys - 2 * cs * yc * ys) / (variance * determinant);
  return Math.min(1, Math.max(0, power));
}

export const varianceOf = ({ weight, flux }: WeightedSeries): number =>
  flux.reduce((sum, value, i) => sum + weight[i]! * value * value, 0);

/** Power at k * stepPerDay for k = 0..count (0 at k = 0), all frequencies at once by non-uniform FFT. */
export function powersAt(series: WeightedSeries, stepPerDay: number, count: number): Float64Array {
  const { time, weight, flux } = series;
  const cycles = time.map((value) => value * stepPerDay);
  const ofWeight = sumAtFrequencies(cycles, weight, 2 * count);
  const ofFlux = sumAtFrequencies(
    cycles,
    flux.map((value, i) => value * weight[i]!),
    count,
  );
  const variance = varianceOf(series);
  const power = new Float64Array(count + 1);
  for (let k = 1; k <= count; k += 1) {
    const sums = {
      c: ofWeight.real[k]!,
      s: ofWeight.imaginary[k]!,
      c2: ofWeight.real[2 * k]!,
      s2: ofWeight.imaginary[2 * k]!,
      yc: ofFlux.real[k]!,
      ys: ofFlux.imaginary[k]!,
    };
    power[k] = powerOf(sums, variance);
  }
  return power;
}

/** Power at one frequency by the plain sums. */
export function powerAt({ time, weight, flux }: WeightedSeries, frequencyPerDay: number, variance: number): number {
  let c = 0;
  let s = 0;
  let c2 = 0;
  let s2 = 0;
  let yc = 0;
  let ys = 0;
  const omega = 2 * Math.PI * frequencyPerDay;
  for (let i = 0; i < time.length; i += 1) {
    const cosine = Math.cos(omega * time[i]!);
    const sine = Math.sin(omega * time[i]!);
    const w = weight[i]!;
    c += w * cosine;
    s += w * sine;
    c2 += w * (cosine * cosine - sine * sine);
    s2 += 2 * w * sine * cosine;
    yc += w * flux[i]! * cosine;
    ys += w * flux[i]! * sine;
  }
  return powerOf({ c, s, c2, s2, yc, ys }, variance);
}
