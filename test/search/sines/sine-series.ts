import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import { createLehmer } from '../../demo/lehmer.mjs';

/** Period and time of maximum in days, semi-amplitude in relative flux. */
export type Sine = readonly [periodDays: number, amplitude: number, maximumDays: number];

/** Every half hour from day 100 on. */
export const evenTimes = (n: number): Float64Array => Float64Array.from({ length: n }, (_, i) => 100 + i / 48);

/** Nights of eight hours, one a day, points about every 15 minutes. */
export function nightTimes(nights: number): Float64Array {
  const random = createLehmer('nights of sines');
  return Float64Array.from({ length: 32 * nights }, (_, i) => 500 + Math.floor(i / 32) + random.uniform() / 3).sort();
}

/** Sines and white noise of the size of the errors. */
export function makeSines(time: Float64Array, sines: readonly Sine[], noise = 1e-3): SearchSeries {
  const random = createLehmer(`sines ${sines.length} ${time.length}`);
  const wave = (t: number): number =>
    sines.reduce((sum, [period, a, maximum]) => sum + a * Math.cos((2 * Math.PI * (t - maximum)) / period), 1);
  const flux = time.map((t) => wave(t) + noise * random.normal());
  return { seriesId: 's', time, flux, error: new Float64Array(time.length).fill(Math.max(noise, 1e-6)) };
}
