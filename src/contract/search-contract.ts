import type { BoxSearchSettings, SearchObjective } from '../core/box-search-settings.ts';
import type { LombScargleJob, LombScargleResult } from './lomb-scargle-contract.ts';
import type { OnProgress, Outcome } from './outcome.ts';
import type {
  PeriodsFromTimesJob,
  PeriodsFromTimesResult,
  SingleEventsJob,
  SingleEventsResult,
  SinglePeriodJob,
  SinglePeriodResult,
} from './single-events-contract.ts';

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
  /** This worker searches every block b of neighbouring trials with b mod partCount == part. */
  readonly part: number;
  readonly partCount: number;
}

/** Best box of each trial period of one part, in the part's own order. */
export interface BoxSearchPart {
  readonly key: string;
  readonly part: number;
  /** Which trials of the plan these are. */
  readonly trials: Int32Array;
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
  /** Box depth over its error from white and correlated noise, Pont, Zucker & Queloz (2006). */
  readonly correlatedSignalToNoise: number;
  /** Signal detection efficiency, Kovacs, Zucker & Mazeh (2002) eq. 6. */
  readonly sde: number;
  /** The same after the periodogram's own slow trend in period is taken out and its scatter made equal. */
  readonly levelledEfficiency: number;
  /** Events with at least one point in the box, and points in the box. */
  readonly eventCount: number;
  readonly pointsInEvents: number;
}

/** How a peak hangs together with a stronger one: the ratio of their periods, an alias, or only the same events. */
export type PeakRelation =
  | `${number}P`
  | `P/${number}`
  | `${number}P/${number}`
  | 'daily alias'
  | 'window alias'
  | 'same events';

export interface RelatedPeak extends BoxPeak {
  readonly relation: PeakRelation;
  /** A sentence with its numbers: why it stands under the other. */
  readonly reason: string;
}

/** One signal: its peak, and the peaks that it makes at other periods, strongest first. */
export interface BoxSignal extends BoxPeak {
  readonly relatives: readonly RelatedPeak[];
}

/** Scatter of means over a duration beyond what white noise leaves, relative flux: sigma_r of Pont et al. (2006). */
export interface CorrelatedNoise {
  readonly durationsDays: readonly number[];
  readonly sigma: readonly number[];
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
  /** S/N of each trial's best box as the objective asks: the same as `signalToNoise` for white noise. */
  readonly objective: Float64Array;
  readonly levelledEfficiency: Float64Array;
  readonly correlatedNoise: CorrelatedNoise;
  /** At most five, strongest by the objective first. */
  readonly peaks: readonly BoxSignal[];
  /** Why another round should wait: the strongest signal looks like two stars. Undefined: nothing holds it back. */
  readonly holdBack: string | undefined;
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
  readonly objective: SearchObjective;
  /** 1 for the first search; each masked signal adds one. */
  readonly round: number;
  readonly maskedPoints: number;
}

export interface SummariseJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly settings: BoxSearchSettings;
  readonly parts: readonly BoxSearchPart[];
}

/**
 * Searches of surrogates: this series with its blocks of time permuted, some of them inverted, so that its own
 * correlated noise stays and every periodic dip is lost.
 */
export interface SurrogateJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly settings: BoxSearchSettings;
  readonly surrogateCount: number;
  readonly seed: number;
  /** This worker takes the surrogates s with s mod partCount == part. */
  readonly part: number;
  readonly partCount: number;
}

export interface SurrogatePart {
  readonly key: string;
  /** Highest objective of each surrogate of this part, over the blocks of trial periods that were searched. */
  readonly maxima: Float64Array;
  /** Part of the whole grid's trials that each surrogate was searched at. */
  readonly gridFraction: number;
  readonly blockDays: number;
}

/** Distribution of the highest noise peak of this very series, from which a peak's false-alarm probability is read. */
export interface FalseAlarmResult {
  readonly key: string;
  readonly maxima: Float64Array;
  readonly gridFraction: number;
  readonly blockDays: number;
  /** Generalised extreme value distribution of one surrogate's maximum over the part of the grid searched. */
  readonly location: number;
  readonly scale: number;
  readonly shape: number;
}

export interface JoinSurrogatesJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly parts: readonly SurrogatePart[];
}

export interface SearchWorker {
  /** Keeps a series under its id; at most a few are kept, the oldest is forgotten. */
  keep(series: SearchSeries): Promise<void>;
  has(seriesId: string): Promise<boolean>;
  searchPart(job: BoxSearchJob, onProgress: OnProgress): Promise<Outcome<BoxSearchPart>>;
  /** Joins the parts, finds and refines the five best separate peaks. */
  summarise(job: SummariseJob): Promise<Outcome<BoxSearchResult>>;
  searchSurrogates(job: SurrogateJob, onProgress: OnProgress): Promise<Outcome<SurrogatePart>>;
  /** Fits the distribution of the maxima of all parts. */
  joinSurrogates(job: JoinSurrogatesJob): Promise<Outcome<FalseAlarmResult>>;
  lombScargle(job: LombScargleJob, onProgress: OnProgress): Promise<Outcome<LombScargleResult>>;
  findSingleEvents(job: SingleEventsJob): Promise<Outcome<SingleEventsResult>>;
  periodsFromTimes(job: PeriodsFromTimesJob): Promise<Outcome<PeriodsFromTimesResult>>;
  periodOfSingle(job: SinglePeriodJob): Promise<Outcome<SinglePeriodResult>>;
  cancel(jobId: string): Promise<void>;
}
