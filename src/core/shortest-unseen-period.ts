/** An event counts as covered when at least this many points lie inside it. */
const POINTS_TO_SEE = 2;

/**
 * The shortest period that a single event can have: for every longer one, no other event of it falls on data.
 * A shorter period may still hide in the gaps; this is the bound beyond which nothing needs to hide.
 *
 * @param time days, ascending; @param eventDays mid-event; @param durationDays of the event
 * @returns days, to half a duration
 */
export function shortestUnseenPeriod(time: Float64Array, eventDays: number, durationDays: number): number {
  const first = time[0] ?? eventDays;
  const last = time.at(-1) ?? eventDays;
  const step = durationDays / 2;
  const reach = Math.max(eventDays - first, last - eventDays) + durationDays;
  for (let period = reach; period > durationDays; period -= step)
    if (isSeen(time, eventDays + period, durationDays) || isSeen(time, eventDays - period, durationDays))
      return period + step;
  return durationDays;
}

function isSeen(time: Float64Array, eventDays: number, durationDays: number): boolean {
  const from = lowerBound(time, eventDays - durationDays / 2);
  return (time[from + POINTS_TO_SEE - 1] ?? Number.POSITIVE_INFINITY) <= eventDays + durationDays / 2;
}

/** Index of the first value that is not below `value`. */
export function lowerBound(ascending: Float64Array, value: number): number {
  let low = 0;
  let high = ascending.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ascending[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low;
}
