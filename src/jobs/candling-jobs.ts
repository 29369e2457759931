import { proxy, transfer } from 'comlink';
import type { OnProgress } from '../contract/outcome.ts';
import type { PreparedSeries, PrepareWorker } from '../contract/prepare-contract.ts';
import type { ReadResult, ReadWorker } from '../contract/read-contract.ts';
import type { SearchWorker } from '../contract/search-contract.ts';
import { searchBoxOver } from './box-search-jobs.ts';
import type { Jobs } from './jobs.ts';
import { spawnPrepareWorker, spawnReadWorker, spawnSearchWorker } from './spawn-workers.ts';
import { createWorkerPool } from './worker-pool.ts';

/** One core stays with the screen where there are three or more; past eight, workers bring little. */
const searchPoolSize = () => Math.max(2, Math.min(8, (navigator.hardwareConcurrency ?? 2) - 1));

/** The worker pools of this page. */
export function createJobs(): Jobs {
  const read = createWorkerPool<ReadWorker>({
    size: 2,
    spawn: spawnReadWorker,
    askToCancel: () => undefined,
  });
  const prepare = createWorkerPool<PrepareWorker>({
    size: 1,
    spawn: spawnPrepareWorker,
    askToCancel: (api, jobId) => void api.cancel(jobId),
  });
  const search = createWorkerPool<SearchWorker>({
    size: searchPoolSize(),
    spawn: spawnSearchWorker,
    askToCancel: (api, jobId) => void api.cancel(jobId),
  });
  return {
    readFile: (fileName, bytes, mapping) =>
      read.run<ReadResult>((api, jobId) => api.read(transfer({ jobId, fileName, bytes, mapping }, [bytes]))).promise,
    prepare: (job, priority) =>
      prepare.run<PreparedSeries>((api, jobId) => api.prepare({ jobId, ...job }), { priority }),
    searchBox: (request, onProgress, priority = 'now') =>
      searchBoxOver(search, request, onProgress, { priority, crossing: proxy<OnProgress> }),
    dispose() {
      for (const pool of [read, prepare, search]) pool.dispose();
    },
  };
}
