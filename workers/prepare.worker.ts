import { expose } from 'comlink';
import type { PrepareWorker } from '../src/contract/prepare-contract.ts';
import { createPrepareService } from './prepare/prepare-service.ts';

expose(createPrepareService() satisfies PrepareWorker);
