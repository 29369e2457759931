import type { CovariateRegression } from '../../src/core/recipe.ts';
import type { Group } from './regress.ts';

/** Days without a point that part one night from the next (common practice). */
const NIGHT_GAP_DAYS = 0.3;

/** Runs of points that share one set of coefficients. @param segmentStarts indices among these points */
export function regressionGroups(
  time: Float64Array,
  segmentStarts: readonly number[],
  per: CovariateRegression['per'],
): Group[] {
  if (per === 'series') return [{ first: 0, end: time.length }];
  const begins = new Set(segmentStarts);
  const isNew = (i: number): boolean => (per === 'segment' ? begins.has(i) : time[i]! - time[i - 1]! > NIGHT_GAP_DAYS);
  const groups: Group[] = [];
  let first = 0;
  for (let i = 1; i <= time.length; i += 1) {
    if (i < time.length && !isNew(i)) continue;
    groups.push({ first, end: i });
    first = i;
  }
  return groups;
}
