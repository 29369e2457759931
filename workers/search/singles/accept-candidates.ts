import type { SingleEvent } from '../../../src/contract/single-events-contract.ts';
import { isAtEdge } from './event-edges.ts';
import { estimateTimeError } from './event-errors.ts';
import { findLonePoint, isJump } from './false-events.ts';
import { significanceOf } from './fit-template.ts';
import { cutNeighbourhood, fitPlaced, type Neighbourhood, type PlacedTemplate } from './neighbourhood.ts';
import { refineTemplate } from './refine-template.ts';
import { makeMoments, takeMoments } from './series-sums.ts';
import { boundWithin } from './stretches.ts';
import type { Candidate, DurationSearch } from './template-search.ts';
import type { UsablePoints } from './usable-points.ts';

/** Candidates are looked at strongest first, and at most so many: on a restless star the rest is more of the same. */
const MOST_REFINED = 300;
/** Half-width, in durations, of what is taken out with an event. */
const TAKEN_OUT = 0.6;

export interface AcceptedEvent {
  readonly placed: PlacedTemplate;
  readonly event: SingleEvent;
}

export interface Acceptance {
  readonly accepted: AcceptedEvent[];
  /** Without the accepted events and lone points; the same object when nothing was taken out. */
  readonly points: UsablePoints;
  /** Where points were taken out this time, as `x`. */
  readonly changedAt: readonly number[];
}

/**
 * Goes through the candidates, strongest first, refines them and takes each event that still stands out and overlaps
 * none so far. Its points carry no weight from then on, so that neither its sides nor its shoulders make another.
 */
export function acceptCandidates(
  all: UsablePoints,
  start: UsablePoints,
  searches: readonly DurationSearch[],
  threshold: number,
  earlier: readonly AcceptedEvent[],
): Acceptance {
  const accepted = [...earlier];
  let points = start;
  const changedAt: number[] = [];
  let refined = 0;
  for (const candidate of rankCandidates(searches)) {
    if (refined === MOST_REFINED) break;
    const placed = { ...candidate.template, centre: candidate.centre };
    if (accepted.some((other) => overlaps(other.placed, placed))) continue;
    refined += 1;
    const judged = judge(all, points, searches, threshold, placed);
    if (judged === undefined) continue;
    if (typeof judged === 'number') {
      changedAt.push(points.x[judged]!);
      points = withoutWeight(points, judged, judged + 1);
    } else if (!accepted.some((other) => overlaps(other.placed, judged.placed))) {
      changedAt.push(judged.placed.centre);
      accepted.push(judged);
      points = withoutEvent(points, judged.placed);
    }
  }
  return { accepted, points, changedAt };
}

function rankCandidates(searches: readonly DurationSearch[]): Candidate[] {
  return searches.flatMap(({ candidates }) => candidates).sort((a, b) => b.signalToNoise - a.signalToNoise);
}

function overlaps(a: PlacedTemplate, b: PlacedTemplate): boolean {
  return Math.abs(a.centre - b.centre) < (a.durationDays + b.durationDays) / 2;
}

/** @returns undefined when it is none; the index of the point where it is but one point */
function judge(
  all: UsablePoints,
  points: UsablePoints,
  searches: readonly DurationSearch[],
  threshold: number,
  candidate: PlacedTemplate,
): AcceptedEvent | number | undefined {
  const placed = refineTemplate(points, candidate);
  const near = cutNeighbourhood(points, placed);
  const here = { ...placed, centre: 0 };
  const fit = fitPlaced(near, here);
  const noise = noiseNear(searches, placed.durationDays)?.at(placed.centre, fit.sides);
  if (noise === undefined || !(significanceOf(fit) / noise >= threshold)) return undefined;
  const lone = findLonePoint(near, here);
  if (lone !== undefined) return boundWithin(points.x, placed.centre + near.sums.points.x[lone]!, 0, points.x.length);
  const atEdge = isAtEdge(all, placed.centre, placed.durationDays) || !near.hasSlope;
  if (!atEdge && isJump(near, here)) return undefined;
  const signalToNoise = significanceOf(fit) / noise;
  const event: SingleEvent = {
    timeDays: all.anchorDays + placed.centre,
    timeErrorDays: estimateTimeError(all, placed, (fit.depth * Math.sqrt(weighFloor(near, here))) / noise),
    durationDays: placed.durationDays,
    shape: placed.ingressDays > 0 ? 'trapezoid' : 'box',
    depth: fit.depth,
    depthError: fit.depth / signalToNoise,
    signalToNoise,
    pointsInside: fit.pointsInside,
    coverage: Math.min(1, (fit.pointsInside * all.cadenceDays) / placed.durationDays),
    isAtEdge: atEdge,
  };
  return { placed, event };
}

/** Information on the depth, were the level known: the squared template summed over weights, for an even cadence. */
function weighFloor({ sums }: Neighbourhood, { centre, durationDays, ingressDays }: PlacedTemplate): number {
  const { x } = sums.points;
  const first = boundWithin(x, centre - durationDays / 2, 0, x.length);
  const last = boundWithin(x, centre + durationDays / 2, first, x.length);
  const { w } = takeMoments(sums.before, first, last, 0, makeMoments());
  return w * (1 - (4 / 3) * (ingressDays / durationDays));
}

/** The noise at the duration that is nearest in ratio. */
function noiseNear(searches: readonly DurationSearch[], durationDays: number): DurationSearch['noise'] {
  const distance = (search: DurationSearch): number => Math.abs(Math.log(search.durationDays / durationDays));
  return searches
    .filter(({ noise }) => noise !== undefined)
    .reduce((best, search) => (distance(search) < distance(best) ? search : best)).noise;
}

function withoutEvent(points: UsablePoints, { centre, durationDays }: PlacedTemplate): UsablePoints {
  const from = boundWithin(points.x, centre - TAKEN_OUT * durationDays, 0, points.x.length);
  return withoutWeight(points, from, boundWithin(points.x, centre + TAKEN_OUT * durationDays, from, points.x.length));
}

function withoutWeight(points: UsablePoints, from: number, end: number): UsablePoints {
  return { ...points, weight: points.weight.slice().fill(0, from, end) };
}
