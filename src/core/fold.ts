/**
 * Folds times at a period.
 *
 * @param time days, length n; NaN gives NaN
 * @param out length n or more, filled in place; leave it out once, then hand it back on each frame of a drag
 * @returns phases in cycles from mid-event, in [-0.5, 0.5)
 */
export function foldAtPeriod(
  time: Float64Array,
  periodDays: number,
  epochDays: number,
  out: Float64Array = new Float64Array(time.length),
): Float64Array {
  const perDay = 1 / periodDays;
  for (let i = 0; i < time.length; i += 1) {
    const cycles = (time[i]! - epochDays) * perDay;
    out[i] = cycles - Math.floor(cycles + 0.5);
  }
  return out;
}
