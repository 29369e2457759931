import { makeTemplateFit, significanceOf, solveTemplate } from './fit-template.ts';
import { fitPlaced, improvementOf, type Neighbourhood, type PlacedTemplate } from './neighbourhood.ts';
import { makeSeriesSums } from './series-sums.ts';
import { boundWithin } from './stretches.ts';

/** An event that loses more than this part of its S/N with one point is that point. */
const LONE_POINT_LOSS = 0.5;
/** Places of a jump that are tried, from one duration before the event to one after it. */
const JUMP_TRIALS = 40;

/**
 * The one point that an event stands on: without it, S/N falls to less than half. Two equal points would leave 0.7.
 *
 * @returns its index in the neighbourhood; undefined when the event stands on more
 */
export function findLonePoint(near: Neighbourhood, placed: PlacedTemplate): number | undefined {
  const { points } = near.sums;
  const first = boundWithin(points.x, placed.centre - placed.durationDays / 2, 0, points.x.length);
  const last = boundWithin(points.x, placed.centre + placed.durationDays / 2, first, points.x.length);
  let lone = first;
  for (let i = first; i < last; i += 1)
    if (points.weight[i]! * points.y[i]! < points.weight[lone]! * points.y[lone]!) lone = i;
  const weight = points.weight.slice();
  weight[lone] = 0;
  const without = { ...near, sums: makeSeriesSums({ ...points, weight }) };
  const left = significanceOf(fitPlaced(without, placed));
  return left < LONE_POINT_LOSS * significanceOf(fitPlaced(near, placed)) ? lone : undefined;
}

const fit = makeTemplateFit();

/** Whether a lasting jump of the level, up or down, anywhere within a duration of the event explains the data better. */
export function isJump(near: Neighbourhood, placed: PlacedTemplate): boolean {
  const { sums, hasSlope } = near;
  const n = sums.points.x.length;
  const toEnd = sums.points.x[n - 1]! + placed.durationDays;
  const event = improvementOf(near, placed);
  for (let i = 0; i <= JUMP_TRIALS; i += 1) {
    const start = placed.centre + ((2 * i) / JUMP_TRIALS - 1) * placed.durationDays;
    const jump = { durationDays: toEnd - start, ingressDays: 0 };
    if (!(jump.durationDays > 0)) continue;
    solveTemplate(sums, 0, n, start + jump.durationDays / 2, jump, hasSlope, fit);
    if (significanceOf(fit) ** 2 > event) return true;
  }
  return false;
}
