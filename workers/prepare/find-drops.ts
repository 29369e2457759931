import { medianInPlace, pointToPointScatter } from '../../src/core/robust-statistics.ts';

/** Levels are compared between the points of this many days before and after a place. */
const SIDE_DAYS = 0.5;
const LEAST_SIDE_POINTS = 5;
const MOST_SIDE_POINTS = 60;
/** A fall between the two levels of so many of their common errors, and so many times the scatter of a point. */
const FALL_SIGMA = 8;
const LEAST_FALL = 5;
/** What is a dip is back up after so long: the level there must still be low. */
const DIP_DAYS = 1;
/** The part of the fall that must be left by then: a drop recovers slowly. */
const LEAST_LEFT = 0.35;
/** The steepest place is looked for within so many points. */
const MOST_STEPS = 3;

/**
 * Sudden drops of sensitivity: the level falls within three points by over eight of its errors, and a day later over a
 * third of the fall is still there. A dip comes back within a day and is none, however deep; a slow decline is none.
 * The description of such drops is common practice; the thresholds are ours.
 *
 * @param time days, ascending, length n; @param flux relative, length n
 * @returns indices of the first low points, ascending
 */
export function findDrops(time: Float64Array, flux: Float64Array): number[] {
  const sigma = pointToPointScatter(flux);
  if (!(sigma > 0)) return [];
  const drops: number[] = [];
  for (let i = LEAST_SIDE_POINTS; i + LEAST_SIDE_POINTS < time.length; i += 1) {
    // Cheap look first: between three points before and after.
    if (flux[i - 1]! - flux[i]! < sigma && flux[i - 1]! - flux[i + 1]! < sigma) continue;
    const fall = fallAt(time, flux, i, sigma);
    if (fall === undefined) continue;
    const strongest = strongestNear(time, flux, i, fall, sigma);
    drops.push(strongest.index);
    i = strongest.index + MOST_STEPS;
  }
  return drops;
}

/** The steepest place within the next few points is the drop's. */
function strongestNear(time: Float64Array, flux: Float64Array, from: number, fall: number, sigma: number) {
  let best = { index: from, fall };
  for (let i = from + 1; i <= Math.min(from + MOST_STEPS, time.length - 1); i += 1) {
    const other = fallAt(time, flux, i, sigma);
    if (other !== undefined && other > best.fall) best = { index: i, fall: other };
  }
  return best;
}

/** By how much the level falls at a place, where it is a drop. */
function fallAt(time: Float64Array, flux: Float64Array, index: number, sigma: number): number | undefined {
  const before = levelOf(time, flux, index - 1, -1, SIDE_DAYS);
  const after = levelOf(time, flux, index, 1, SIDE_DAYS);
  if (before === undefined || after === undefined) return undefined;
  const fall = before.level - after.level;
  const error = sigma * Math.sqrt(1.57 / before.count + 1.57 / after.count);
  if (fall < FALL_SIGMA * error || fall < LEAST_FALL * sigma) return undefined;
  // Most of it between neighbours: an ingress or a slow decline is spread over many.
  if (!isSudden(flux, index, fall)) return undefined;
  const later = levelOf(time, flux, firstAfter(time, index, time[index]! + DIP_DAYS), 1, SIDE_DAYS);
  if (later === undefined) return undefined;
  return before.level - later.level >= LEAST_LEFT * fall ? fall : undefined;
}

/** Of the fall, at least this part happens between the few points before and after. */
const LEAST_SUDDEN = 0.6;
const NEAR_POINTS = 3;

function isSudden(flux: Float64Array, index: number, fall: number): boolean {
  const before = flux.slice(Math.max(0, index - NEAR_POINTS), index);
  const after = flux.slice(index, index + NEAR_POINTS);
  return medianInPlace(before, before.length) - medianInPlace(after, after.length) >= LEAST_SUDDEN * fall;
}

function firstAfter(time: Float64Array, from: number, value: number): number {
  let i = from;
  while (i < time.length && time[i]! < value) i += 1;
  return i;
}

/** Median of the points from one on, in one direction. */
function levelOf(
  time: Float64Array,
  flux: Float64Array,
  from: number,
  direction: 1 | -1,
  days: number,
): { level: number; count: number } | undefined {
  const values = new Float64Array(MOST_SIDE_POINTS);
  let count = 0;
  for (let i = from; i >= 0 && i < time.length && count < MOST_SIDE_POINTS; i += direction) {
    if (Math.abs(time[i]! - time[from]!) > days) break;
    values[count] = flux[i]!;
    count += 1;
  }
  return count < LEAST_SIDE_POINTS ? undefined : { level: medianInPlace(values, count), count };
}
