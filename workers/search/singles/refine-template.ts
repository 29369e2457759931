import {
  cutNeighbourhood,
  improvementOf,
  LONGEST_FACTOR,
  type Neighbourhood,
  type PlacedTemplate,
} from './neighbourhood.ts';
import { boundWithin } from './stretches.ts';
import type { UsablePoints } from './usable-points.ts';

/** What a refinement starts from: durations in the candidate's, ingresses and shifts in the duration. */
const DURATION_FACTORS = [0.55, 0.65, 0.78, 0.92, 1.08, 1.28, 1.5];
const INGRESS_FRACTIONS = [0.1, 0.25, 0.45];
const SHIFTS = Array.from({ length: 17 }, (_, i) => (i - 8) / 20);
/** Pattern search: first step in durations, halved this often. */
const FIRST_STEP = 0.06;
const HALVINGS = 6;
const MOST_ROUNDS = 60;
const LEAST_INGRESS_FRACTION = 0.03;
const LEAST_CADENCES = 1.5;
/** A trapezoid has one parameter more than a box: the price of it by Akaike (1974), IEEE Trans. Aut. Control 19, 716. */
const PRICE_OF_INGRESS = 2;
/** A duration that changed by more wants a window of its own size. */
const CHANGED = 1.15;

/**
 * The likeliest box or trapezoid near a candidate: centre, duration and ingress maximise what it takes off chi-square,
 * on a grid and then by a pattern search. A box's edges come out midway between the points that they part.
 *
 * @param longestDays no template is longer: noise is not known at such durations
 */
export function refineTemplate(points: UsablePoints, candidate: PlacedTemplate, longestDays: number): PlacedTemplate {
  const first = refineOnce(points, candidate, longestDays);
  const ratio = first.durationDays / candidate.durationDays;
  return ratio > CHANGED || ratio < 1 / CHANGED ? refineOnce(points, first, longestDays) : first;
}

function refineOnce(points: UsablePoints, candidate: PlacedTemplate, longestDays: number): PlacedTemplate {
  const near = cutNeighbourhood(points, candidate);
  const limits = {
    least: LEAST_CADENCES * points.cadenceDays,
    most: Math.min(longestDays, LONGEST_FACTOR * candidate.durationDays),
    unit: candidate.durationDays,
    first: near.sums.points.x[0]!,
    last: near.sums.points.x.at(-1)!,
  };
  const box = settleEdges(near, polish(near, scan(near, limits, [0]), limits));
  const trapezoid = polish(near, scan(near, limits, INGRESS_FRACTIONS), limits);
  const isSloped = improvementOf(near, trapezoid) > improvementOf(near, box) + PRICE_OF_INGRESS;
  const best = isSloped ? trapezoid : box;
  return { ...best, centre: candidate.centre + best.centre };
}

interface Limits {
  readonly least: number;
  readonly most: number;
  /** The candidate's duration. */
  readonly unit: number;
  /** A mid-time outside the data is a guess. */
  readonly first: number;
  readonly last: number;
}

function scan(near: Neighbourhood, limits: Limits, ingressFractions: readonly number[]): PlacedTemplate {
  const trials = DURATION_FACTORS.flatMap((factor) => {
    const durationDays = Math.max(limits.least, Math.min(limits.most, factor * limits.unit));
    return ingressFractions.flatMap((fraction) =>
      SHIFTS.map((shift) => {
        const centre = Math.max(limits.first, Math.min(limits.last, shift * limits.unit));
        return { centre, durationDays, ingressDays: fraction * durationDays };
      }),
    );
  });
  return bestOf(near, trials[0]!, trials);
}

function bestOf(near: Neighbourhood, start: PlacedTemplate, trials: readonly PlacedTemplate[]): PlacedTemplate {
  let best = start;
  let most = improvementOf(near, start);
  for (const trial of trials) {
    const improvement = improvementOf(near, trial);
    if (!(improvement > most)) continue;
    most = improvement;
    best = trial;
  }
  return best;
}

function polish(near: Neighbourhood, start: PlacedTemplate, limits: Limits): PlacedTemplate {
  let best = start;
  let step = FIRST_STEP * start.durationDays;
  let halvings = 0;
  for (let round = 0; round < MOST_ROUNDS && halvings <= HALVINGS; round += 1) {
    const better = bestOf(near, best, neighboursOf(best, step, limits));
    if (better === best) {
      step /= 2;
      halvings += 1;
    }
    best = better;
  }
  return best;
}

/** Moved as a whole, by either edge, and with its ingress longer or shorter. */
function neighboursOf(placed: PlacedTemplate, step: number, limits: Limits): PlacedTemplate[] {
  const { centre, durationDays, ingressDays } = placed;
  const moved = [-step, step].flatMap((by) => [
    { ...placed, centre: centre + by },
    { ...placed, centre: centre + by / 2, durationDays: durationDays + by },
    { ...placed, centre: centre - by / 2, durationDays: durationDays + by },
    { ...placed, durationDays: durationDays + by },
    ...(ingressDays > 0 ? [{ ...placed, ingressDays: ingressDays + by }] : []),
  ]);
  return moved.filter((trial) => isWithin(trial, limits));
}

function isWithin({ centre, durationDays, ingressDays }: PlacedTemplate, limits: Limits): boolean {
  if (durationDays < limits.least || durationDays > limits.most) return false;
  if (centre < limits.first || centre > limits.last) return false;
  return ingressDays === 0 || (ingressDays >= LEAST_INGRESS_FRACTION * durationDays && ingressDays <= durationDays / 2);
}

/** Any edge between the same two points fits equally well: the middle is taken, but within a cadence of the points. */
function settleEdges({ sums: { points } }: Neighbourhood, placed: PlacedTemplate): PlacedTemplate {
  const { x, cadenceDays } = points;
  const first = boundWithin(x, placed.centre - placed.durationDays / 2, 0, x.length);
  const last = boundWithin(x, placed.centre + placed.durationDays / 2, first, x.length) - 1;
  if (last <= first) return placed;
  const start = x[first]! - Math.min(cadenceDays, x[first]! - (x[first - 1] ?? x[first]! - cadenceDays)) / 2;
  const end = x[last]! + Math.min(cadenceDays, (x[last + 1] ?? x[last]! + cadenceDays) - x[last]!) / 2;
  const isCut = placed.centre - placed.durationDays / 2 < x[0]! || placed.centre + placed.durationDays / 2 > x.at(-1)!;
  return isCut ? placed : { ...placed, centre: (start + end) / 2, durationDays: end - start };
}
