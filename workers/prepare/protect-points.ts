import { type Ephemeris, phaseOf } from '../../src/core/ephemeris.ts';
import { contains, type Interval } from '../../src/core/interval.ts';

/** 1 where a time lies inside an event or an interval that a trend must not follow. */
export function protectPoints(
  time: Float64Array,
  events: readonly Ephemeris[],
  intervals: readonly Interval[],
): Uint8Array {
  const isInEvent = (at: number): boolean =>
    events.some(
      ({ periodDays, epochDays, durationDays }) =>
        Math.abs(phaseOf(at, periodDays, epochDays)) * periodDays <= durationDays / 2,
    );
  const isProtected = (at: number): boolean => isInEvent(at) || intervals.some((interval) => contains(interval, at));
  return Uint8Array.from(time, (at) => (isProtected(at) ? 1 : 0));
}
