/**
 * How a target's flux is prepared. A small value: the prepared series is always recomputed from it, so two targets
 * with equal recipes and equal light curves have equal prepared series.
 */

export type ClipSide = 'high' | 'low' | 'both';

export type Clip =
  | { readonly kind: 'none' }
  | { readonly kind: 'sigma'; readonly side: ClipSide; readonly sigma: number };

export type Detrend =
  | { readonly kind: 'none' }
  | {
      /** A sliding Tukey biweight location; `windowDays` is the full width of the window. */
      readonly kind: 'biweight';
      readonly windowDays: number;
    };

export interface Recipe {
  /** Name of the flux column used; undefined takes the file's most processed column. */
  readonly fluxColumn: string | undefined;
  /** Points whose quality shares a bit with this mask are left out; 0 leaves none out, -1 every flagged point. */
  readonly qualityMask: number;
  readonly clip: Clip;
  readonly detrend: Detrend;
  /** When set, points inside the events of the target's cases carry no weight in the trend. */
  readonly protectCases: boolean;
}

export const DEFAULT_RECIPE: Recipe = {
  fluxColumn: undefined,
  qualityMask: -1,
  clip: { kind: 'sigma', side: 'high', sigma: 4 },
  detrend: { kind: 'biweight', windowDays: 1.5 },
  protectCases: false,
};
