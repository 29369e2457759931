import type { Ephemeris } from '../../../src/core/ephemeris.ts';
import type { Detrend, DetrendKind } from '../../../src/core/recipe.ts';
import type { Checkpoint } from '../../checkpoint.ts';

/** What a detrender is given. */
export interface TrendInput {
  /** Days, ascending, length n. */
  readonly time: Float64Array;
  /** Relative flux, length n. */
  readonly flux: Float64Array;
  /** Length n; points with 0 carry no weight but get a trend. */
  readonly hasWeight: Uint8Array;
  /** Indices of points that no trend reaches across to: starts of segments, sudden drops. Ascending, without 0. */
  readonly splits: readonly number[];
  /** Signals whose harmonics a trend must spare. */
  readonly protectedEvents: readonly Ephemeris[];
  /** The trend of the same points with other weights: what did not change may be taken over. */
  readonly before?: Pick<TrendInput, 'hasWeight'> & { readonly trend: Float64Array };
}

/** The recipe's settings of one kind. */
export type DetrendOf<K extends DetrendKind> = Extract<Detrend, { kind: K }>;

/** A way to find a slow trend. One file each, and one row in the list of them. */
export interface Detrender<K extends DetrendKind> {
  /** Full width of what a trend looks at around a time; undefined where it looks at everything. */
  readonly scaleDays: (detrend: DetrendOf<K>) => number | undefined;
  /** The analyst's word for that width. */
  readonly scaleName: string;
  /** What the width must at least hold: this many cadences. */
  readonly leastCadences: (detrend: DetrendOf<K>) => number;
  /** Length n, in the unit of flux, finite; undefined when cancelled. */
  readonly fit: (detrend: DetrendOf<K>, input: TrendInput, checkpoint: Checkpoint) => Promise<Float64Array | undefined>;
}
