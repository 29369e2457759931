/** Points from `from` up to and without `end`, with no gap between them that counts as one. */
export interface Stretch {
  readonly from: number;
  readonly end: number;
}

/** The series cut wherever two neighbours are more than `gapDays` apart. */
export function findStretches(x: Float64Array, gapDays: number): Stretch[] {
  const stretches: Stretch[] = [];
  let from = 0;
  for (let i = 1; i <= x.length; i += 1) {
    if (i < x.length && x[i]! - x[i - 1]! <= gapDays) continue;
    stretches.push({ from, end: i });
    from = i;
  }
  return stretches;
}

/** The stretch that a time lies in, or the one whose end is nearest. */
export function stretchAt(x: Float64Array, stretches: readonly Stretch[], centre: number): Stretch {
  let low = 0;
  let high = stretches.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (x[stretches[middle]!.end - 1]! < centre) low = middle + 1;
    else high = middle;
  }
  const after = stretches[low]!;
  const before = stretches[low - 1];
  if (before === undefined) return after;
  return centre - x[before.end - 1]! < x[after.from]! - centre ? before : after;
}

/** Index of the first of the points from `from` up to `end` that is not before `time`; `end` when all are. */
export function boundWithin(x: Float64Array, time: number, from: number, end: number): number {
  let low = from;
  let high = end;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (x[middle]! < time) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** The points within `reachDays` of a time, cut at the nearest gap of more than `gapDays` on either side of it. */
export function stretchAround(x: Float64Array, centre: number, reachDays: number, gapDays: number): Stretch {
  const after = boundWithin(x, centre, 0, x.length);
  const isBeforeNearer = after === x.length || (after > 0 && centre - x[after - 1]! < x[after]! - centre);
  let from = isBeforeNearer ? after - 1 : after;
  let end = from + 1;
  while (from > 0 && x[from]! - x[from - 1]! <= gapDays && centre - x[from - 1]! <= reachDays) from -= 1;
  while (end < x.length && x[end]! - x[end - 1]! <= gapDays && x[end]! - centre <= reachDays) end += 1;
  return { from, end };
}

/** The same where it lies not far after `from`. */
export function advanceTo(x: Float64Array, time: number, from: number, end: number): number {
  let i = from;
  while (i < end && x[i]! < time) i += 1;
  return i;
}
