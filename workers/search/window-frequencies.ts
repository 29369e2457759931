/** Strongest frequencies of the spectral window that are looked at. */
const MOST_FREQUENCIES = 3;
/** Below this part of the window's power at zero an alias is lost in noise. */
const LEAST_POWER = 0.15;
const HIGHEST_PER_DAY = 3.2;
const MOST_STEPS = 6000;
const MOST_POINTS = 3000;

/**
 * Frequencies at which the sampling repeats itself: the highest peaks of the spectral window
 * W(f) = |sum exp(2 pi i f t)|^2 / n^2 up to 3.2 per day, away from zero. A signal at f has aliases at f +- each.
 * Source: Dawson & Fabrycky (2010), ApJ 722, 937, section 2. Long series are thinned evenly, which keeps the nights
 * and runs that make aliases.
 *
 * @param time days, ascending @returns per day, strongest first
 */
export function windowFrequencies(time: Float64Array): number[] {
  const span = time.at(-1)! - time[0]!;
  if (!(span > 0)) return [];
  const thin = Math.max(1, Math.ceil(time.length / MOST_POINTS));
  const points = new Float64Array(Math.ceil(time.length / thin));
  for (let i = 0; i < points.length; i += 1) points[i] = time[i * thin]! - time[0]!;
  const steps = Math.min(MOST_STEPS, Math.ceil(HIGHEST_PER_DAY * span * 3));
  const power = windowPower(points, HIGHEST_PER_DAY / steps, steps);
  const first = Math.ceil((2 / span / HIGHEST_PER_DAY) * steps);
  const peaks: number[] = [];
  for (let k = Math.max(1, first); k < steps; k += 1)
    if (power[k]! > LEAST_POWER && power[k]! >= power[k - 1]! && power[k]! > power[k + 1]!) peaks.push(k);
  return peaks
    .sort((a, b) => power[b]! - power[a]!)
    .slice(0, MOST_FREQUENCIES)
    .map((k) => (k / steps) * HIGHEST_PER_DAY);
}

/** |sum exp(2 pi i k step t)|^2 / n^2 for k = 0..count, each point's phasor turned on from frequency to frequency. */
function windowPower(time: Float64Array, step: number, count: number): Float64Array {
  const real = new Float64Array(count + 1);
  const imaginary = new Float64Array(count + 1);
  for (let i = 0; i < time.length; i += 1) {
    const turn = 2 * Math.PI * step * time[i]!;
    addPhasors(real, imaginary, Math.cos(turn), Math.sin(turn));
  }
  return real.map((value, k) => (value * value + imaginary[k]! * imaginary[k]!) / time.length ** 2);
}

function addPhasors(real: Float64Array, imaginary: Float64Array, cosine: number, sine: number): void {
  let x = 1;
  let y = 0;
  for (let k = 0; k < real.length; k += 1) {
    real[k] = real[k]! + x;
    imaginary[k] = imaginary[k]! + y;
    const turned = x * cosine - y * sine;
    y = x * sine + y * cosine;
    x = turned;
  }
}
