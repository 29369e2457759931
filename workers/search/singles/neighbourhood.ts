import { MAD_TO_SIGMA, median, medianAbsoluteDeviation } from '../../../src/core/robust-statistics.ts';
import {
  BOTH_SIDES,
  fitTemplate,
  makeTemplateFit,
  SHOULDER_DURATIONS,
  significanceOf,
  solveTemplate,
  type Template,
  type TemplateFit,
} from './fit-template.ts';
import { countPoints, makeSeriesSums, type SeriesSums } from './series-sums.ts';
import { boundWithin, stretchAround } from './stretches.ts';
import { longestGapDays } from './template-search.ts';
import type { UsablePoints } from './usable-points.ts';

/** The window leaves a level for templates of up to so many of the candidate's durations. */
export const LONGEST_FACTOR = 1.6;
const BUMP_SIGMA = 5;

/** A template at a place. */
export interface PlacedTemplate extends Template {
  /** Days, as `x`. */
  readonly centre: number;
}

/** The points around a candidate, on running sums of their own: exact, and every template is held to the same points. */
export interface Neighbourhood {
  /** Index of its first point in the series. */
  readonly from: number;
  readonly sums: SeriesSums;
  /** Whether the candidate has a level on either side, so that a slope is fitted as well. */
  readonly hasSlope: boolean;
}

/**
 * The points that a template of up to 1.6 times the candidate's duration needs, cut at the gaps around it. Points beside
 * the candidate that stand far above the others there (flares, particle hits) have no weight: they would raise the level
 * and make a dip of what lies between.
 */
export function cutNeighbourhood(points: UsablePoints, { centre, ...template }: PlacedTemplate): Neighbourhood {
  const reach = (0.5 + SHOULDER_DURATIONS) * LONGEST_FACTOR * template.durationDays;
  const { from, end } = stretchAround(points.x, centre, reach, longestGapDays(template.durationDays));
  const x = points.x.subarray(from, end).map((value) => value - centre);
  const y = points.y.subarray(from, end);
  const weight = points.weight.slice(from, end);
  leaveOutBumps(x, y, weight, template.durationDays / 2);
  const sums = makeSeriesSums({ ...points, anchorDays: points.anchorDays + centre, x, y, weight });
  fitTemplate(sums, { from: 0, end: end - from }, 0, template, fit);
  return { from, sums, hasSlope: fit.sides === BOTH_SIDES };
}

function leaveOutBumps(x: Float64Array, y: Float64Array, weight: Float64Array, half: number): void {
  const beside = y.filter((_, i) => weight[i]! > 0 && Math.abs(x[i]!) > half);
  const middle = median(beside);
  const highest = middle + BUMP_SIGMA * medianAbsoluteDeviation(beside, middle) * MAD_TO_SIGMA;
  if (!(highest > middle)) return;
  for (let i = 0; i < x.length; i += 1) if (y[i]! > highest && Math.abs(x[i]!) > half) weight[i] = 0;
}

const fit = makeTemplateFit();

/**
 * Chi-square that a template takes away from level and slope alone, fitted to the whole neighbourhood: twice the log
 * of the likelihood ratio. 0 for a bump, or fewer than two points inside. `centre` is counted from the candidate's.
 */
export function improvementOf({ sums, hasSlope }: Neighbourhood, placed: PlacedTemplate): number {
  const { x } = sums.points;
  const first = boundWithin(x, placed.centre - placed.durationDays / 2, 0, x.length);
  const last = boundWithin(x, placed.centre + placed.durationDays / 2, first, x.length);
  if (countPoints(sums.before, first, last) < 2) return 0;
  solveTemplate(sums, 0, x.length, placed.centre, placed, hasSlope, fit);
  const significance = significanceOf(fit);
  return significance > 0 ? significance * significance : 0;
}

/** The fit by the rule of the search: level and slope from two durations on either side. */
export function fitPlaced({ sums }: Neighbourhood, placed: PlacedTemplate): TemplateFit {
  const found = makeTemplateFit();
  fitTemplate(sums, { from: 0, end: sums.points.x.length }, placed.centre, placed, found);
  return found;
}
