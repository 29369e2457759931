import type { SearchSeries } from '../../src/contract/search-contract.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import { LARGEST_DUTY_CYCLE } from './box-durations.ts';
import { findEdgeGaps, findPeriodGap } from './box-gaps.ts';
import { type BoxWork, makeTrialBox, searchTrial, type TrialBox } from './box-search.ts';
import { measureEvents } from './event-sums.ts';
import type { BlockKernel } from './kernel/block-kernel.ts';
import { makeBlockSearch } from './kernel/block-search.ts';
import { makeFineBlock } from './kernel/plan-blocks.ts';

/** The neighbourhood of a trial is scanned on this many phase bins in the shortest box. */
const BINS_PER_BOX = 24;
/** Of the duration so far. */
const DURATION_FACTORS = [0.7, 0.8, 0.9, 1, 1.1, 1.25, 1.4];
/** Trial periods let an event at the ends of the span drift by this part of its duration. */
const PERIOD_DRIFT = 1 / 12;
const MOST_FINE_PERIODS = 96;
/** Part of the shortest box that a period may drift within one profile of the compiled kernel. */
const PROFILE_DRIFT = 1 / 32;
/** Noise makes many maxima of nearly the same height: so many of the scanned ones are polished. */
const MOST_POLISHED = 6;

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
 * Maximises the box S/N near a trial over period, epoch and duration: first on fine phase bins at periods between the
 * neighbouring trials, then, from the best of those, on the unbinned series by a pattern search that moves the period,
 * the box and each of its edges. The epoch comes out in the middle of the span, and each edge midway between the
 * points it parts.
 */
export function refineBox(
  series: SearchSeries,
  work: BoxWork,
  start: Ephemeris,
  reach: PeriodReach,
  kernel: BlockKernel | undefined,
): Ephemeris {
  const span = spanOf(series);
  const scanned = scanFinely(work, start, reach, span, kernel)
    .map((one) => ({ one, signal: signalOf(work, one) }))
    .sort((a, b) => b.signal - a.signal)
    .slice(0, MOST_POLISHED);
  const polished = scanned.map(({ one }) => polish(work, span, moveToMiddle(series, one)));
  const best = polished.reduce((better, one) => (signalOf(work, one) > signalOf(work, better) ? one : better), start);
  return settle(series, work, best);
}

const spanOf = ({ time }: SearchSeries): number => time.at(-1)! - time[0]!;

/** The best box at each of the periods between the neighbours. */
function scanFinely(
  work: BoxWork,
  start: Ephemeris,
  { from, to }: PeriodReach,
  span: number,
  kernel: BlockKernel | undefined,
): Ephemeris[] {
  const most = start.periodDays * LARGEST_DUTY_CYCLE;
  const durations = Float64Array.from(DURATION_FACTORS, (factor) => Math.min(most, factor * start.durationDays));
  const step = (2 * PERIOD_DRIFT * start.durationDays * start.periodDays) / span;
  const count = Math.max(2, Math.min(MOST_FINE_PERIODS, Math.ceil((to - from) / step)));
  const periods = Float64Array.from({ length: count + 1 }, (_, i) => from + ((to - from) * i) / count);
  const found: Ephemeris[] = [];
  scanPeriods(work, periods, durations, kernel, (trial, { signalToNoise, epochDays, durationDays }) => {
    if (signalToNoise > 0) found.push({ periodDays: periods[trial]!, epochDays, durationDays });
  });
  return found;
}

function scanPeriods(
  work: BoxWork,
  periods: Float64Array,
  durations: Float64Array,
  kernel: BlockKernel | undefined,
  take: (trial: number, box: TrialBox) => void,
): void {
  if (kernel !== undefined) {
    const free = kernel.allocate(0);
    const block = makeFineBlock(periods, durations, { binsPerBox: BINS_PER_BOX, drift: PROFILE_DRIFT });
    makeBlockSearch(kernel, work, durations).search(block, periods, take);
    kernel.release(free);
    return;
  }
  const box = makeTrialBox();
  const range = { first: 0, last: durations.length - 1 };
  for (let trial = 0; trial < periods.length; trial += 1) {
    searchTrial(work, periods[trial]!, durations, range, box, BINS_PER_BOX);
    take(trial, box);
  }
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
