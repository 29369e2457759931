import { powerOf } from './lomb-scargle-power.ts';
import type { Steps } from './steps.ts';
import type { WeightedSeries } from './weighted-series.ts';

/** Of the sums, each of which is at most one in size. */
const ACCURACY = 1e-13;
/** Points between two looks at the clock. */
const POINTS_PER_LOOK = 1 << 15;

/** The moments sum c_j exp(i omega t_j) u_j^p of one kind of coefficient, p = 0..terms - 1. */
interface Moments {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/**
 * Power near one frequency as exact as by plain sums, for the price of some few of them: a phasor at a frequency
 * beside is this one's times a Taylor series in time.
 *
 * @param reachPerDay furthest from `frequencyPerDay` that will be asked; fastest where within 1 / span
 * @returns power at a frequency
 */
export function* expandPower(
  series: WeightedSeries,
  frequencyPerDay: number,
  reachPerDay: number,
): Steps<(frequencyPerDay: number) => number> {
  const halfSpan = series.spanDays / 2;
  // The phasors of twice the frequency turn furthest.
  const terms = termsFor(4 * Math.PI * reachPerDay * halfSpan);
  const makeMoments = (): Moments => ({ real: new Float64Array(terms), imaginary: new Float64Array(terms) });
  const [once, twice, ofFlux] = [makeMoments(), makeMoments(), makeMoments()];
  for (let start = 0; start < series.time.length; start += POINTS_PER_LOOK) {
    const end = Math.min(series.time.length, start + POINTS_PER_LOOK);
    gatherMoments(series, frequencyPerDay, [once, twice, ofFlux], start, end);
    yield 0;
  }
  return (frequency) => {
    const angle = 2 * Math.PI * (frequency - frequencyPerDay) * halfSpan;
    const [c, s] = sumMoments(once, angle);
    const [c2, s2] = sumMoments(twice, 2 * angle);
    const [yc, ys] = sumMoments(ofFlux, angle);
    return powerOf({ c, s, c2, s2, yc, ys }, series.variance);
  };
}

function termsFor(angle: number): number {
  let terms = 1;
  for (let last = 1; last > ACCURACY || terms < angle; terms += 1) last *= angle / terms;
  return terms;
}

function gatherMoments(
  { time, weight, flux, spanDays }: WeightedSeries,
  frequencyPerDay: number,
  [once, twice, ofFlux]: readonly [Moments, Moments, Moments],
  start: number,
  end: number,
): void {
  const omega = 2 * Math.PI * frequencyPerDay;
  for (let i = start; i < end; i += 1) {
    const cosine = Math.cos(omega * time[i]!);
    const sine = Math.sin(omega * time[i]!);
    const u = time[i]! / (spanDays / 2);
    const w = weight[i]!;
    addMoments(once, w * cosine, w * sine, u);
    addMoments(twice, w * (cosine * cosine - sine * sine), 2 * w * sine * cosine, u);
    addMoments(ofFlux, w * flux[i]! * cosine, w * flux[i]! * sine, u);
  }
}

function addMoments({ real, imaginary }: Moments, x: number, y: number, u: number): void {
  let power = 1;
  for (let p = 0; p < real.length; p += 1) {
    real[p] = real[p]! + x * power;
    imaginary[p] = imaginary[p]! + y * power;
    power *= u;
  }
}

/** sum over p of (i angle)^p / p! times the moment, as real and imaginary part. */
function sumMoments({ real, imaginary }: Moments, angle: number): readonly [number, number] {
  let [x, y] = [0, 0];
  let [a, b] = [1, 0];
  for (let p = 0; p < real.length; p += 1) {
    x += a * real[p]! - b * imaginary[p]!;
    y += a * imaginary[p]! + b * real[p]!;
    const factor = angle / (p + 1);
    [a, b] = [-b * factor, a * factor];
  }
  return [x, y];
}
