/** Generalised Lomb-Scargle periodogram (floating mean, weights), for rotation, pulsation and contact binaries. */

export interface LombScargleSettings {
  /** Undefined: four cadences. */
  readonly shortestPeriodDays: number | undefined;
  /** Undefined: the span. */
  readonly longestPeriodDays: number | undefined;
  /** Frequencies per 1/span. */
  readonly oversampling: number;
  /** Strongest sines taken out one after another (prewhitening), each a peak of the result; 1 to 8. */
  readonly rounds: number;
}

export const DEFAULT_LOMB_SCARGLE: LombScargleSettings = {
  shortestPeriodDays: undefined,
  longestPeriodDays: undefined,
  oversampling: 5,
  rounds: 5,
};

export interface LombScargleJob {
  readonly jobId: string;
  readonly key: string;
  readonly seriesId: string;
  readonly settings: LombScargleSettings;
}

export interface LombScarglePeak {
  readonly frequencyPerDay: number;
  readonly frequencyErrorPerDay: number;
  readonly periodDays: number;
  /** Standard normalisation, 0 to 1, of the series that was left when this sine was found. */
  readonly power: number;
  /** Semi-amplitude, relative flux. */
  readonly amplitude: number;
  readonly amplitudeError: number;
  /** A time of maximum near the middle of the series, days. */
  readonly maximumDays: number;
  /** Baluev (2008), white noise assumed. */
  readonly falseAlarmProbability: number;
  /** "2f", "f/2", "f1 + f2", "1 / d alias" ... of an earlier peak; undefined for one that stands by itself. */
  readonly relation: string | undefined;
}

export interface LombScargleResult {
  readonly key: string;
  /** Per day, ascending, evenly spaced. */
  readonly frequencies: Float64Array;
  /** Standard normalisation of Zechmeister & Kürster (2009), 0 to 1, before prewhitening. */
  readonly power: Float64Array;
  /** In the order found. */
  readonly peaks: readonly LombScarglePeak[];
  /** Power at which white noise reaches a false-alarm probability, Baluev (2008). */
  readonly levels: readonly { readonly probability: number; readonly power: number }[];
}
