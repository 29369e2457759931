import { cancelled, done, type Outcome } from '../../src/contract/outcome.ts';
import type { BoxSearchPart, BoxSearchResult, SearchSeries, SummariseJob } from '../../src/contract/search-contract.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { detectionEfficiency } from './detection-efficiency.ts';
import { findPeaks } from './peaks.ts';
import { planBoxSearch } from './plan-box-search.ts';

/** Joins the parts of a search, in any order, and finds its peaks. */
export async function summariseBoxSearch(
  series: SearchSeries,
  { key, settings, parts }: Omit<SummariseJob, 'jobId' | 'seriesId'>,
  checkpoint: Checkpoint,
): Promise<Outcome<BoxSearchResult>> {
  const planned = planBoxSearch(series, settings);
  if (planned.kind !== 'done') return planned;
  const { periods, resolved } = planned.value;
  checkParts(parts, periods.length);
  const join = (column: (part: BoxSearchPart) => Float64Array): Float64Array =>
    interleave(parts, column, periods.length);
  const signalToNoise = join((part) => part.power);
  const columns = {
    periods,
    signalToNoise,
    sde: detectionEfficiency(signalToNoise),
    durationDays: join((part) => part.durationDays),
    epochDays: join((part) => part.epochDays),
    depth: join((part) => part.depth),
  };
  const peaks = await findPeaks(series, columns, checkpoint);
  return peaks === undefined ? cancelled : done({ key, ...columns, peaks, settings: resolved });
}

function interleave(
  parts: readonly BoxSearchPart[],
  column: (part: BoxSearchPart) => Float64Array,
  length: number,
): Float64Array {
  const joined = new Float64Array(length);
  for (const part of parts) {
    const values = column(part);
    for (let i = 0; i < values.length; i += 1) joined[part.part + i * parts.length] = values[i]!;
  }
  return joined;
}

/** Parts that do not make up the plan were searched with other settings: a fault of the caller, not of the data. */
function checkParts(parts: readonly BoxSearchPart[], trialCount: number): void {
  const numbers = new Set(parts.map((part) => part.part));
  const trials = parts.reduce((sum, part) => sum + part.periods.length, 0);
  const isComplete = numbers.size === parts.length && parts.every((_, i) => numbers.has(i)) && trials === trialCount;
  if (!isComplete) throw new Error(`The ${parts.length} parts hold ${trials} trials; the plan has ${trialCount}.`);
}
