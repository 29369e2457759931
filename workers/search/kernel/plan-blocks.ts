import type { BoxPlan } from '../plan-box-search.ts';

/** Trials first to end - 1, searched with the phase bins and durations of the one in the middle. */
export interface TrialBlock {
  readonly first: number;
  readonly end: number;
  /** Indices of the plan's durations, both included; last < first: none is tried here. */
  readonly firstDuration: number;
  readonly lastDuration: number;
  /** Phase bins in one cycle. */
  readonly bins: number;
  /** Longest span of one profile, days: within it no trial of the block drifts too far from the middle one. */
  readonly segmentDays: number;
  /** A window thinner than twice this is tried at every start. */
  readonly binsPerBox: number;
}

/** Phase bins in the shortest box of a block. */
export const BINS_PER_BOX = 8;
/** Within a profile, the trials at the ends of a block drift by at most this part of the shortest box. */
const LARGEST_DRIFT = 1 / 8;
/** Costs in about a nanosecond's third: scattering a point, and adding a bin of a whole or of a part of a cycle. */
const POINT_COST = 20;
const WHOLE_BIN_COST = 0.4;
const PART_BIN_COST = 1;
/** What shifting a profile costs before its first bin is added. */
const PROFILE_COST = 60;
const MOST_TRIALS = 256;

/**
 * Cuts the trials of a plan into blocks of neighbours, each as long as makes the whole cheapest: long blocks share
 * one scatter but need short profiles, and each profile is added once a trial. The same plan and series give the same
 * blocks in every worker.
 *
 * @param points of the series, as merged for the shortest box or not
 */
export function planBlocks(plan: BoxPlan, spanDays: number, points: number): TrialBlock[] {
  const { periods } = plan;
  const blocks: TrialBlock[] = [];
  for (let first = 0; first < periods.length; first = blocks.at(-1)!.end)
    blocks.push(planBlock(plan, spanDays, points, first));
  return blocks;
}

function planBlock(
  { periods, durations, rangeAt }: BoxPlan,
  spanDays: number,
  points: number,
  first: number,
): TrialBlock {
  const range = { first: 0, last: 0 };
  rangeAt(periods[first]!, range);
  const shortest = durations[range.first] ?? periods[first]! / 4;
  const bins = Math.ceil((periods[first]! / shortest) * BINS_PER_BOX);
  const step = first + 1 < periods.length ? 1 / periods[first]! - 1 / periods[first + 1]! : 0;
  // Drift of the next trial over one day, in days of phase.
  const driftPerTrial = step * periods[first]!;
  const trials = bestLength({ periodDays: periods[first]!, shortest, driftPerTrial, spanDays, points, bins });
  const end = endOfEvenStretch(periods, first, Math.min(first + trials, periods.length), step);
  const segmentDays = Math.min(spanDays, segmentOf(end - first, shortest, driftPerTrial));
  const middle = (first + end - 1) >> 1;
  rangeAt(periods[middle]!, range);
  return {
    first,
    end,
    firstDuration: range.first,
    lastDuration: range.last,
    bins,
    segmentDays,
    binsPerBox: BINS_PER_BOX,
  };
}

interface BlockSize {
  readonly periodDays: number;
  readonly shortest: number;
  readonly driftPerTrial: number;
  readonly spanDays: number;
  readonly points: number;
  readonly bins: number;
}

function bestLength(size: BlockSize): number {
  let best = 1;
  for (let length = 2; length <= MOST_TRIALS; length *= 2)
    if (costOfTrial(size, length) < costOfTrial(size, best)) best = length;
  return best;
}

/** A trial's share of the scatter, and the bins of all profiles, of which short ones hold a part of a cycle only. */
function costOfTrial(
  { periodDays, shortest, driftPerTrial, spanDays, points, bins }: BlockSize,
  length: number,
): number {
  const segmentDays = Math.min(spanDays, segmentOf(length, shortest, driftPerTrial));
  const profiles = Math.ceil(spanDays / segmentDays);
  const cycles = segmentDays / periodDays;
  const binCost = cycles >= 1 ? WHOLE_BIN_COST : PART_BIN_COST * cycles;
  return (points * POINT_COST) / length + profiles * (PROFILE_COST + bins * binCost);
}

/** A block of any periods near one another, searched on finer bins than a plan's. */
export function makeFineBlock(
  periods: Float64Array,
  durations: Float64Array,
  { binsPerBox, drift }: { readonly binsPerBox: number; readonly drift: number },
): TrialBlock {
  const middle = periods[(periods.length - 1) >> 1]!;
  const widest = Math.max(Math.abs(1 / periods[0]! - 1 / middle), Math.abs(1 / periods.at(-1)! - 1 / middle));
  return {
    first: 0,
    end: periods.length,
    firstDuration: 0,
    lastDuration: durations.length - 1,
    bins: Math.ceil((middle / durations[0]!) * binsPerBox),
    segmentDays: widest > 0 ? (2 * drift * durations[0]!) / (widest * middle) : Number.POSITIVE_INFINITY,
    binsPerBox,
  };
}

/** The span over which the outermost trial of a block drifts by the largest part of the shortest box, each way. */
function segmentOf(length: number, shortest: number, driftPerTrial: number): number {
  const outermost = Math.max(1, length) / 2;
  return driftPerTrial > 0 ? (2 * LARGEST_DRIFT * shortest) / (outermost * driftPerTrial) : Number.POSITIVE_INFINITY;
}

/** A block ends at any jump in the list of frequencies. */
function endOfEvenStretch(periods: Float64Array, first: number, end: number, step: number): number {
  for (let i = first + 1; i < end; i += 1) {
    const own = 1 / periods[i - 1]! - 1 / periods[i]!;
    if (!(own <= 1.5 * step)) return i;
  }
  return end;
}
