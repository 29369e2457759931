import type { SingleEvent } from '../contract/single-events-contract.ts';
import { type Ephemeris, eventsWithin } from '../core/ephemeris.ts';
import type { Interval } from '../core/interval.ts';
import { lowerBound } from '../core/shortest-unseen-period.ts';
import type { Lane } from '../plot/events-layer.ts';

/** More events than this in the whole series are not drawn one by one. */
const MOST_EVENTS = 4000;

/** The events of one ephemeris over a series, each with whether any point lies inside it. */
export function laneOf(
  ephemeris: Ephemeris,
  time: Float64Array,
  span: Interval,
  look: { readonly caseNumber: number | undefined; readonly selected: boolean },
): Lane {
  const half = ephemeris.durationDays / 2;
  const tooMany = (span.end - span.start) / ephemeris.periodDays > MOST_EVENTS;
  const events = tooMany ? [] : eventsWithin(ephemeris, span);
  return {
    ...look,
    durationDays: ephemeris.durationDays,
    events: events.map((event) => ({
      ...event,
      hasData: (time[lowerBound(time, event.timeDays - half)] ?? Number.POSITIVE_INFINITY) <= event.timeDays + half,
    })),
  };
}

/** Single dips that were found, in the order of time, in a lane of their own. */
export function singlesLane(events: readonly SingleEvent[]): Lane {
  const inTime = [...events].sort((a, b) => a.timeDays - b.timeDays);
  return {
    caseNumber: undefined,
    selected: false,
    durationDays: inTime[0]!.durationDays,
    events: inTime.map(({ timeDays }, index) => ({ cycle: index + 1, timeDays, hasData: true })),
  };
}
