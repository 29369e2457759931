import { describe, expect, it } from 'vitest';
import { done, failed, type Progress } from '../../src/contract/outcome.ts';
import type { BoxSearchJob, BoxSearchPart, BoxSearchResult, SearchWorker } from '../../src/contract/search-contract.ts';
import { DEFAULT_BOX_SEARCH } from '../../src/core/box-search-settings.ts';
import { searchBoxOver } from '../../src/jobs/box-search-jobs.ts';
import { mergeProgress } from '../../src/jobs/merge-progress.ts';
import { createWorkerPool } from '../../src/jobs/worker-pool.ts';

const series = { seriesId: 's', time: new Float64Array(3), flux: new Float64Array(3), error: new Float64Array(3) };
const request = { key: 'k', series, settings: DEFAULT_BOX_SEARCH };

const notUsed = async () => failed('not used here');

function poolOf(searchPart: SearchWorker['searchPart'], log: string[] = []) {
  return createWorkerPool<SearchWorker>({
    size: 3,
    askToCancel: (api, jobId) => void api.cancel(jobId),
    spawn: () => {
      const held = new Set<string>();
      const api: SearchWorker = {
        keep: async ({ seriesId }) => {
          held.add(seriesId);
          log.push('keep');
        },
        has: async (seriesId) => held.has(seriesId),
        searchPart,
        summarise: async ({ parts }) =>
          done({
            key: 'k',
            peaks: [],
            periods: new Float64Array(parts.map(({ part }) => part)),
          } as unknown as BoxSearchResult),
        searchSurrogates: notUsed,
        joinSurrogates: notUsed,
        lombScargle: notUsed,
        findSingleEvents: notUsed,
        periodsFromTimes: notUsed,
        periodOfSingle: notUsed,
        cancel: async (jobId) => {
          log.push(`cancel ${jobId}`);
        },
      };
      return { api, onCrash: () => undefined, terminate: () => log.push('terminate') };
    },
  });
}

const partOf = ({ part }: BoxSearchJob) => ({ key: 'k', part }) as unknown as BoxSearchPart;
const crossing = <T>(callback: T) => callback;

describe('box search over a pool', () => {
  it('sends the series to each worker once and joins all parts', async () => {
    const log: string[] = [];
    const pool = poolOf(async (job) => done(partOf(job)), log);
    const outcome = await searchBoxOver(pool, request, () => {}, { priority: 'now', crossing }).promise;
    expect(outcome.kind === 'done' && [...outcome.value.periods].sort()).toEqual([0, 1, 2]);
    await searchBoxOver(pool, request, () => {}, { priority: 'now', crossing }).promise;
    expect(log.filter((entry) => entry === 'keep')).toHaveLength(3);
  });

  it('fails as a whole with the sentence of the part that failed, and cancels the others', async () => {
    const log: string[] = [];
    const pool = poolOf(
      (job) => (job.part === 1 ? Promise.resolve(failed('no good')) : new Promise(() => undefined)),
      log,
    );
    const outcome = await searchBoxOver(pool, request, () => {}, { priority: 'now', crossing }).promise;
    expect(outcome).toMatchObject({ kind: 'failed', error: { sentence: 'no good' } });
    expect(log.filter((entry) => entry.startsWith('cancel'))).toHaveLength(2);
  });

  it('ends as cancelled when cancelled', async () => {
    const pool = poolOf(() => new Promise(() => undefined));
    const task = searchBoxOver(pool, request, () => {}, { priority: 'now', crossing });
    task.cancel();
    expect(await task.promise).toEqual({ kind: 'cancelled' });
  });
});

describe('progress of several parts', () => {
  it('never goes back, and ends with everything done', () => {
    const seen: Progress[] = [];
    const report = mergeProgress(2, (progress) => seen.push(progress));
    report(0, { done: 50, total: 100 });
    report(1, { done: 0, total: 100 });
    report(1, { done: 60, total: 100 });
    report(0, { done: 100, total: 100 });
    report(1, { done: 100, total: 100 });
    const fractions = seen.map(({ done, total }) => done / total);
    expect(fractions).toEqual([...fractions].sort((a, b) => a - b));
    expect(seen.at(-1)).toEqual({ done: 200, total: 200 });
  });
});
