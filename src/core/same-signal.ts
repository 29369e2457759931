import type { Ephemeris } from './ephemeris.ts';

/**
 * Two ephemerides are the same signal when the drift that they accumulate over the span stays under half a duration.
 *
 * @param spanDays of the series
 */
export function isSameSignal(
  a: Ephemeris,
  b: Pick<Ephemeris, 'periodDays' | 'durationDays'>,
  spanDays: number,
): boolean {
  const cycles = Math.max(1, spanDays / Math.max(a.periodDays, b.periodDays));
  return Math.abs(a.periodDays - b.periodDays) * cycles < Math.max(a.durationDays, b.durationDays) / 2;
}
