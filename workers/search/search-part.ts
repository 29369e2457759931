import { cancelled, done, type Outcome } from '../../src/contract/outcome.ts';
import type { BoxSearchJob, BoxSearchPart, SearchSeries } from '../../src/contract/search-contract.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { type BoxWork, makeBoxWork, makeTrialBox, searchTrial, type TrialBox } from './box-search.ts';
import { type BlockKernel, makeBlockKernel } from './kernel/block-kernel.ts';
import { makeBlockSearch } from './kernel/block-search.ts';
import { planBlocks, type TrialBlock } from './kernel/plan-blocks.ts';
import { type BoxPlan, planBoxSearch } from './plan-box-search.ts';

/**
 * Searches every block b of neighbouring trials with b mod partCount == part, by the compiled kernel or, where its
 * instructions are missing (or by wish), the plain one. Equal whatever the number of parts.
 */
export async function searchBoxPart(
  series: SearchSeries,
  { key, settings, part, partCount }: Omit<BoxSearchJob, 'jobId' | 'seriesId'>,
  checkpoint: Checkpoint,
  makeKernel: () => BlockKernel | undefined = makeBlockKernel,
): Promise<Outcome<BoxSearchPart>> {
  const planned = planBoxSearch(series, settings);
  if (planned.kind !== 'done') return planned;
  const plan = planned.value;
  const work = makeBoxWork(series);
  const blocks = planBlocks(plan, series.time.at(-1)! - series.time[0]!, series.time.length).filter(
    (_, block) => block % partCount === part,
  );
  const searched = await searchBlocks(blocks, makeTrialSearch(work, plan, makeKernel()), checkpoint);
  return searched === undefined ? cancelled : done({ key, part, ...searched });
}

type SearchBlock = (block: TrialBlock, take: (trial: number, best: TrialBox) => void) => void;

/** Searches one block of trials after another on a series. */
export function makeTrialSearch(work: BoxWork, plan: BoxPlan, compiled: BlockKernel | undefined): SearchBlock {
  const { periods, durations } = plan;
  if (compiled !== undefined) {
    const blockSearch = makeBlockSearch(compiled, work, durations);
    return (block, take) => blockSearch.search(block, periods, take);
  }
  const best = makeTrialBox();
  const range = { first: 0, last: 0 };
  return ({ first, end }, take) => {
    for (let trial = first; trial < end; trial += 1) {
      plan.rangeAt(periods[trial]!, range);
      searchTrial(work, periods[trial]!, durations, range, best);
      take(trial, best);
    }
  };
}

/** @returns undefined when cancelled */
async function searchBlocks(
  blocks: readonly TrialBlock[],
  search: SearchBlock,
  checkpoint: Checkpoint,
): Promise<Omit<BoxSearchPart, 'key' | 'part'> | undefined> {
  const count = blocks.reduce((sum, { first, end }) => sum + end - first, 0);
  const column = (): Float64Array => new Float64Array(count);
  const found = { power: column(), depth: column(), durationDays: column(), epochDays: column() };
  const trials = new Int32Array(count);
  let place = 0;
  const take = (trial: number, best: TrialBox): void => {
    trials[place] = trial;
    found.power[place] = best.signalToNoise;
    found.depth[place] = best.depth;
    found.durationDays[place] = best.durationDays;
    found.epochDays[place] = best.epochDays;
    place += 1;
  };
  for (const block of blocks) {
    search(block, take);
    if (checkpoint.isDue() && !(await checkpoint.pause(place, count))) return undefined;
  }
  return { trials, ...found };
}
