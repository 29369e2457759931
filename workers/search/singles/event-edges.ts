import { boundWithin } from './stretches.ts';
import type { UsablePoints } from './usable-points.ts';

/** Steps longer than so many cadences, and than this part of the event, are gaps. */
const GAP_CADENCES = 3;
const GAP_DURATIONS = 1 / 20;

/** Whether a gap, the start or the end of the series lies in the event or within half a duration of it. */
export function isAtEdge({ x, cadenceDays }: UsablePoints, centre: number, durationDays: number): boolean {
  const gapDays = Math.max(GAP_CADENCES * cadenceDays, GAP_DURATIONS * durationDays);
  const from = boundWithin(x, centre - durationDays, 0, x.length);
  const end = boundWithin(x, centre + durationDays, from, x.length);
  if (from === 0 || end === x.length) return true;
  for (let i = from; i <= end; i += 1) if (x[i]! - x[i - 1]! > gapDays) return true;
  return false;
}
