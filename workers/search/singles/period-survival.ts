import type { Checkpoint } from '../../checkpoint.ts';
import type { EventEvidence } from './event-evidence.ts';

/** Trial periods lie so many durations apart at most, so that the next event moves by no more. */
const STEP_DURATIONS = 1 / 4;
/** A period that the data leave less than this chance is excluded, wholly. */
const LEAST_CHANCE = 0.01;

export interface Survival {
  /** Mean chance of each cell of periods, 0 to 1. */
  readonly chance: Float64Array;
  /** The shortest trial period that is not excluded; undefined when all are. */
  readonly shortestDays: number | undefined;
}

/**
 * What the data leave of each cell of periods of an event seen once: the chance that its other events, before and
 * after, are all absent as observed, averaged over trial periods that lie at most a quarter of a duration apart. Where
 * there are no data there is no objection; a dip at a predicted time is no support, for then the event would not be a
 * single one. Chances under 1 % count as 0. `shortestUnseenPeriod` is the bound above which all survive, if any point
 * inside an event shows it.
 *
 * @param x days, times of the points; @param event as `x`; @param edges days, cells + 1 of them, ascending
 * @returns undefined when cancelled
 */
export async function surviveAtPeriods(
  x: Float64Array,
  event: number,
  durationDays: number,
  evidence: EventEvidence,
  edges: Float64Array,
  checkpoint: Checkpoint,
): Promise<Survival | undefined> {
  const cells = edges.length - 1;
  const chance = new Float64Array(cells).fill(1);
  const span = { first: x[0]! - durationDays / 2, last: x.at(-1)! + durationDays / 2 };
  const reach = Math.max(event - span.first, span.last - event);
  let shortestDays: number | undefined;
  for (let cell = 0; cell < cells && edges[cell]! <= reach; cell += 1) {
    const width = edges[cell + 1]! - edges[cell]!;
    const trials = Math.ceil(width / (STEP_DURATIONS * durationDays));
    let sum = 0;
    for (let trial = 0; trial < trials; trial += 1) {
      const periodDays = edges[cell]! + (width * (trial + 0.5)) / trials;
      const chanceOfTrial = chanceOf(periodDays, event, span, evidence);
      if (chanceOfTrial > 0) shortestDays ??= periodDays;
      sum += chanceOfTrial;
    }
    chance[cell] = sum / trials;
    if (checkpoint.isDue() && !(await checkpoint.pause(cell, 2 * cells))) return undefined;
  }
  const unasked = edges.find((edge) => edge > reach);
  return { chance, shortestDays: shortestDays ?? unasked };
}

function chanceOf(
  periodDays: number,
  event: number,
  span: { readonly first: number; readonly last: number },
  evidence: EventEvidence,
): number {
  let objection = 0;
  const most = -2 * Math.log(LEAST_CHANCE);
  for (let time = event + periodDays; time <= span.last && objection <= most; time += periodDays)
    objection += Math.max(0, evidence.objectionAt(time, 0));
  for (let time = event - periodDays; time >= span.first && objection <= most; time -= periodDays)
    objection += Math.max(0, evidence.objectionAt(time, 0));
  return objection > most ? 0 : Math.exp(-objection / 2);
}
