import type { Ephemeris } from '../../../src/core/ephemeris.ts';

/** What a detrender is given. */
export interface TrendInput {
  /** Days, ascending, length n. */
  readonly time: Float64Array;
  /** Relative flux, length n. */
  readonly flux: Float64Array;
  /** Length n; points with 0 carry no weight but get a trend. */
  readonly hasWeight: Uint8Array;
  /** Indices of points that no trend reaches across to: starts of segments, sudden drops. Ascending. */
  readonly splits: readonly number[];
  /** Signals whose harmonics a trend must spare. */
  readonly protectedEvents: readonly Ephemeris[];
}
