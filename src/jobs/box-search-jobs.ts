import type { OnProgress } from '../contract/outcome.ts';
import type {
  BoxSearchPart,
  BoxSearchResult,
  FalseAlarmResult,
  SearchWorker,
  SurrogatePart,
} from '../contract/search-contract.ts';
import type { BoxSearchRequest, RunningTask, SurrogateRequest, TaskPriority } from './jobs.ts';
import { runSplit } from './series-jobs.ts';
import type { WorkerPool } from './worker-pool.ts';

export interface SplitOptions {
  readonly priority: TaskPriority;
  /** How a callback crosses to a worker. */
  readonly crossing: (callback: OnProgress) => OnProgress;
}

/** One box search over every worker of the pool; in a sweep, where many series wait, each on a single worker. */
export function searchBoxOver(
  pool: WorkerPool<SearchWorker>,
  { key, series, settings }: BoxSearchRequest,
  onProgress: OnProgress,
  { priority, crossing }: SplitOptions,
): RunningTask<BoxSearchResult> {
  const partCount = priority === 'now' ? pool.size : 1;
  const { seriesId } = series;
  return runSplit<BoxSearchPart, BoxSearchResult>(pool, {
    series,
    partCount,
    priority,
    onProgress,
    runPart: (part, report) => (api, jobId) =>
      api.searchPart({ jobId, key, seriesId, settings, part, partCount }, crossing(report)),
    join: (parts) => (api, jobId) => api.summarise({ jobId, key, seriesId, settings, parts }),
  });
}

/** Searches of surrogates over every worker of the pool, and the distribution of their highest peaks. */
export function searchSurrogatesOver(
  pool: WorkerPool<SearchWorker>,
  { key, series, settings, surrogateCount, seed }: SurrogateRequest,
  onProgress: OnProgress,
  { priority, crossing }: SplitOptions,
): RunningTask<FalseAlarmResult> {
  const partCount = priority === 'now' ? pool.size : 1;
  const { seriesId } = series;
  return runSplit<SurrogatePart, FalseAlarmResult>(pool, {
    series,
    partCount,
    priority,
    onProgress,
    runPart: (part, report) => (api, jobId) =>
      api.searchSurrogates({ jobId, key, seriesId, settings, surrogateCount, seed, part, partCount }, crossing(report)),
    join: (parts) => (api, jobId) => api.joinSurrogates({ jobId, key, seriesId, parts }),
  });
}
