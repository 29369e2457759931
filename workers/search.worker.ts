import { expose } from 'comlink';
import type { SearchWorker } from '../src/contract/search-contract.ts';
import { createSearchService } from './search/search-service.ts';

expose(createSearchService() satisfies SearchWorker);
