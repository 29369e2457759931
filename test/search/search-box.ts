import type { Outcome } from '../../src/contract/outcome.ts';
import type { BoxSearchPart, BoxSearchResult, SearchSeries } from '../../src/contract/search-contract.ts';
import { type BoxSearchSettings, DEFAULT_BOX_SEARCH } from '../../src/core/box-search-settings.ts';
import { createCheckpoint } from '../../workers/checkpoint.ts';
import { searchBoxPart } from '../../workers/search/search-part.ts';
import { summariseBoxSearch } from '../../workers/search/summarise.ts';
import { seedRandom } from '../reference/search/seeded-series.ts';

export const quietCheckpoint = () => createCheckpoint(() => false);

export function expectDone<T>(outcome: Outcome<T>): T {
  if (outcome.kind === 'failed') throw new Error(outcome.error.sentence);
  if (outcome.kind === 'cancelled') throw new Error('cancelled');
  return outcome.value;
}

/** The whole search, in as many parts as wanted, joined in reverse order. */
export async function searchBox(
  series: SearchSeries,
  settings: Partial<BoxSearchSettings> = {},
  partCount = 1,
): Promise<BoxSearchResult> {
  const all = { ...DEFAULT_BOX_SEARCH, ...settings };
  const parts: BoxSearchPart[] = [];
  for (let part = partCount - 1; part >= 0; part -= 1) {
    const job = { key: 'k', settings: all, part, partCount };
    parts.push(expectDone(await searchBoxPart(series, job, quietCheckpoint())));
  }
  return expectDone(await summariseBoxSearch(series, { key: 'k', settings: all, parts }, quietCheckpoint()));
}

export interface BoxSignal {
  readonly periodDays: number;
  readonly epochDays: number;
  readonly durationDays: number;
  readonly depth: number;
}

/** Evenly sampled white noise with boxes in it. */
export function makeBoxSeries(
  seed: number,
  sampling: { readonly points: number; readonly cadenceDays: number; readonly sigma: number },
  signals: readonly BoxSignal[],
): SearchSeries {
  const random = seedRandom(seed);
  const time = Float64Array.from({ length: sampling.points }, (_, i) => 100 + i * sampling.cadenceDays);
  const flux = time.map((at) => 1 + sampling.sigma * random.normal() - dipOf(at, signals));
  return { seriesId: `${seed}`, time, flux, error: new Float64Array(time.length).fill(sampling.sigma) };
}

function dipOf(at: number, signals: readonly BoxSignal[]): number {
  return signals.reduce((sum, { periodDays, epochDays, durationDays, depth }) => {
    const cycles = (at - epochDays) / periodDays;
    return Math.abs(cycles - Math.round(cycles)) * periodDays <= durationDays / 2 ? sum + depth : sum;
  }, 0);
}
