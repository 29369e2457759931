import { cancelled, done, type Outcome } from '../../src/contract/outcome.ts';
import type { BoxSearchJob, BoxSearchPart, SearchSeries } from '../../src/contract/search-contract.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { makeBoxWork, makeTrialBox, searchTrial } from './box-search.ts';
import { planBoxSearch } from './plan-box-search.ts';

/** Searches every trial t of the plan with t mod partCount == part. Equal whatever the number of parts. */
export async function searchBoxPart(
  series: SearchSeries,
  { key, settings, part, partCount }: Omit<BoxSearchJob, 'jobId' | 'seriesId'>,
  checkpoint: Checkpoint,
): Promise<Outcome<BoxSearchPart>> {
  const planned = planBoxSearch(series, settings);
  if (planned.kind !== 'done') return planned;
  const { periods: all, durations, rangeAt } = planned.value;
  const periods = all.filter((_, trial) => trial % partCount === part);
  const result = makePart(key, part, periods);
  const work = makeBoxWork(series);
  const best = makeTrialBox();
  const range = { first: 0, last: 0 };
  for (let i = 0; i < periods.length; i += 1) {
    rangeAt(periods[i]!, range);
    searchTrial(work, periods[i]!, durations, range, best);
    result.power[i] = best.signalToNoise;
    result.depth[i] = best.depth;
    result.durationDays[i] = best.durationDays;
    result.epochDays[i] = best.epochDays;
    if (checkpoint.isDue() && !(await checkpoint.pause(i + 1, periods.length))) return cancelled;
  }
  return done(result);
}

function makePart(key: string, part: number, periods: Float64Array): BoxSearchPart {
  const column = (): Float64Array => new Float64Array(periods.length);
  return { key, part, periods, power: column(), depth: column(), durationDays: column(), epochDays: column() };
}
