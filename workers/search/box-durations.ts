import { SOLAR_DENSITY_CGS } from '../../src/core/constants.ts';
import { centralDurationDays } from './period-grid.ts';

/** A box longer than this part of the period is not an event. */
export const LARGEST_DUTY_CYCLE = 0.25;
/** A box shorter than this many cadences cannot be told from an outlier. */
export const LEAST_CADENCES = 2;
/** Neighbouring durations: the worst mismatch, sqrt(1.35), costs 7 % of the S/N before refinement. */
const DURATION_RATIO = 1.35;

export interface DurationLimits {
  readonly densityCgs: number | undefined;
  readonly cadenceDays: number;
}

/**
 * The durations that an event at this period can have, days: central transits of stars from 0.03 to 30 times the known
 * density (which leaves room for high impact parameters, eccentric orbits and wrong densities), or 0.01 to 100 times
 * the solar one; never under two cadences nor over a quarter of the period.
 */
export function durationBounds(periodDays: number, { densityCgs, cadenceDays }: DurationLimits): [number, number] {
  const [thin, dense] = densityCgs === undefined ? [0.01, 100] : [0.03, 30];
  const density = densityCgs ?? SOLAR_DENSITY_CGS;
  return [
    Math.max(LEAST_CADENCES * cadenceDays, centralDurationDays(periodDays, density * dense)),
    Math.min(LARGEST_DUTY_CYCLE * periodDays, centralDurationDays(periodDays, density * thin)),
  ];
}

/** Log-spaced durations, ascending, from the shortest that the shortest period needs to the longest of the longest. */
export function chooseDurations(shortestPeriod: number, longestPeriod: number, limits: DurationLimits): Float64Array {
  const [least] = durationBounds(shortestPeriod, limits);
  const most = Math.max(least, durationBounds(longestPeriod, limits)[1]);
  const steps = Math.ceil(Math.log(most / least) / Math.log(DURATION_RATIO) - 1e-9);
  return Float64Array.from({ length: steps + 1 }, (_, i) => least * (most / least) ** (steps === 0 ? 0 : i / steps));
}

/** Indices into an ascending list of durations, both included; none when last < first. */
export interface DurationRange {
  first: number;
  last: number;
}

/** Which of the durations are tried at a period; at least one, unless all exceed a quarter of it. */
export function sensibleDurations(
  durations: Float64Array,
  periodDays: number,
  bounds: readonly [number, number],
  into: DurationRange,
): void {
  const most = Math.min(bounds[1], LARGEST_DUTY_CYCLE * periodDays) * (1 + 1e-12);
  const least = bounds[0] * (1 - 1e-12);
  let last = durations.length - 1;
  while (last >= 0 && durations[last]! > most) last -= 1;
  let first = 0;
  while (first < last && durations[first]! < least) first += 1;
  into.first = first;
  into.last = last;
}
