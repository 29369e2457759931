/** A span of time in days, `start` <= `end`, in the time reference of its light curve. */
export interface Interval {
  readonly start: number;
  readonly end: number;
}

export function contains(interval: Interval, time: number): boolean {
  return time >= interval.start && time <= interval.end;
}
