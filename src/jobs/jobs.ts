import type { OnProgress, Outcome } from '../contract/outcome.ts';
import type { PreparedSeries, PrepareJob } from '../contract/prepare-contract.ts';
import type { ReadResult } from '../contract/read-contract.ts';
import type { BoxSearchResult, SearchSeries } from '../contract/search-contract.ts';
import type { BoxSearchSettings } from '../core/box-search-settings.ts';
import type { FileMapping } from '../core/file-mapping.ts';

/** What waits is served in this order: what is on the screen, what will be next, the sweep of the docket. */
export type TaskPriority = 'now' | 'ahead' | 'sweep';

export interface RunningTask<T> {
  readonly promise: Promise<Outcome<T>>;
  readonly cancel: () => void;
}

export interface BoxSearchRequest {
  readonly key: string;
  readonly series: SearchSeries;
  readonly settings: BoxSearchSettings;
}

/** Everything the workers do, as the rest of the app sees it. */
export interface Jobs {
  /** The buffer is given away. */
  readFile(fileName: string, bytes: ArrayBuffer, mapping?: FileMapping): Promise<Outcome<ReadResult>>;
  prepare(job: Omit<PrepareJob, 'jobId'>, priority?: TaskPriority): RunningTask<PreparedSeries>;
  searchBox(request: BoxSearchRequest, onProgress: OnProgress, priority?: TaskPriority): RunningTask<BoxSearchResult>;
  dispose(): void;
}
