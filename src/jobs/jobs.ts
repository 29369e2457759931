import type { LombScargleResult, LombScargleSettings } from '../contract/lomb-scargle-contract.ts';
import type { OnProgress, Outcome } from '../contract/outcome.ts';
import type {
  CommonModes,
  CommonModesJob,
  DepthLoss,
  DepthLossJob,
  PreparedSeries,
  PrepareJob,
} from '../contract/prepare-contract.ts';
import type { ReadResult } from '../contract/read-contract.ts';
import type { BoxSearchResult, FalseAlarmResult, SearchSeries } from '../contract/search-contract.ts';
import type {
  PeriodsFromTimesJob,
  PeriodsFromTimesResult,
  SingleEventsResult,
  SingleEventsSettings,
  SinglePeriodJob,
  SinglePeriodResult,
} from '../contract/single-events-contract.ts';
import type { BoxSearchSettings } from '../core/box-search-settings.ts';
import type { FileMapping } from '../core/file-mapping.ts';

/** What waits is served in this order: what is on the screen, what will be next, the sweep of the docket. */
export type TaskPriority = 'now' | 'ahead' | 'sweep';

export interface RunningTask<T> {
  readonly promise: Promise<Outcome<T>>;
  readonly cancel: () => void;
}

/** A job on one series, filed under the key of all its inputs. */
export interface SeriesRequest {
  readonly key: string;
  readonly series: SearchSeries;
}

export interface BoxSearchRequest extends SeriesRequest {
  readonly settings: BoxSearchSettings;
}

export interface SurrogateRequest extends BoxSearchRequest {
  readonly surrogateCount: number;
  readonly seed: number;
}

type Own<Job> = Omit<Job, 'jobId' | 'key' | 'seriesId'>;

/** Everything the workers do, as the rest of the app sees it. */
export interface Jobs {
  /** The buffer is given away. */
  readFile(fileName: string, bytes: ArrayBuffer, mapping?: FileMapping): Promise<Outcome<ReadResult>>;
  prepare(job: Omit<PrepareJob, 'jobId'>, priority?: TaskPriority): RunningTask<PreparedSeries>;
  searchBox(request: BoxSearchRequest, onProgress: OnProgress, priority?: TaskPriority): RunningTask<BoxSearchResult>;
  searchSurrogates(
    request: SurrogateRequest,
    onProgress: OnProgress,
    priority?: TaskPriority,
  ): RunningTask<FalseAlarmResult>;
  lombScargle(
    request: SeriesRequest & { readonly settings: LombScargleSettings },
    onProgress: OnProgress,
  ): RunningTask<LombScargleResult>;
  findSingleEvents(
    request: SeriesRequest & { readonly settings: SingleEventsSettings },
  ): RunningTask<SingleEventsResult>;
  periodsFromTimes(request: SeriesRequest & Own<PeriodsFromTimesJob>): RunningTask<PeriodsFromTimesResult>;
  periodOfSingle(request: SeriesRequest & Own<SinglePeriodJob>): RunningTask<SinglePeriodResult>;
  findCommonModes(job: Omit<CommonModesJob, 'jobId'>): RunningTask<CommonModes>;
  measureDepthLoss(job: Omit<DepthLossJob, 'jobId'>): RunningTask<DepthLoss>;
  dispose(): void;
}
