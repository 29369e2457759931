import { failed, type Outcome } from '../../src/contract/outcome.ts';
import type { SearchSeries, SearchWorker } from '../../src/contract/search-contract.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import { createCheckpoint } from '../checkpoint.ts';
import { createRunningJobs } from '../running-jobs.ts';
import { transferArrays } from '../transfer-arrays.ts';
import { maskSignals } from './mask-signals.ts';
import { searchBoxPart } from './search-part.ts';
import { summariseBoxSearch } from './summarise.ts';

const MOST_SERIES = 4;

type Masked = { readonly masked: readonly Ephemeris[] };

/** The search worker without its thread: series kept by id, jobs that can be cancelled. */
export function createSearchService(): SearchWorker {
  const kept = new Map<string, SearchSeries>();
  const jobs = createRunningJobs();
  /** The series of a job, without the events that its settings mask. */
  const withSeries = async <T>(
    { seriesId, settings }: { readonly seriesId: string; readonly settings?: Partial<Masked> | undefined },
    work: (series: SearchSeries) => Promise<Outcome<T>>,
  ): Promise<Outcome<T>> => {
    const series = kept.get(seriesId);
    if (series === undefined)
      return failed('The prepared series is no longer at hand; start the search again.', `series ${seriesId}`);
    return transferArrays(await work(maskSignals(series, settings?.masked ?? [])));
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
        withSeries(job, (series) => searchBoxPart(series, job, createCheckpoint(isCancelled, onProgress))),
      ),
    summarise: (job) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries(job, (series) => summariseBoxSearch(series, job, createCheckpoint(isCancelled))),
      ),
    cancel: async (jobId) => jobs.cancel(jobId),
  };
}
