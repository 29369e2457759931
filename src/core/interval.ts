/** A span of time in days, `start` <= `end`, in the time reference of its light curve. */
export interface Interval {
  readonly start: number;
  readonly end: number;
}

/** The interval between two times given in any order. */
export function intervalBetween(a: number, b: number): Interval {
  return a <= b ? { start: a, end: b } : { start: b, end: a };
}

export function contains(interval: Interval, time: number): boolean {
  return time >= interval.start && time <= interval.end;
}

export function overlaps(a: Interval, b: Interval): boolean {
  return a.start <= b.end && b.start <= a.end;
}
