/**
 * How a target's flux is prepared. A small value: the prepared series is always recomputed from it, so two targets
 * with equal recipes and equal light curves have equal prepared series.
 */

export type ClipSide = 'high' | 'low' | 'both';

export type Clip =
  | { readonly kind: 'none' }
  | { readonly kind: 'sigma'; readonly side: ClipSide; readonly sigma: number };

/** A slow trend, divided out. `windowDays` is the full width of a sliding window. */
export type Detrend =
  | { readonly kind: 'none' }
  /** A sliding Tukey biweight location. */
  | { readonly kind: 'biweight'; readonly windowDays: number }
  | { readonly kind: 'running median'; readonly windowDays: number }
  /** Local polynomial of least squares, Savitzky & Golay (1964). */
  | { readonly kind: 'savitzky-golay'; readonly windowDays: number; readonly degree: number }
  /** Penalised cubic spline with sigma clipping; `knotDays` is the time scale that it can follow. */
  | { readonly kind: 'spline'; readonly knotDays: number }
  /** Prewhitening by at most `count` sines; harmonics of the protected events' periods are spared. */
  | { readonly kind: 'harmonics'; readonly count: number };

export type DetrendKind = Detrend['kind'];

/** Linear regression on columns of the file, before the trend. */
export interface CovariateRegression {
  readonly names: readonly string[];
  /** What one set of coefficients holds for: the whole series, a segment of the file, or a night (a gap over 0.3 d). */
  readonly per: 'series' | 'segment' | 'night';
}

export interface Recipe {
  /** Name of the flux column used; undefined takes the file's most processed column. */
  readonly fluxColumn: string | undefined;
  /** Points whose quality shares a bit with this mask are left out; 0 leaves none out, -1 every flagged point. */
  readonly qualityMask: number;
  /** Flares are found by their shape and left out with their tails, before anything else. */
  readonly maskFlares: boolean;
  /** Sudden drops of sensitivity are found, and the series is split there: no window reaches across. */
  readonly splitAtDrops: boolean;
  readonly covariates: CovariateRegression | undefined;
  /** How many modes common to the docket's quiet stars are fitted and taken out; 0 takes none. */
  readonly commonModes: number;
  readonly clip: Clip;
  readonly detrend: Detrend;
  /** When set, points inside the events of the target's cases carry no weight in the trend. */
  readonly protectCases: boolean;
}

export const DEFAULT_RECIPE: Recipe = {
  fluxColumn: undefined,
  qualityMask: -1,
  maskFlares: true,
  splitAtDrops: true,
  covariates: undefined,
  commonModes: 0,
  clip: { kind: 'sigma', side: 'high', sigma: 4 },
  detrend: { kind: 'biweight', windowDays: 1.5 },
  protectCases: false,
};
