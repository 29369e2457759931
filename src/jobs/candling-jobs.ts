import { proxy, transfer } from 'comlink';
import type { OnProgress } from '../contract/outcome.ts';
import type { PrepareWorker } from '../contract/prepare-contract.ts';
import type { ReadResult, ReadWorker } from '../contract/read-contract.ts';
import type { SearchWorker } from '../contract/search-contract.ts';
import { searchBoxOver, searchSurrogatesOver } from './box-search-jobs.ts';
import type { Jobs, TaskPriority } from './jobs.ts';
import { runOnSeries } from './series-jobs.ts';
import { spawnPrepareWorker, spawnReadWorker, spawnSearchWorker } from './spawn-workers.ts';
import { createWorkerPool } from './worker-pool.ts';

/** One core stays with the screen where there are three or more; past eight, workers bring little. */
const searchPoolSize = () => Math.max(2, Math.min(8, (navigator.hardwareConcurrency ?? 2) - 1));
const preparePoolSize = () => Math.max(2, Math.min(4, searchPoolSize() / 2));

/** The worker pools of this page. */
export function createJobs(): Jobs {
  const read = createWorkerPool<ReadWorker>({
    size: 2,
    spawn: spawnReadWorker,
    askToCancel: () => undefined,
  });
  const prepare = createWorkerPool<PrepareWorker>({
    size: preparePoolSize(),
    spawn: spawnPrepareWorker,
    askToCancel: (api, jobId) => void api.cancel(jobId),
  });
  const search = createWorkerPool<SearchWorker>({
    size: searchPoolSize(),
    spawn: spawnSearchWorker,
    askToCancel: (api, jobId) => void api.cancel(jobId),
  });
  const crossing = proxy<OnProgress>;
  const now: TaskPriority = 'now';
  return {
    readFile: (fileName, bytes, mapping) =>
      read.run<ReadResult>((api, jobId) => api.read(transfer({ jobId, fileName, bytes, mapping }, [bytes]))).promise,
    prepare: (job, priority) => prepare.run((api, jobId) => api.prepare({ jobId, ...job }), { priority }),
    findCommonModes: (job) => prepare.run((api, jobId) => api.findCommonModes({ jobId, ...job })),
    measureDepthLoss: (job) => prepare.run((api, jobId) => api.measureDepthLoss({ jobId, ...job })),
    searchBox: (request, onProgress, priority = now) =>
      searchBoxOver(search, request, onProgress, { priority, crossing }),
    searchSurrogates: (request, onProgress, priority = now) =>
      searchSurrogatesOver(search, request, onProgress, { priority, crossing }),
    lombScargle: ({ series, ...job }, onProgress) =>
      runOnSeries(search, series, now, (api, jobId) =>
        api.lombScargle({ jobId, seriesId: series.seriesId, ...job }, crossing(onProgress)),
      ),
    findSingleEvents: ({ series, ...job }) =>
      runOnSeries(search, series, now, (api, jobId) =>
        api.findSingleEvents({ jobId, seriesId: series.seriesId, ...job }),
      ),
    periodsFromTimes: ({ series, ...job }) =>
      runOnSeries(search, series, now, (api, jobId) =>
        api.periodsFromTimes({ jobId, seriesId: series.seriesId, ...job }),
      ),
    periodOfSingle: ({ series, ...job }) =>
      runOnSeries(search, series, now, (api, jobId) =>
        api.periodOfSingle({ jobId, seriesId: series.seriesId, ...job }),
      ),
    dispose() {
      for (const pool of [read, prepare, search]) pool.dispose();
    },
  };
}
