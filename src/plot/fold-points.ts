/**
 * Folds times into hours from the nearest mid-event, in [-period/2, period/2).
 *
 * @param time days, length n; NaN gives NaN
 * @param out length n or more, filled in place so that a drag allocates nothing
 */
export function foldHours(time: Float64Array, periodDays: number, epochDays: number, out: Float64Array): void {
  const perDay = 1 / periodDays;
  const hours = periodDays * 24;
  for (let i = 0; i < time.length; i += 1) {
    const cycles = (time[i]! - epochDays) * perDay;
    out[i] = (cycles - Math.floor(cycles + 0.5)) * hours;
  }
}

/** Phase in cycles in [-0.25, 0.75), so that the event and the middle of the rest both stand clear of the edges. */
export function foldPhases(time: Float64Array, periodDays: number, epochDays: number, out: Float64Array): void {
  const perDay = 1 / periodDays;
  for (let i = 0; i < time.length; i += 1) {
    const cycles = (time[i]! - epochDays) * perDay;
    out[i] = cycles - Math.floor(cycles + 0.25);
  }
}
