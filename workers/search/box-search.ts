import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { median } from '../../src/core/robust-statistics.ts';
import type { DurationRange } from './box-durations.ts';
import { makePhaseSums, type PhaseSums, sumByPhase } from './phase-sums.ts';

/** Phase bins in the shortest box of a trial. */
export const BINS_PER_BOX = 10;
/** A box, and what is outside it, must hold at least the weight of this many typical points. */
const LEAST_TYPICAL_POINTS = 2.5;
const MOST_SAMPLED = 2000;
/** Below this a dip is rounding error. */
const LEAST_SIGNAL_TO_NOISE = 1e-6;

/** The best box of one trial period. All zero where no box dips. */
export interface TrialBox {
  signalToNoise: number;
  depth: number;
  durationDays: number;
  epochDays: number;
}

export const makeTrialBox = (): TrialBox => ({ signalToNoise: 0, depth: 0, durationDays: 0, epochDays: 0 });

/** A series made ready for many trials. */
export interface BoxWork extends PhaseSums {
  readonly startDays: number;
  readonly totalWeight: number;
  readonly leastWeight: number;
}

export function makeBoxWork({ time, flux, error }: SearchSeries, leastPoints: number = LEAST_TYPICAL_POINTS): BoxWork {
  const n = time.length;
  const weight = new Float64Array(n);
  const weighted = new Float64Array(n);
  let totalWeight = 0;
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    const own = 1 / (error[i]! * error[i]!);
    weight[i] = own;
    totalWeight += own;
    sum += own * (flux[i]! - 1);
  }
  const mean = sum / totalWeight;
  for (let i = 0; i < n; i += 1) weighted[i] = weight[i]! * (flux[i]! - 1 - mean);
  return {
    ...makePhaseSums(time, weight, weighted),
    startDays: time[0] ?? 0,
    totalWeight,
    leastWeight: leastPoints * typicalOf(weight),
  };
}

/** The median of a thousand points or so tells the typical weight well enough. */
function typicalOf(weight: Float64Array): number {
  const step = Math.max(1, Math.floor(weight.length / MOST_SAMPLED));
  const sample = new Float64Array(Math.ceil(weight.length / step));
  for (let i = 0; i < sample.length; i += 1) sample[i] = weight[i * step]!;
  return median(sample);
}

/**
 * The best box at one period: the series is summed into phase bins, and every window of every duration that starts on
 * a bin (for long durations on a coarser lattice, a `binsPerBox`-th of the box) is tried, across phase 0 too.
 *
 * With s = sum of w (y - mean) and r = sum of w inside, W the total weight: depth = -s W / (r (W - r)), its error
 * sqrt(W / (r (W - r))), so (S/N)^2 = s^2 W / (r (W - r)) is the improvement in chi square over a constant.
 * The values are exact for the box that is returned; only boxes between the lattice's are missed.
 * Source: Kovács, Zucker & Mazeh (2002), A&A 391, 369, section 2, with weights 1/error^2.
 *
 * @param durations days, ascending; `range` picks the ones to try
 * @param best written in place; its duration is the tried one rounded to whole bins
 */
export function searchTrial(
  work: BoxWork,
  periodDays: number,
  durations: Float64Array,
  range: DurationRange,
  best: TrialBox,
  binsPerBox: number = BINS_PER_BOX,
): void {
  best.signalToNoise = best.depth = best.durationDays = best.epochDays = 0;
  if (range.last < range.first) return;
  const bins = Math.ceil((periodDays / durations[range.first]!) * binsPerBox);
  const perBin = bins / periodDays;
  const longest = Math.round(durations[range.last]! * perBin);
  sumByPhase(work, periodDays, bins, longest);
  let bestScore = 0;
  let bestStart = 0;
  let bestWidth = 0;
  const scan = { score: 0, start: 0 };
  for (let d = range.first; d <= range.last; d += 1) {
    const width = Math.max(1, Math.round(durations[d]! * perBin));
    scan.score = bestScore;
    scanWindows(work, bins, width, Math.max(1, Math.floor(width / binsPerBox)), scan);
    if (scan.score <= bestScore) continue;
    bestScore = scan.score;
    bestStart = scan.start;
    bestWidth = width;
  }
  describeBest(work, periodDays, bins, bestStart, bestWidth, best);
}

function scanWindows(
  { sums, totalWeight, leastWeight }: BoxWork,
  bins: number,
  width: number,
  stride: number,
  best: { score: number; start: number },
): void {
  const mostWeight = totalWeight - leastWeight;
  const step = 2 * stride;
  const ahead = 2 * width;
  const end = 2 * bins;
  let { score, start } = best;
  for (let place = 0; place < end; place += step) {
    const s = sums[place + ahead + 1]! - sums[place + 1]!;
    if (s >= 0) continue;
    const r = sums[place + ahead]! - sums[place]!;
    if (r < leastWeight || r > mostWeight) continue;
    const value = (s * s) / (r * (totalWeight - r));
    if (value > score) {
      score = value;
      start = place >> 1;
    }
  }
  best.score = score;
  best.start = start;
}

function describeBest(
  { sums, totalWeight, startDays }: BoxWork,
  periodDays: number,
  bins: number,
  start: number,
  width: number,
  best: TrialBox,
): void {
  if (width === 0) return;
  const r = sums[2 * (start + width)]! - sums[2 * start]!;
  const s = sums[2 * (start + width) + 1]! - sums[2 * start + 1]!;
  const depth = (-s * totalWeight) / (r * (totalWeight - r));
  const signalToNoise = depth * Math.sqrt((r * (totalWeight - r)) / totalWeight);
  if (!(signalToNoise > LEAST_SIGNAL_TO_NOISE)) return;
  const middle = (start + width / 2) / bins;
  best.signalToNoise = signalToNoise;
  best.depth = depth;
  best.durationDays = (width / bins) * periodDays;
  best.epochDays = startDays + (middle - Math.floor(middle)) * periodDays;
}
