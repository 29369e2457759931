/** A stretch of a series without a split. All arrays of length n. */
export interface Stretch {
  /** Days, ascending. */
  readonly time: Float64Array;
  readonly flux: Float64Array;
  /** Median of five points around each. */
  readonly level: Float64Array;
  /** Median of more, where the cadence is fast. */
  readonly smooth: Float64Array;
  readonly cadenceDays: number;
  /** Scatter of one point. */
  readonly sigma: number;
}

/** Parts of the fall: what is above the first is still down, what is under the second is back. */
const DOWN_PART = 0.7;
const BACK_PART = 0.3;
/** What is not back after so long, and what lasts longer than any usual dip. */
const LOOK_DAYS = 3;
const LEAST_LOW_DAYS = 1;
/** The way back from down to up over the whole time below: near 0 for a box, 0.24 for a V, 0.7 for an exponential. */
const LEAST_SLOW_PART = 0.45;
/** A recovery takes hours; faster ones are left to the trend. */
const LEAST_RECOVERY_DAYS = 2 / 24;
const LEAST_RECOVERY_CADENCES = 6;

/** A rise by this part of the fall, as sudden, is the end of a dip. */
const RISE_PART = 0.5;

/**
 * Whether the flux after a fall comes back slowly or not at all. It does not when it rises as suddenly as it fell, as
 * after a dip, within three days; nor when it is back within that time by a way that is short against the time below;
 * nor when too little of what follows was seen to tell: less than a day, or, across a gap, a return within a day.
 *
 * @param index first point after the fall; @param fall between the levels three points before and after
 */
export function staysLow(stretch: Stretch, index: number, fall: number, isAcrossGap: boolean): boolean {
  const { time, smooth, level, cadenceDays } = stretch;
  if (risesSuddenly(stretch, index, RISE_PART * fall)) return false;
  const before = level[index - 3]!;
  const depth = before - lowAfter(stretch, index);
  let back = index + 1;
  while (back < time.length && time[back]! - time[index]! <= LOOK_DAYS && before - smooth[back]! >= BACK_PART * depth)
    back += 1;
  const lowDays = time[Math.min(back, time.length - 1)]! - time[index]!;
  if (back === time.length) return lowDays >= LEAST_LOW_DAYS;
  if (lowDays > LOOK_DAYS) return true;
  if (isAcrossGap && lowDays < LEAST_LOW_DAYS) return false;
  if (lowDays < Math.max(LEAST_RECOVERY_DAYS, LEAST_RECOVERY_CADENCES * cadenceDays)) return false;
  let down = back - 1;
  while (down > index && before - smooth[down]! < DOWN_PART * depth) down -= 1;
  return time[back]! - time[down]! >= LEAST_SLOW_PART * (time[back]! - time[index]!);
}

/** Whether the flux rises by so much between neighbouring points within three days. */
function risesSuddenly({ time, flux, level }: Stretch, index: number, least: number): boolean {
  for (let i = index + 3; i + 3 < time.length && time[i]! - time[index]! <= LOOK_DAYS; i += 1) {
    if (level[i + 3]! - level[i - 3]! < least) continue;
    if (middleOf(flux, i + 1) - middleOf(flux, i - 3) >= least) return true;
  }
  return false;
}

/** The middle one of the first three points, or the level of the next five where that is lower. */
function lowAfter({ flux, level }: Stretch, index: number): number {
  return Math.min(middleOf(flux, index), level[index + 3]!);
}

/** Of three points from one on. */
function middleOf(flux: Float64Array, first: number): number {
  const [a, b, c] = [flux[first]!, flux[first + 1]!, flux[first + 2]!];
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}
