import type { OnProgress, Outcome } from '../contract/outcome.ts';
import type { BoxSearchPart, BoxSearchResult, SearchSeries, SearchWorker } from '../contract/search-contract.ts';
import type { BoxSearchRequest, RunningTask, TaskPriority } from './jobs.ts';
import { mergeProgress } from './merge-progress.ts';
import type { PoolJob, WorkerPool } from './worker-pool.ts';

/**
 * Splits one box search over every worker of the pool and joins the parts. All parts end together: one that fails
 * or is cancelled cancels the others.
 */
export function searchBoxOver(
  pool: WorkerPool<SearchWorker>,
  request: BoxSearchRequest,
  onProgress: OnProgress,
  options: { priority: TaskPriority; crossing: (callback: OnProgress) => OnProgress },
): RunningTask<BoxSearchResult> {
  const { key, settings } = request;
  const { priority, crossing } = options;
  const partCount = pool.size;
  const series = shareable(request.series);
  const report = mergeProgress(partCount, onProgress);
  let cancelled = false;
  let summary: RunningTask<BoxSearchResult> | undefined;

  const tasks = Array.from({ length: partCount }, (_, part) =>
    pool.run<BoxSearchPart>(
      withSeries(series, (api, jobId) =>
        api.searchPart(
          { jobId, key, seriesId: series.seriesId, settings, part, partCount },
          crossing((progress) => report(part, progress)),
        ),
      ),
      { priority },
    ),
  );

  const cancel = () => {
    cancelled = true;
    for (const task of tasks) task.cancel();
    summary?.cancel();
  };

  async function join(): Promise<Outcome<BoxSearchResult>> {
    const outcomes = await Promise.all(tasks.map((task) => task.promise.then(endOthersAfterFailure)));
    const failure = outcomes.find((outcome) => outcome.kind === 'failed');
    if (failure !== undefined) return failure;
    const parts = outcomes.flatMap((outcome) => (outcome.kind === 'done' ? [outcome.value] : []));
    if (cancelled || parts.length < partCount) return { kind: 'cancelled' };
    summary = pool.run<BoxSearchResult>(
      withSeries(series, (api, jobId) => api.summarise({ jobId, key, seriesId: series.seriesId, settings, parts })),
      { priority: 'now' },
    );
    return summary.promise;
  }

  function endOthersAfterFailure(outcome: Outcome<BoxSearchPart>): Outcome<BoxSearchPart> {
    if (outcome.kind === 'failed') for (const task of tasks) task.cancel();
    return outcome;
  }

  return { promise: join(), cancel };
}

/** Sends the series ahead of a job to a worker that does not hold it (a fresh one, or one that forgot it). */
function withSeries<T>(series: SearchSeries, job: PoolJob<SearchWorker, T>): PoolJob<SearchWorker, T> {
  return async (api, jobId, workerNumber) => {
    if (!(await api.has(series.seriesId))) await api.keep(series);
    return job(api, jobId, workerNumber);
  };
}

/** One copy for all workers where the page may share memory; the series as it is where not. */
function shareable(series: SearchSeries): SearchSeries {
  if (globalThis.crossOriginIsolated !== true) return series;
  const { seriesId, time, flux, error } = series;
  return { seriesId, time: shared(time), flux: shared(flux), error: shared(error) };
}

function shared(values: Float64Array): Float64Array {
  const copy = new Float64Array(new SharedArrayBuffer(values.byteLength));
  copy.set(values);
  return copy;
}
