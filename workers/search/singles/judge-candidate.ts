import type { SingleEvent } from '../../../src/contract/single-events-contract.ts';
import { isAtEdge } from './event-edges.ts';
import { estimateTimeError } from './event-errors.ts';
import { findLonePoint, isJump } from './false-events.ts';
import { significanceOf, type TemplateFit } from './fit-template.ts';
import { cutNeighbourhood, fitPlaced, type Neighbourhood, type PlacedTemplate } from './neighbourhood.ts';
import { refineTemplate } from './refine-template.ts';
import { makeMoments, takeMoments } from './series-sums.ts';
import { boundWithin } from './stretches.ts';
import type { DurationSearch } from './template-search.ts';
import type { UsablePoints } from './usable-points.ts';

const BEYOND_LONGEST = 1.2;

export interface AcceptedEvent {
  readonly placed: PlacedTemplate;
  readonly event: SingleEvent;
}

/**
 * Refines a candidate and decides whether it is an event.
 *
 * @param all every point, for what is known of gaps; @param points without what was taken out before
 * @returns undefined when it is none, being too weak or a jump of the level; the index of the point where it is but one
 */
export function judgeCandidate(
  all: UsablePoints,
  points: UsablePoints,
  searches: readonly DurationSearch[],
  threshold: number,
  candidate: PlacedTemplate,
): AcceptedEvent | number | undefined {
  const placed = refineTemplate(points, candidate, longestKnown(searches));
  const near = cutNeighbourhood(points, placed);
  const here = { ...placed, centre: 0 };
  const fit = fitPlaced(near, here);
  const noise = noiseNear(searches, placed.durationDays)?.at(placed.centre, fit.sides);
  if (noise === undefined || !(significanceOf(fit) / noise >= threshold)) return undefined;
  const lone = findLonePoint(near, here);
  if (lone !== undefined) return near.from + lone;
  const atEdge = isAtEdge(all, placed.centre, placed.durationDays) || !near.hasSlope;
  if (!atEdge && isJump(near, here)) return undefined;
  const timingSignal = (fit.depth * Math.sqrt(weighFloor(near, here))) / noise;
  const timeErrorDays = estimateTimeError(all, placed, timingSignal);
  return { placed, event: { ...describeEvent(all, placed, fit, noise), timeErrorDays, isAtEdge: atEdge } };
}

function describeEvent(
  { anchorDays, cadenceDays }: UsablePoints,
  { centre, durationDays, ingressDays }: PlacedTemplate,
  fit: TemplateFit,
  noise: number,
): Omit<SingleEvent, 'timeErrorDays' | 'isAtEdge'> {
  const signalToNoise = significanceOf(fit) / noise;
  return {
    timeDays: anchorDays + centre,
    durationDays,
    shape: ingressDays > 0 ? 'trapezoid' : 'box',
    depth: fit.depth,
    depthError: fit.depth / signalToNoise,
    signalToNoise,
    pointsInside: fit.pointsInside,
    coverage: Math.min(1, (fit.pointsInside * cadenceDays) / durationDays),
  };
}

/** Information on the depth, were the level known: the squared template summed over weights, for an even cadence. */
function weighFloor({ sums }: Neighbourhood, { centre, durationDays, ingressDays }: PlacedTemplate): number {
  const { x } = sums.points;
  const first = boundWithin(x, centre - durationDays / 2, 0, x.length);
  const last = boundWithin(x, centre + durationDays / 2, first, x.length);
  const { w } = takeMoments(sums.before, first, last, 0, makeMoments());
  return w * (1 - (4 / 3) * (ingressDays / durationDays));
}

/** As far beyond the longest duration of known noise as refinement between two durations reaches. */
function longestKnown(searches: readonly DurationSearch[]): number {
  const known = searches.filter(({ noise }) => noise !== undefined).map(({ durationDays }) => durationDays);
  return BEYOND_LONGEST * Math.max(...known);
}

/** The noise at the duration that is nearest in ratio. */
function noiseNear(searches: readonly DurationSearch[], durationDays: number): DurationSearch['noise'] {
  const distance = (search: DurationSearch): number => Math.abs(Math.log(search.durationDays / durationDays));
  return searches
    .filter(({ noise }) => noise !== undefined)
    .reduce((best, search) => (distance(search) < distance(best) ? search : best)).noise;
}
