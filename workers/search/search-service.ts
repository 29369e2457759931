import { done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { SearchSeries, SearchWorker } from '../../src/contract/search-contract.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import { createCheckpoint } from '../checkpoint.ts';
import { createRunningJobs } from '../running-jobs.ts';
import { transferArrays } from '../transfer-arrays.ts';
import { maskSignals } from './mask-signals.ts';
import { searchBoxPart } from './search-part.ts';
import { computeLombScargle } from './sines/lomb-scargle.ts';
import { findPeriodOfSingle } from './singles/find-period-of-single.ts';
import { findPeriodsFromTimes } from './singles/find-periods-from-times.ts';
import { findSingleEvents } from './singles/find-single-events.ts';
import { summariseBoxSearch } from './summarise.ts';
import { joinSurrogates, searchSurrogates } from './surrogates.ts';

const MOST_SERIES = 4;

type Masked = { readonly masked: readonly Ephemeris[] };

/** The search worker without its thread: series kept by id, jobs that can be cancelled. */
export function createSearchService(): SearchWorker {
  const kept = new Map<string, SearchSeries>();
  const jobs = createRunningJobs();
  /** The series of a job, without the events that its settings mask. */
  const withSeries = async <T>(
    { seriesId, settings }: { readonly seriesId: string; readonly settings?: Partial<Masked> | undefined },
    work: (series: SearchSeries, maskedPoints: number) => Promise<Outcome<T>>,
  ): Promise<Outcome<T>> => {
    const series = kept.get(seriesId);
    if (series === undefined)
      return failed('The prepared series is no longer at hand; start the search again.', `series ${seriesId}`);
    const rest = maskSignals(series, settings?.masked ?? []);
    return transferArrays(await work(rest, series.time.length - rest.time.length));
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
        withSeries(job, (series, maskedPoints) =>
          summariseBoxSearch(series, { ...job, maskedPoints }, createCheckpoint(isCancelled)),
        ),
      ),
    searchSurrogates: (job, onProgress) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries(job, (series) => searchSurrogates(series, job, createCheckpoint(isCancelled, onProgress))),
      ),
    joinSurrogates: async ({ key, parts }) => transferArrays(done(joinSurrogates(key, parts))),
    lombScargle: (job, onProgress) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries({ seriesId: job.seriesId }, (series) =>
          computeLombScargle(series, job, createCheckpoint(isCancelled, onProgress)),
        ),
      ),
    findSingleEvents: (job) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries(job, (series) => findSingleEvents(series, job, createCheckpoint(isCancelled))),
      ),
    periodsFromTimes: (job) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries({ seriesId: job.seriesId }, (series) =>
          findPeriodsFromTimes(series, job, createCheckpoint(isCancelled)),
        ),
      ),
    periodOfSingle: (job) =>
      jobs.run(job.jobId, (isCancelled) =>
        withSeries({ seriesId: job.seriesId }, (series) =>
          findPeriodOfSingle(series, job, createCheckpoint(isCancelled)),
        ),
      ),
    cancel: async (jobId) => jobs.cancel(jobId),
  };
}
