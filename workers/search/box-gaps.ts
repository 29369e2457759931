import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { cycleOf, type Ephemeris } from '../../src/core/ephemeris.ts';

type Times = Pick<SearchSeries, 'time'>;

/** Where the edges of a box may lie without gaining or losing a point: nearest folded points, days from mid-event. */
export interface EdgeGaps {
  readonly leading: readonly [number, number];
  readonly trailing: readonly [number, number];
}

/** An edge with no point within a duration beyond it is taken to reach half a duration out. */
export function findEdgeGaps({ time }: Times, { periodDays, epochDays, durationDays }: Ephemeris): EdgeGaps {
  const half = durationDays / 2;
  const leading: [number, number] = [-durationDays, half];
  const trailing: [number, number] = [-half, durationDays];
  for (let i = 0; i < time.length; i += 1) {
    const x = time[i]! - epochDays - cycleOf(time[i]!, periodDays, epochDays) * periodDays;
    if (x < -half) leading[0] = Math.max(leading[0], x);
    else if (x > half) trailing[1] = Math.min(trailing[1], x);
    else {
      leading[1] = Math.min(leading[1], x);
      trailing[0] = Math.max(trailing[0], x);
    }
  }
  return { leading, trailing };
}

/** By how much the period may change, down and up in days, before a box gains or loses a point; epoch held. */
export function findPeriodGap(
  { time }: Times,
  { periodDays, epochDays, durationDays }: Ephemeris,
): readonly [number, number] {
  const half = durationDays / 2;
  let down = Number.NEGATIVE_INFINITY;
  let up = Number.POSITIVE_INFINITY;
  for (let i = 0; i < time.length; i += 1) {
    const cycle = cycleOf(time[i]!, periodDays, epochDays);
    const x = time[i]! - epochDays - cycle * periodDays;
    if (cycle === 0 || Math.abs(x) > durationDays) continue;
    for (const edge of [-half, half]) {
      const change = (x - edge) / cycle;
      if (change >= 0) up = Math.min(up, change);
      else down = Math.max(down, change);
    }
  }
  return Number.isFinite(down) && Number.isFinite(up) ? [down, up] : [0, 0];
}
