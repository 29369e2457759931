import type { PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { SeriesPoints } from './series-points.ts';

/** What is known to be the instrument's, before any trend. */
export interface Systematics {
  /** Near 1, to be divided by, or subtracted as a trend is where the unit is sigma; length n. Undefined: nothing. */
  readonly explained: Float64Array | undefined;
  readonly warnings: readonly string[];
}

/** How the series is cut before its trend, and whether a trend divides it. */
export interface SystematicsInput {
  readonly points: SeriesPoints;
  /** Indices of the first points after sudden drops. */
  readonly drops: readonly number[];
  /** Of these and of the file's segments. */
  readonly splits: readonly number[];
  readonly isSubtracted: boolean;
}

/** One kind of systematics; undefined where the recipe does not ask for it. */
export type ExplainStep = (job: PrepareJob, input: SystematicsInput, flux: Float64Array) => Systematics | undefined;
