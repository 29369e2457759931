import type { BoxSearchSettings } from '../core/box-search-settings.ts';
import type { OnProgress, Outcome } from './outcome.ts';

/** What a box search reads; the arrays are shared or copied once per worker and kept by `seriesId`. */
export interface SearchSeries {
  readonly seriesId: string;
  /** Days, ascending. */
  readonly time: Float64Array;
  /** Relative flux, near 1 out of events. */
  readonly flux: Float64Array;
  readonly error: Float64Array;
}

export interface BoxSearchJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly settings: BoxSearchSettings;
  /** This worker searches every trial t with t mod partCount == part. */
  readonly part: number;
  readonly partCount: number;
}

/** Best box of each trial period of one part, in the part's own order. */
export interface BoxSearchPart {
  readonly key: string;
  readonly part: number;
  /** Days. */
  readonly periods: Float64Array;
  /** Depth S/N of the best box (Float64 to hold the objective exactly). */
  readonly power: Float64Array;
  readonly depth: Float64Array;
  readonly durationDays: Float64Array;
  /** Mid-event time of the best box, days. */
  readonly epochDays: Float64Array;
}

/** One separate peak, refined at full precision on the unbinned series. */
export interface BoxPeak {
  readonly periodDays: number;
  readonly periodErrorDays: number;
  readonly epochDays: number;
  readonly epochErrorDays: number;
  readonly durationDays: number;
  /** Box depth, relative (positive for a dip). */
  readonly boxDepth: number;
  readonly boxDepthError: number;
  /** Box depth over its error from white noise. */
  readonly signalToNoise: number;
  /** Signal detection efficiency, Kovacs, Zucker & Mazeh (2002) eq. 6. */
  readonly sde: number;
  /** Events with at least one point in the box, and points in the box. */
  readonly eventCount: number;
  readonly pointsInEvents: number;
}

export interface BoxSearchResult {
  readonly key: string;
  /** Ascending in period. */
  readonly periods: Float64Array;
  /** Signal residue SR of each trial (Kovacs, Zucker & Mazeh 2002 eq. 5), and the same as SDE. */
  readonly sde: Float64Array;
  /** Depth S/N of each trial's best box. */
  readonly signalToNoise: Float64Array;
  readonly durationDays: Float64Array;
  readonly epochDays: Float64Array;
  readonly depth: Float64Array;
  /** At most five, strongest first. */
  readonly peaks: readonly BoxPeak[];
  readonly settings: ResolvedBoxSettings;
}

/** What was searched, with nothing left open. */
export interface ResolvedBoxSettings {
  readonly shortestPeriodDays: number;
  readonly longestPeriodDays: number;
  readonly oversampling: number;
  readonly trialCount: number;
  readonly durationsDays: readonly number[];
  readonly densityCgs: number | undefined;
}

export interface SummariseJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly settings: BoxSearchSettings;
  readonly parts: readonly BoxSearchPart[];
}

export interface SearchWorker {
  /** Keeps a series under its id; at most a few are kept, the oldest is forgotten. */
  keep(series: SearchSeries): Promise<void>;
  has(seriesId: string): Promise<boolean>;
  searchPart(job: BoxSearchJob, onProgress: OnProgress): Promise<Outcome<BoxSearchPart>>;
  /** Joins the parts, finds and refines the five best separate peaks. */
  summarise(job: SummariseJob): Promise<Outcome<BoxSearchResult>>;
  cancel(jobId: string): Promise<void>;
}
