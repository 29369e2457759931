import type { Ephemeris } from '../core/ephemeris.ts';

/** Single dips, and what their times say of the period. Times in days, in the light curve's reference. */

export interface SingleEventsSettings {
  /** Undefined: chosen from the star's density, cadence and span. */
  readonly durationsDays: readonly number[] | undefined;
  readonly densityCgs: number | undefined;
  /** Least S/N that is listed. */
  readonly threshold: number;
  /** Points in these events are left out. */
  readonly masked: readonly Ephemeris[];
}

export const DEFAULT_SINGLE_EVENTS: SingleEventsSettings = {
  durationsDays: undefined,
  densityCgs: undefined,
  threshold: 7,
  masked: [],
};

export interface SingleEventsJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly settings: SingleEventsSettings;
}

export interface SingleEvent {
  readonly timeDays: number;
  readonly timeErrorDays: number;
  /** From first to last contact of the template. */
  readonly durationDays: number;
  readonly shape: 'box' | 'trapezoid';
  /** Of the template's floor, relative, positive for a dip. */
  readonly depth: number;
  readonly depthError: number;
  /** Against local noise, white and correlated, at this duration. */
  readonly signalToNoise: number;
  readonly pointsInside: number;
  /** Points inside over those that the cadence would give. */
  readonly coverage: number;
  /** Whether a gap, the start or the end of the series lies within half a duration of it: artefacts live there. */
  readonly isAtEdge: boolean;
}

export interface SingleEventsResult {
  readonly key: string;
  /** Strongest first, at most 20, none overlapping. */
  readonly events: readonly SingleEvent[];
  readonly durationsDays: readonly number[];
}

export interface PeriodsFromTimesJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  /** Mid-event times, two or more. */
  readonly times: readonly { readonly timeDays: number; readonly errorDays: number }[];
  readonly durationDays: number;
  /** Undefined: three durations, or the Roche limit where that is longer; the data rule out the rest. */
  readonly shortestPeriodDays: number | undefined;
  /** How far an event may stray from the linear ephemeris (transit-timing variations); 0 allows none. */
  readonly timingVariationDays: number;
}

/** One period that fits every time. */
export interface CandidatePeriod {
  readonly periodDays: number;
  readonly periodErrorDays: number;
  readonly epochDays: number;
  /** Of all that are considered, summing to 1. */
  readonly weight: number;
  /** By how much the data object to the predicted events that are not there; negative where unmarked dips are. */
  readonly deltaChiSquare: number;
  /** Events predicted within the span, and how many of them fall on good data. */
  readonly eventsPredicted: number;
  readonly eventsWithData: number;
}

export interface PeriodsFromTimesResult {
  readonly key: string;
  /** The surviving ones (weight over 1 % of the heaviest), heaviest first. Empty: no period fits all the times. */
  readonly candidates: readonly CandidatePeriod[];
  readonly considered: number;
  /** Depth of the marked events as measured here, relative. */
  readonly depth: number;
}

export interface SinglePeriodJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly timeDays: number;
  readonly durationDays: number;
  readonly durationErrorDays: number;
  readonly densityCgs: number | undefined;
  readonly densityErrorCgs: number | undefined;
  /** Depth, relative: gives the ratio of radii. */
  readonly depth: number;
}

/** Posterior of the period of a planet seen to transit once. Kipping (2018), RNAAS 2, 223. */
export interface SinglePeriodResult {
  readonly key: string;
  /** Days, ascending, log-spaced. */
  readonly periods: Float64Array;
  /** Posterior density per unit of ln P, highest value 1. */
  readonly posterior: Float64Array;
  readonly medianDays: number;
  /** Central 68 %. */
  readonly lowDays: number;
  readonly highDays: number;
  /** The shortest period that can still hide, in gaps too. */
  readonly shortestDays: number;
}
