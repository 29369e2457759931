import { chooseDurations, LEAST_CADENCES } from '../box-durations.ts';
import type { UsablePoints } from './usable-points.ts';

/** Shorter periods show many events: a periodic search finds them. */
const SHORTEST_PERIOD_DAYS = 3;
/** A planet whose period is longer than so many spans is seldom caught. */
const LONGEST_PERIOD_SPANS = 30;
/** Noise at a duration is known from this many independent stretches of it, or not at all. */
export const LEAST_WINDOWS = 20;

/**
 * Durations of the templates, days, ascending: log-spaced by at most 1.35, from the shortest that an orbit of 3 days
 * can show to the longest of one of 30 spans, by the same room for densities, impact parameters and eccentricities as
 * the box search (`durationBounds`); never under two cadences, nor over a twentieth of the time that has data. Given
 * ones are only held to that last limit.
 */
export function chooseEventDurations(
  { x, cadenceDays, spanDays }: UsablePoints,
  densityCgs: number | undefined,
  given: readonly number[] | undefined,
): number[] {
  const longest = Math.min(spanDays, x.length * cadenceDays) / LEAST_WINDOWS;
  if (given !== undefined) return [...new Set(given)].filter((value) => value <= longest).sort((a, b) => a - b);
  const orbits = [SHORTEST_PERIOD_DAYS, Math.max(SHORTEST_PERIOD_DAYS, LONGEST_PERIOD_SPANS * spanDays)] as const;
  const durations = [...chooseDurations(...orbits, { densityCgs, cadenceDays })];
  return durations.filter((value) => value <= longest && value >= LEAST_CADENCES * cadenceDays * (1 - 1e-12));
}
