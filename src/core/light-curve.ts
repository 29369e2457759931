/**
 * The light curve as it was read: a struct of arrays that is never mutated. Everything later (recipes, searches,
 * fits) is a function of it. Whatever a file does not say is 'unknown' or undefined here, never a guess.
 */

export type TimeScale = 'TDB' | 'TT' | 'UTC' | 'TAI' | 'unknown';
export type TimeFrame = 'barycentric' | 'heliocentric' | 'geocentric' | 'unknown';

/** What the numbers of a time axis mean: JD = zeroJd + time, in this scale and frame. */
export interface TimeReference {
  /** Julian date of time 0 (2457000 for "BJD - 2457000", 2400000.5 for MJD); undefined where the file does not say. */
  readonly zeroJd: number | undefined;
  readonly scale: TimeScale;
  readonly frame: TimeFrame;
}

/** Which moment of an exposure its time stamp names. */
export type StampConvention = 'start' | 'middle' | 'end' | 'unknown';
export type FluxMeaning = 'raw' | 'corrected' | 'aperture' | 'unknown';
/** 'sigma' is flux normalised to its own scatter: depths are then known only in sigma. */
export type FluxUnit = 'relative' | 'electron/s' | 'ppm' | 'magnitude' | 'sigma' | 'unknown';

export interface FluxColumn {
  readonly name: string;
  /** As in the file, in `unit`; NaN where missing. */
  readonly flux: Float64Array;
  /** One-sigma errors in `unit`; undefined where the file has none (preparation then estimates them and says so). */
  readonly error: Float64Array | undefined;
  readonly meaning: FluxMeaning;
  readonly unit: FluxUnit;
}

export interface LightCurve {
  /** Days, ascending, finite; see `timeReference`. */
  readonly time: Float64Array;
  readonly timeReference: TimeReference;
  readonly exposureDays: number | undefined;
  readonly stamp: StampConvention;
  /** The file's own word for its filter, or 'unknown'. */
  readonly passband: string;
  /** At least one. */
  readonly fluxColumns: readonly FluxColumn[];
  /** Bit flags of each time; 0 is good. All zero where the file has no such column. */
  readonly quality: Int32Array;
  readonly hasQuality: boolean;
  /** Other numbers measured at each time, by their name in the file (background, centroidX, airmass ...). */
  readonly covariates: Readonly<Record<string, Float64Array>>;
  /** Index of the first point of each segment (run, night, quarter); always starts with 0. */
  readonly segmentStarts: Int32Array;
}

/** What a stars table or a file header says of the star. Everything may be absent. */
export interface StarParameters {
  readonly raDeg?: number | undefined;
  readonly decDeg?: number | undefined;
  readonly magnitude?: number | undefined;
  readonly magnitudeBand?: string | undefined;
  readonly teffK?: number | undefined;
  readonly teffErrorK?: number | undefined;
  readonly radiusSolar?: number | undefined;
  readonly radiusErrorSolar?: number | undefined;
  readonly massSolar?: number | undefined;
  readonly massErrorSolar?: number | undefined;
  readonly loggCgs?: number | undefined;
  readonly loggErrorCgs?: number | undefined;
  /** Mean density in g cm^-3. */
  readonly densityCgs?: number | undefined;
  readonly densityErrorCgs?: number | undefined;
}
