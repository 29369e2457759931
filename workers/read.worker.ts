import { expose } from 'comlink';
import type { ReadWorker } from '../src/contract/read-contract.ts';
import { readFile } from './read/read-file.ts';
import { transferArrays } from './transfer-arrays.ts';

expose({ read: async (job) => transferArrays(await readFile(job)) } satisfies ReadWorker);
