import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { cancelled, done, type Outcome } from '../../src/contract/outcome.ts';
import type {
  CorrelatedNoise,
  FalseAlarmResult,
  SearchSeries,
  SurrogateJob,
  SurrogatePart,
} from '../../src/contract/search-contract.ts';
import { correlatedSigmaAt, correlatedSignalToNoise } from '../../src/core/correlated-noise.ts';
import { fitExtremeValues } from '../../src/core/extreme-value.ts';
import { median } from '../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { makeBoxWork, type TrialBox } from './box-search.ts';
import { measureCorrelatedNoise } from './correlated-noise.ts';
import { type BlockKernel, makeBlockKernel } from './kernel/block-kernel.ts';
import { planBlocks, type TrialBlock } from './kernel/plan-blocks.ts';
import { maskSignals } from './mask-signals.ts';
import { type BoxPlan, planBoxSearch } from './plan-box-search.ts';
import { makeTrialSearch, searchBoxPart } from './search-part.ts';

/** Trials that each surrogate is searched at, in stretches from all over the grid. */
const TRIALS_PER_SURROGATE = 600;
const FEWEST_STRETCHES = 6;
/** A block of time is this many typical durations long, but at least a day, and there are at least ten blocks. */
const DURATIONS_PER_BLOCK = 4;
const SHORTEST_BLOCK_DAYS = 1;
const FEWEST_BLOCKS = 10;

/**
 * Highest peaks of surrogates of this series: its blocks of time in another order, in half of the surrogates turned
 * upside down. Within a block the noise stays as correlated as it is; periodic dips lose their period. Points are
 * never shuffled one by one, as that would whiten the noise. The strongest signal of the series is masked first, so
 * that a planet does not stand in its own null distribution: the null is then of what is left, a little too quiet
 * where the mask took real noise too. Each surrogate is searched at several random stretches of trial periods, whose
 * maxima are taken as those of independent parts of the grid.
 * Source: Süveges (2014), MNRAS 440, 2099, for maxima over parts of the spectrum and their extreme-value tail.
 */
export async function searchSurrogates(
  series: SearchSeries,
  job: Omit<SurrogateJob, 'jobId' | 'seriesId'>,
  checkpoint: Checkpoint,
): Promise<Outcome<SurrogatePart>> {
  const planned = planBoxSearch(series, job.settings);
  if (planned.kind !== 'done') return planned;
  const rest = await withoutStrongest(series, job, planned.value, checkpoint);
  if (rest === undefined) return cancelled;
  const setting = prepare(rest, planned.value, job.settings.objective);
  const own = Array.from({ length: job.surrogateCount }, (_, s) => s).filter((s) => s % job.partCount === job.part);
  const maxima = new Float64Array(own.length);
  let trials = 0;
  for (const [place, surrogate] of own.entries()) {
    const searched = searchOne(setting, xoroshiro128plus(hash(job.seed, surrogate)));
    maxima[place] = searched.highest;
    trials += searched.trials;
    if (checkpoint.isDue() && !(await checkpoint.pause(place + 1, own.length))) return cancelled;
  }
  const gridFraction = own.length === 0 ? 1 : trials / own.length / planned.value.periods.length;
  return done({ key: job.key, maxima, gridFraction, blockDays: setting.blockDays });
}

/** The distribution of the maxima of all parts. */
export function joinSurrogates(key: string, parts: readonly SurrogatePart[]): FalseAlarmResult {
  const maxima = Float64Array.from(parts.flatMap((part) => [...part.maxima]));
  const weighed = parts.reduce((sum, part) => sum + part.gridFraction * part.maxima.length, 0);
  const gridFraction = weighed / maxima.length;
  return { key, maxima, gridFraction, blockDays: parts[0]!.blockDays, ...fitExtremeValues(maxima) };
}

async function withoutStrongest(
  series: SearchSeries,
  { key, settings }: Pick<SurrogateJob, 'key' | 'settings'>,
  plan: BoxPlan,
  checkpoint: Checkpoint,
): Promise<SearchSeries | undefined> {
  const outcome = await searchBoxPart(series, { key, settings, part: 0, partCount: 1 }, checkpoint);
  if (outcome.kind !== 'done') return undefined;
  const { power, trials, durationDays, epochDays } = outcome.value;
  const best = power.indexOf(power.reduce((high, value) => Math.max(high, value), 0));
  if (!(durationDays[best]! > 0)) return series;
  const periodDays = plan.periods[trials[best]!]!;
  const masked = maskSignals(series, [{ periodDays, epochDays: epochDays[best]!, durationDays: durationDays[best]! }]);
  return masked.time.length > FEWEST_BLOCKS ? masked : series;
}

interface Setting {
  readonly series: SearchSeries;
  readonly plan: BoxPlan;
  readonly blocks: readonly TrialBlock[];
  readonly stretches: number;
  /** Undefined: ranked by white noise alone. */
  readonly noise: CorrelatedNoise | undefined;
  readonly spanDays: number;
  readonly blockDays: number;
  /** First points of the blocks of time, and the number of points after them. */
  readonly starts: Int32Array;
  readonly kernel: BlockKernel | undefined;
}

function prepare(series: SearchSeries, plan: BoxPlan, objective: SurrogateJob['settings']['objective']): Setting {
  const { time } = series;
  const spanDays = time.at(-1)! - time[0]!;
  const blocks = planBlocks(plan, spanDays, time.length).filter((block) => block.lastDuration >= block.firstDuration);
  const perBlock = plan.periods.length / Math.max(1, blocks.length);
  const wanted = DURATIONS_PER_BLOCK * median(plan.durations);
  const blockDays = Math.min(spanDays / FEWEST_BLOCKS, Math.max(SHORTEST_BLOCK_DAYS, wanted));
  return {
    series,
    plan,
    blocks,
    stretches: Math.min(blocks.length, Math.max(FEWEST_STRETCHES, Math.ceil(TRIALS_PER_SURROGATE / perBlock))),
    noise:
      objective === 'white noise S/N'
        ? undefined
        : measureCorrelatedNoise(makeBoxWork(series), plan.resolved.durationsDays),
    spanDays,
    blockDays,
    starts: cutBlocks(time, blockDays),
    kernel: makeBlockKernel(),
  };
}

function cutBlocks(time: Float64Array, blockDays: number): Int32Array {
  const starts: number[] = [];
  for (let i = 0; i < time.length; i += 1)
    if (starts.length === 0 || time[i]! - time[starts.at(-1)!]! >= blockDays) starts.push(i);
  return Int32Array.from([...starts, time.length]);
}

function searchOne(setting: Setting, random: RandomGenerator): { highest: number; trials: number } {
  const { plan, blocks, stretches, noise, spanDays, kernel } = setting;
  const free = kernel?.allocate(0);
  const work = makeBoxWork(permute(setting, random));
  const search = makeTrialSearch(work, plan, kernel);
  let highest = 0;
  let trials = 0;
  const take = (trial: number, best: TrialBox): void => {
    trials += 1;
    highest = Math.max(highest, rank(best, noise, spanDays / plan.periods[trial]!));
  };
  for (let stretch = 0; stretch < stretches; stretch += 1) search(pickBlock(blocks, stretch, stretches, random), take);
  if (free !== undefined) kernel?.release(free);
  return { highest, trials };
}

function rank({ depth, signalToNoise, durationDays }: TrialBox, noise: CorrelatedNoise | undefined, events: number) {
  if (noise === undefined || !(signalToNoise > 0)) return signalToNoise;
  return correlatedSignalToNoise(depth, depth / signalToNoise, correlatedSigmaAt(noise, durationDays), events);
}

/** One of its own share of the grid, so that long and short periods are always there. */
function pickBlock(
  blocks: readonly TrialBlock[],
  stretch: number,
  stretches: number,
  random: RandomGenerator,
): TrialBlock {
  const from = Math.floor((stretch * blocks.length) / stretches);
  const to = Math.max(from, Math.floor(((stretch + 1) * blocks.length) / stretches) - 1);
  return blocks[uniformInt(random, from, to)]!;
}

/** The fluxes and errors in their blocks' new order at the old times. */
function permute({ series, starts }: Setting, random: RandomGenerator): SearchSeries {
  const { time, flux, error } = series;
  const order = Array.from({ length: starts.length - 1 }, (_, block) => block);
  for (let last = order.length - 1; last > 0; last -= 1) {
    const other = uniformInt(random, 0, last);
    [order[last], order[other]] = [order[other]!, order[last]!];
  }
  const isInverted = uniformInt(random, 0, 1) === 1;
  const moved = { flux: new Float64Array(time.length), error: new Float64Array(time.length) };
  let place = 0;
  for (const block of order)
    for (let i = starts[block]!; i < starts[block + 1]!; i += 1, place += 1) {
      moved.flux[place] = isInverted ? 2 - flux[i]! : flux[i]!;
      moved.error[place] = error[i]!;
    }
  return { ...series, time, ...moved };
}

/** Small seeds start a generator badly: they are spread over all bits first (Steele, Lea & Flood 2014, SplitMix). */
function hash(seed: number, surrogate: number): number {
  let x = (Math.imul(seed, 0x9e3779b9) ^ Math.imul(surrogate + 1, 0x85ebca6b)) | 0;
  x = Math.imul(x ^ (x >>> 16), 0x21f0aaad);
  x = Math.imul(x ^ (x >>> 15), 0x735a2d97);
  return x ^ (x >>> 15);
}
