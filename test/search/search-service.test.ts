import { describe, expect, it } from 'vitest';
import type { Progress } from '../../src/contract/outcome.ts';
import { DEFAULT_BOX_SEARCH } from '../../src/core/box-search-settings.ts';
import { createSearchService } from '../../workers/search/search-service.ts';
import { expectDone, makeBoxSeries } from './search-box.ts';

const series = makeBoxSeries(3, { points: 6000, cadenceDays: 1 / 120, sigma: 0.001 }, []);
const job = { jobId: 'j', key: 'k', seriesId: series.seriesId, settings: DEFAULT_BOX_SEARCH, part: 0, partCount: 1 };
const ignore = (): void => undefined;

describe('search service', () => {
  it('hears a cancel while it searches', async () => {
    const service = createSearchService();
    await service.keep(series);
    const search = service.searchPart(job, ignore);
    await service.cancel('j');
    expect(await search).toEqual({ kind: 'cancelled' });
  });

  it('hears a cancel that arrives as a later message', async () => {
    const service = createSearchService();
    await service.keep(series);
    const search = service.searchPart({ ...job, settings: { ...DEFAULT_BOX_SEARCH, oversampling: 100 } }, ignore);
    setTimeout(() => void service.cancel('j'), 40);
    expect(await search).toEqual({ kind: 'cancelled' });
  });

  it('reports progress that only grows, and echoes the key', async () => {
    const service = createSearchService();
    await service.keep(series);
    const reports: Progress[] = [];
    const part = expectDone(await service.searchPart(job, (progress) => reports.push(progress)));
    expect(part.key).toBe('k');
    expect(reports.every(({ done }, i) => i === 0 || done > reports[i - 1]!.done)).toBe(true);
    expect(reports.every(({ done, total }) => done <= total && total === part.trials.length)).toBe(true);
  });

  it('keeps four series and forgets the one kept longest ago', async () => {
    const service = createSearchService();
    for (const seriesId of ['a', 'b', 'c', 'd', 'a', 'e']) await service.keep({ ...series, seriesId });
    const kept = await Promise.all(['a', 'b', 'c', 'd', 'e'].map((seriesId) => service.has(seriesId)));
    expect(kept).toEqual([true, false, true, true, true]);
    const outcome = await service.searchPart({ ...job, seriesId: 'b' }, ignore);
    expect(outcome.kind).toBe('failed');
  });

  it('fails with a sentence on settings that contradict', async () => {
    const service = createSearchService();
    await service.keep(series);
    const settings = { ...DEFAULT_BOX_SEARCH, longestPeriodDays: 500 };
    const outcome = await service.searchPart({ ...job, settings }, ignore);
    expect(outcome).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining('exceeds') } });
  });

  it('throws when the parts are not of the plan: a bug, not an outcome', async () => {
    const service = createSearchService();
    await service.keep(series);
    const part = expectDone(await service.searchPart({ ...job, partCount: 2 }, ignore));
    await expect(service.summarise({ ...job, parts: [part] })).rejects.toThrow(/the plan has/);
  });
});
