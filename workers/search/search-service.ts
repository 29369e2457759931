import { failed, type Outcome } from '../../src/contract/outcome.ts';
import type { SearchSeries, SearchWorker } from '../../src/contract/search-contract.ts';
import { createCheckpoint } from '../checkpoint.ts';
import { createRunningJobs } from '../running-jobs.ts';
import { transferArrays } from '../transfer-arrays.ts';
import { searchBoxPart } from './search-part.ts';
import { summariseBoxSearch } from './summarise.ts';

const MOST_SERIES = 4;

/** The search worker without its thread: series kept by id, jobs that can be cancelled. */
export function createSearchService(): SearchWorker {
  const kept = new Map<string, SearchSeries>();
  const jobs = createRunningJobs();
  const withSeries = async <T>(
    seriesId: string,
    work: (series: SearchSeries) => Promise<Outcome<T>>,
  ): Promise<Outcome<T>> => {
    const series = kept.get(seriesId);
    if (series === undefined)
      return failed('The prepared series is no longer at hand; start the search again.', `series ${seriesId}`);
    return transferArrays(await work(series));
  };
  return {
    keep: async (series) => {
      kept.delete(series.seriesId);
      kept.set(series.seriesId, series);
      for (const oldest of kept.keys()) {
        if (kept.size <= MOST_SERIES) break;
        kept.delete(oldest);
      }
    },
    has: async (seriesId) => kept.has(seriesId),
    searchPart: (job, onProgress) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries(job.seriesId, (series) => searchBoxPart(series, job, createCheckpoint(isCancelled, onProgress))),
      ),
    summarise: (job) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries(job.seriesId, (series) => summariseBoxSearch(series, job, createCheckpoint(isCancelled))),
      ),
    cancel: async (jobId) => jobs.cancel(jobId),
  };
}
