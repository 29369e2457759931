import type { OnProgress, Outcome } from '../contract/outcome.ts';
import type { SearchSeries, SearchWorker } from '../contract/search-contract.ts';
import type { RunningTask, TaskPriority } from './jobs.ts';
import { mergeProgress } from './merge-progress.ts';
import type { PoolJob, WorkerPool } from './worker-pool.ts';

type SearchPool = WorkerPool<SearchWorker>;

/** A job of one worker on a series that is sent ahead where the worker does not hold it. */
export function runOnSeries<T>(
  pool: SearchPool,
  series: SearchSeries,
  priority: TaskPriority,
  job: PoolJob<SearchWorker, T>,
): RunningTask<T> {
  return pool.run<T>(withSeries(shareable(series), job), { priority });
}

export interface SplitJob<Part, T> {
  readonly series: SearchSeries;
  readonly partCount: number;
  readonly priority: TaskPriority;
  readonly onProgress: OnProgress;
  readonly runPart: (part: number, onProgress: OnProgress) => PoolJob<SearchWorker, Part>;
  /** Joins the parts in one worker. */
  readonly join: (parts: readonly Part[]) => PoolJob<SearchWorker, T>;
}

/**
 * Splits one job over the workers of the pool and joins the parts. All parts end together: one that fails or is
 * cancelled cancels the others.
 */
export function runSplit<Part, T>(pool: SearchPool, job: SplitJob<Part, T>): RunningTask<T> {
  const { partCount, priority } = job;
  const series = shareable(job.series);
  const report = mergeProgress(partCount, job.onProgress);
  let cancelled = false;
  let last: RunningTask<T> | undefined;
  const tasks = Array.from({ length: partCount }, (_, part) =>
    pool.run<Part>(
      withSeries(
        series,
        job.runPart(part, (progress) => report(part, progress)),
      ),
      { priority },
    ),
  );

  async function join(): Promise<Outcome<T>> {
    const outcomes = await Promise.all(tasks.map((task) => task.promise.then(endOthersAfterFailure)));
    const failure = outcomes.find((outcome) => outcome.kind === 'failed');
    if (failure !== undefined) return failure;
    const parts = outcomes.flatMap((outcome) => (outcome.kind === 'done' ? [outcome.value] : []));
    if (cancelled || parts.length < partCount) return { kind: 'cancelled' };
    last = pool.run<T>(withSeries(series, job.join(parts)), { priority });
    return last.promise;
  }

  function endOthersAfterFailure(outcome: Outcome<Part>): Outcome<Part> {
    if (outcome.kind === 'failed') for (const task of tasks) task.cancel();
    return outcome;
  }

  return {
    promise: join(),
    cancel() {
      cancelled = true;
      for (const task of tasks) task.cancel();
      last?.cancel();
    },
  };
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
