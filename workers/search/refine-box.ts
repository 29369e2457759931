import type { SearchSeries } from '../../src/contract/search-contract.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import { LARGEST_DUTY_CYCLE } from './box-durations.ts';
import { findEdgeGaps, findPeriodGap } from './box-gaps.ts';
import type { BoxWork } from './box-search.ts';
import { measureEvents } from './event-sums.ts';

/** The neighbourhood of a trial is tried on a lattice: period, epoch and duration. */
const EPOCH_STEPS = [-0.42, -0.35, -0.28, -0.21, -0.14, -0.07, 0, 0.07, 0.14, 0.21, 0.28, 0.35, 0.42];
const DURATION_FACTORS = [0.7, 0.8, 0.9, 1, 1.12, 1.26, 1.42];
/** Trial periods let an event at the end of the span drift by this part of its duration. */
const PERIOD_DRIFT = 1 / 12;
const MOST_PERIODS = 40;
/** The polish starts with steps of this part of the duration and halves them this often. */
const FIRST_STEP = 1 / 24;
const HALVINGS = 6;
const MOST_ROUNDS = 60;

/** Lowest and highest period that a refinement may reach: the neighbours of a trial. */
export interface PeriodReach {
  readonly from: number;
  readonly to: number;
}

/**
 * Maximises the box S/N near a trial over period, epoch and duration, exactly, on the unbinned series: first on a
 * lattice between the neighbouring trials, then by a pattern search that moves the period, the box and each of its
 * edges. The epoch comes out in the middle of the span, and each edge midway between the points it parts.
 */
export function refineBox(series: SearchSeries, work: BoxWork, start: Ephemeris, reach: PeriodReach): Ephemeris {
  const span = spanOf(series);
  const starts = tryLattice(work, moveToMiddle(series, start), reach, span);
  const polished = starts.map((near) => polish(work, span, near));
  const best = polished.reduce((better, one) => (signalOf(work, one) > signalOf(work, better) ? one : better));
  return settle(series, work, best);
}

const spanOf = ({ time }: SearchSeries): number => time.at(-1)! - time[0]!;

/** The best of the lattice for each duration: a pattern search from one alone may end in a side maximum. */
function tryLattice(work: BoxWork, start: Ephemeris, { from, to }: PeriodReach, span: number): Ephemeris[] {
  const step = (2 * PERIOD_DRIFT * start.durationDays * start.periodDays) / span;
  const count = Math.max(2, Math.min(MOST_PERIODS, Math.ceil((to - from) / step)));
  return DURATION_FACTORS.map((factor) => {
    const durationDays = start.durationDays * factor;
    let best = { ...start, durationDays };
    let bestSignal = 0;
    for (let i = 0; i <= count; i += 1)
      for (const shift of EPOCH_STEPS) {
        const periodDays = from + ((to - from) * i) / count;
        const tried = { periodDays, epochDays: start.epochDays + shift * start.durationDays, durationDays };
        const signal = signalOf(work, tried);
        if (!(signal > bestSignal)) continue;
        best = tried;
        bestSignal = signal;
      }
    return best;
  });
}

/** The epoch nearest the middle of the span: there it hardly depends on the period. */
function moveToMiddle({ time }: SearchSeries, ephemeris: Ephemeris): Ephemeris {
  const { periodDays, epochDays } = ephemeris;
  const middle = (time[0]! + time.at(-1)!) / 2;
  return { ...ephemeris, epochDays: epochDays + Math.round((middle - epochDays) / periodDays) * periodDays };
}

function polish(work: BoxWork, span: number, start: Ephemeris): Ephemeris {
  let best = start;
  let bestSignal = signalOf(work, start);
  let step = start.durationDays * FIRST_STEP;
  let halvings = 0;
  for (let round = 0; round < MOST_ROUNDS && halvings <= HALVINGS; round += 1) {
    const before = bestSignal;
    for (const moved of neighboursOf(best, step, span)) {
      const signal = signalOf(work, moved);
      if (!(signal > bestSignal)) continue;
      best = moved;
      bestSignal = signal;
    }
    if (bestSignal > before) continue;
    step /= 2;
    halvings += 1;
  }
  return best;
}

function signalOf(work: BoxWork, ephemeris: Ephemeris): number {
  if (!(ephemeris.durationDays > 0 && ephemeris.durationDays <= ephemeris.periodDays * LARGEST_DUTY_CYCLE)) return 0;
  return measureEvents(work, ephemeris)?.signalToNoise ?? 0;
}

function neighboursOf({ periodDays, epochDays, durationDays }: Ephemeris, step: number, span: number): Ephemeris[] {
  // The events at the ends of the span move by one step.
  const periodStep = (2 * step * periodDays) / span;
  const half = step / 2;
  return [step, -step].flatMap((s) => [
    { periodDays: periodDays + Math.sign(s) * periodStep, epochDays, durationDays },
    { periodDays, epochDays: epochDays + s, durationDays },
    { periodDays, epochDays: epochDays + Math.sign(s) * half, durationDays: durationDays + step },
    { periodDays, epochDays: epochDays + Math.sign(s) * half, durationDays: durationDays - step },
  ]);
}

/** Moves edges and period to the middle of where the box holds the same points. */
function settle(series: SearchSeries, work: BoxWork, ephemeris: Ephemeris): Ephemeris {
  const steady = settleEdges(series, work, ephemeris);
  const [shorter, longer] = findPeriodGap(series, steady);
  const centred = { ...steady, periodDays: steady.periodDays + (shorter + longer) / 2 };
  return settleEdges(series, work, keepBetter(work, centred, steady));
}

function settleEdges(series: SearchSeries, work: BoxWork, ephemeris: Ephemeris): Ephemeris {
  const { leading, trailing } = findEdgeGaps(series, ephemeris);
  const start = (leading[0] + leading[1]) / 2;
  const end = (trailing[0] + trailing[1]) / 2;
  const durationDays = Math.min(end - start, ephemeris.periodDays * LARGEST_DUTY_CYCLE);
  return keepBetter(
    work,
    { ...ephemeris, epochDays: ephemeris.epochDays + (start + end) / 2, durationDays },
    ephemeris,
  );
}

/** The new box, unless a quarter of the period or a tie at an edge has cut a point off. */
function keepBetter(work: BoxWork, next: Ephemeris, last: Ephemeris): Ephemeris {
  return signalOf(work, next) >= signalOf(work, last) ? next : last;
}
