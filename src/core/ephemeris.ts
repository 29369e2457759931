import type { Interval } from './interval.ts';

/** A strictly periodic signal: mid-event times are epoch + n * period. Days, in the light curve's time reference. */
export interface Ephemeris {
  readonly periodDays: number;
  readonly epochDays: number;
  readonly durationDays: number;
}

/** The timing of a case, of one of the kinds that the design names. Days throughout. */
export type Timing =
  | (Ephemeris & {
      readonly kind: 'linear';
      readonly periodErrorDays?: number | undefined;
      readonly epochErrorDays?: number | undefined;
      readonly durationErrorDays?: number | undefined;
      /** Covariance of period and epoch in days squared. */
      readonly periodEpochCovariance?: number | undefined;
    })
  | {
      readonly kind: 'alias set';
      readonly epochDays: number;
      readonly durationDays: number;
      readonly periods: readonly { readonly periodDays: number; readonly weight: number }[];
    }
  | {
      readonly kind: 'event list';
      readonly durationDays: number;
      readonly events: readonly { readonly timeDays: number; readonly errorDays?: number | undefined }[];
    }
  | {
      readonly kind: 'single';
      readonly timeDays: number;
      readonly durationDays: number;
      readonly shortestPeriodDays?: number | undefined;
      readonly longestPeriodDays?: number | undefined;
      /** Posterior of the period: its median and central 68 %. */
      readonly likelyPeriodDays?: number | undefined;
      readonly likelyFromDays?: number | undefined;
      readonly likelyToDays?: number | undefined;
    }
  | { readonly kind: 'aperiodic'; readonly durationDays: number; readonly times: readonly number[] };

export type TimingKind = Timing['kind'];

/** Phase in cycles from mid-event, in [-0.5, 0.5). */
export function phaseOf(time: number, periodDays: number, epochDays: number): number {
  const cycles = (time - epochDays) / periodDays;
  return cycles - Math.floor(cycles + 0.5);
}

/** Number of the cycle whose mid-event time lies nearest. */
export function cycleOf(time: number, periodDays: number, epochDays: number): number {
  return Math.floor((time - epochDays) / periodDays + 0.5);
}

/** Mid-event times of a linear ephemeris that fall in a span (an event half inside still counts). */
export function eventsWithin(ephemeris: Ephemeris, span: Interval): { cycle: number; timeDays: number }[] {
  const { periodDays, epochDays, durationDays } = ephemeris;
  const half = durationDays / 2;
  const first = Math.ceil((span.start - half - epochDays) / periodDays);
  const last = Math.floor((span.end + half - epochDays) / periodDays);
  const events: { cycle: number; timeDays: number }[] = [];
  for (let cycle = first; cycle <= last; cycle += 1) events.push({ cycle, timeDays: epochDays + cycle * periodDays });
  return events;
}
