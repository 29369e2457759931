import { createLehmer } from '../demo/lehmer.mjs';

export const SIGMA = 4e-4;

export const CADENCES = [
  ['2 min', 2 / 1440],
  ['30 min', 1 / 48],
] as const;

export const times = (days: number, cadenceDays: number): Float64Array =>
  Float64Array.from({ length: Math.round(days / cadenceDays) }, (_, i) => i * cadenceDays);

/** Flux of a shape about 1 with seeded white noise. */
export function noisy(
  time: Float64Array,
  seed: string,
  shape: (t: number) => number = () => 0,
  sigma: number = SIGMA,
): Float64Array {
  const random = createLehmer(seed);
  return time.map((t) => 1 + shape(t) + sigma * random.normal());
}

export const noneProtected = (time: Float64Array): Uint8Array => new Uint8Array(time.length);

/** Distance to the nearest event, days. */
export const awayFrom = (t: number, periodDays: number, epochDays: number): number =>
  Math.abs(t - epochDays - periodDays * Math.round((t - epochDays) / periodDays));

/** Dips of depth 1 by their distance from the middle, of one full duration. */
export const DIPS: Readonly<Record<string, (away: number, duration: number) => number>> = {
  box: (away, duration) => (away < duration / 2 ? 1 : 0),
  V: (away, duration) => Math.max(0, 1 - away / (duration / 2)),
  U: (away, duration) => Math.sqrt(Math.max(0, 1 - (away / (duration / 2)) ** 2)),
  trapezium: (away, duration) => Math.min(1, Math.max(0, (duration / 2 - away) / (duration / 8))),
};
