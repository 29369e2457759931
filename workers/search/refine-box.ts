import type { SearchSeries } from '../../src/contract/search-contract.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import { measureBox } from '../../src/core/measure-box.ts';
import { LARGEST_DUTY_CYCLE } from './box-durations.ts';
import { findEdgeGaps, findPeriodGap } from './box-gaps.ts';
import { type BoxWork, makeTrialBox, searchTrial } from './box-search.ts';

/** How a neighbourhood is scanned on phase bins. */
interface Fineness {
  readonly binsPerBox: number;
  /** Of the duration so far. */
  readonly durations: readonly number[];
  /** Trial periods let an event drift by this part of its duration over the span. */
  readonly drift: number;
}

const FINE: Fineness = { binsPerBox: 30, durations: [0.7, 0.8, 0.9, 1, 1.1, 1.25, 1.4], drift: 1 / 16 };
const FINEST: Fineness = { binsPerBox: 100, durations: [0.9, 0.94, 0.97, 1, 1.03, 1.06, 1.1], drift: 1 / 64 };
const MOST_FINE_PERIODS = 120;
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
 * Maximises the box S/N near a trial over period, epoch and duration: first on ever finer phase bins at periods
 * between the neighbouring trials, then on the unbinned series by a pattern search that moves the period, the box and
 * each of its edges. The epoch comes out in the middle of the span, and each edge midway between the points it parts.
 */
export function refineBox(series: SearchSeries, work: BoxWork, start: Ephemeris, reach: PeriodReach): Ephemeris {
  const span = spanOf(series);
  const fine = scanFinely(work, start, reach, span, FINE);
  const step = (FINE.drift * fine.durationDays * fine.periodDays) / span;
  const near = { from: fine.periodDays - step, to: fine.periodDays + step };
  const finest = scanFinely(work, fine, near, span, FINEST);
  return settle(series, polish(series, moveToMiddle(series, finest)));
}

const spanOf = ({ time }: SearchSeries): number => time.at(-1)! - time[0]!;

function scanFinely(
  work: BoxWork,
  start: Ephemeris,
  { from, to }: PeriodReach,
  span: number,
  { binsPerBox, durations: factors, drift }: Fineness,
): Ephemeris {
  const most = start.periodDays * LARGEST_DUTY_CYCLE;
  const durations = Float64Array.from(factors, (factor) => Math.min(most, factor * start.durationDays));
  const range = { first: 0, last: durations.length - 1 };
  const step = (drift * start.durationDays * start.periodDays) / span;
  const count = Math.max(2, Math.min(MOST_FINE_PERIODS, Math.ceil((to - from) / step)));
  const box = makeTrialBox();
  let best = start;
  let bestSignal = 0;
  for (let i = 0; i <= count; i += 1) {
    const periodDays = from + ((to - from) * i) / count;
    searchTrial(work, periodDays, durations, range, box, binsPerBox);
    if (box.signalToNoise <= bestSignal) continue;
    bestSignal = box.signalToNoise;
    best = { periodDays, epochDays: box.epochDays, durationDays: box.durationDays };
  }
  return best;
}

/** The epoch nearest the middle of the span: there it hardly depends on the period. */
function moveToMiddle({ time }: SearchSeries, ephemeris: Ephemeris): Ephemeris {
  const { periodDays, epochDays } = ephemeris;
  const middle = (time[0]! + time.at(-1)!) / 2;
  return { ...ephemeris, epochDays: epochDays + Math.round((middle - epochDays) / periodDays) * periodDays };
}

function polish(series: SearchSeries, start: Ephemeris): Ephemeris {
  const span = spanOf(series);
  let best = start;
  let bestSignal = signalOf(series, start);
  let step = start.durationDays * FIRST_STEP;
  let halvings = 0;
  for (let round = 0; round < MOST_ROUNDS && halvings <= HALVINGS; round += 1) {
    const before = bestSignal;
    for (const moved of neighboursOf(best, step, span)) {
      const signal = signalOf(series, moved);
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

function signalOf({ time, flux, error }: SearchSeries, ephemeris: Ephemeris): number {
  if (!(ephemeris.durationDays > 0 && ephemeris.durationDays <= ephemeris.periodDays * LARGEST_DUTY_CYCLE)) return 0;
  return measureBox(time, flux, error, ephemeris)?.signalToNoise ?? 0;
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
function settle(series: SearchSeries, ephemeris: Ephemeris): Ephemeris {
  const steady = settleEdges(series, ephemeris);
  const [shorter, longer] = findPeriodGap(series, steady);
  const centred = { ...steady, periodDays: steady.periodDays + (shorter + longer) / 2 };
  return settleEdges(series, keepBetter(series, centred, steady));
}

function settleEdges(series: SearchSeries, ephemeris: Ephemeris): Ephemeris {
  const { leading, trailing } = findEdgeGaps(series, ephemeris);
  const start = (leading[0] + leading[1]) / 2;
  const end = (trailing[0] + trailing[1]) / 2;
  const durationDays = Math.min(end - start, ephemeris.periodDays * LARGEST_DUTY_CYCLE);
  return keepBetter(
    series,
    { ...ephemeris, epochDays: ephemeris.epochDays + (start + end) / 2, durationDays },
    ephemeris,
  );
}

/** The new box, unless a quarter of the period or a tie at an edge has cut a point off. */
function keepBetter(series: SearchSeries, next: Ephemeris, last: Ephemeris): Ephemeris {
  return signalOf(series, next) >= signalOf(series, last) ? next : last;
}
