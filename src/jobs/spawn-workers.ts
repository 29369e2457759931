import { wrap } from 'comlink';
import type { PrepareWorker } from '../contract/prepare-contract.ts';
import type { ReadWorker } from '../contract/read-contract.ts';
import type { SearchWorker } from '../contract/search-contract.ts';
import type { PoolWorker } from './worker-pool.ts';

/** The only places that name a worker's file: each pairs it with the interface it promises. */

export function spawnReadWorker(): PoolWorker<ReadWorker> {
  return wrapWorker(new Worker(new URL('../../workers/read.worker.ts', import.meta.url), { type: 'module' }));
}

export function spawnPrepareWorker(): PoolWorker<PrepareWorker> {
  return wrapWorker(new Worker(new URL('../../workers/prepare.worker.ts', import.meta.url), { type: 'module' }));
}

export function spawnSearchWorker(): PoolWorker<SearchWorker> {
  return wrapWorker(new Worker(new URL('../../workers/search.worker.ts', import.meta.url), { type: 'module' }));
}

function wrapWorker<Api>(worker: Worker): PoolWorker<Api> {
  return {
    // A remote promises every method's result, and the contracts' methods all return promises: the types agree.
    api: wrap<Api>(worker) as unknown as Api,
    onCrash(listener) {
      worker.addEventListener('error', (event) => listener(event.message));
      worker.addEventListener('messageerror', () => listener('a message could not be read'));
    },
    terminate: () => worker.terminate(),
  };
}
