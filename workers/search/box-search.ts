import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { median } from '../../src/core/robust-statistics.ts';
import type { DurationRange } from './box-durations.ts';

/** Phase bins in the shortest box of a trial. */
export const BINS_PER_BOX = 10;
/** A box, and what is outside it, must hold at least the weight of this many typical points. */
const LEAST_TYPICAL_POINTS = 2.5;
/** Below this a dip is rounding error. */
const LEAST_SIGNAL_TO_NOISE = 1e-6;

/** A series made ready for many trials, with the sums that they share. */
export interface BoxWork {
  /** Days after `startDays`. */
  readonly elapsed: Float64Array;
  /** 1 / error^2. */
  readonly weight: Float64Array;
  /** weight * (flux - weighted mean). */
  readonly weighted: Float64Array;
  readonly startDays: number;
  readonly totalWeight: number;
  readonly leastWeight: number;
  /** Sums of weight and of weighted flux before each phase bin, interleaved; grown when a trial needs more bins. */
  sums: Float64Array;
}

/** The best box of one trial period. All zero where no box dips. */
export interface TrialBox {
  signalToNoise: number;
  depth: number;
  durationDays: number;
  epochDays: number;
}

export const makeTrialBox = (): TrialBox => ({ signalToNoise: 0, depth: 0, durationDays: 0, epochDays: 0 });

export function makeBoxWork({ time, flux, error }: SearchSeries, leastPoints: number = LEAST_TYPICAL_POINTS): BoxWork {
  const startDays = time[0] ?? 0;
  const weight = error.map((sigma) => 1 / (sigma * sigma));
  let totalWeight = 0;
  let sum = 0;
  for (let i = 0; i < flux.length; i += 1) {
    totalWeight += weight[i]!;
    sum += weight[i]! * (flux[i]! - 1);
  }
  const mean = sum / totalWeight;
  return {
    elapsed: time.map((value) => value - startDays),
    weight,
    weighted: flux.map((value, i) => weight[i]! * (value - 1 - mean)),
    startDays,
    totalWeight,
    leastWeight: leastPoints * median(weight),
    sums: new Float64Array(0),
  };
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
  if (work.sums.length < 2 * (bins + longest + 2)) work.sums = new Float64Array(2 * (bins + longest + 2));
  sumIntoBins(work, 1 / periodDays, bins);
  accumulate(work.sums, bins, longest);
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

function sumIntoBins({ elapsed, weight, weighted, sums }: BoxWork, frequency: number, bins: number): void {
  sums.fill(0, 0, 2 * bins + 4);
  const n = elapsed.length;
  for (let i = 0; i < n; i += 1) {
    const cycles = elapsed[i]! * frequency;
    // Bins are stored one place late: place 0 stays empty for the running sums.
    const place = ((((cycles - Math.floor(cycles)) * bins) | 0) + 1) << 1;
    sums[place] = sums[place]! + weight[i]!;
    sums[place + 1] = sums[place + 1]! + weighted[i]!;
  }
  // A phase that rounds up to 1 belongs to the first bin.
  const over = 2 * (bins + 1);
  sums[2] = sums[2]! + sums[over]!;
  sums[3] = sums[3]! + sums[over + 1]!;
}

/** Turns bins into running sums, carried on past the period's end so that windows may wrap. */
function accumulate(sums: Float64Array, bins: number, longest: number): void {
  for (let place = 2; place <= 2 * bins; place += 2) {
    sums[place] = sums[place]! + sums[place - 2]!;
    sums[place + 1] = sums[place + 1]! + sums[place - 1]!;
  }
  const end = 2 * bins;
  const weight = sums[end]!;
  const weighted = sums[end + 1]!;
  for (let place = 2; place <= 2 * longest; place += 2) {
    sums[end + place] = weight + sums[place]!;
    sums[end + place + 1] = weighted + sums[place + 1]!;
  }
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
