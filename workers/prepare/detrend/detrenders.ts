import type { Detrend, DetrendKind } from '../../../src/core/recipe.ts';
import { biweight } from './biweight.ts';
import { harmonics } from './harmonics.ts';
import { none } from './none.ts';
import { runningMedian } from './running-median.ts';
import { savitzkyGolay } from './savitzky-golay.ts';
import { spline } from './spline.ts';
import type { Detrender } from './trend-input.ts';

/** Every detrender there is: its file, and its row here. */
const DETRENDERS: { readonly [K in DetrendKind]: Detrender<K> } = {
  none,
  biweight,
  'running median': runningMedian,
  'savitzky-golay': savitzkyGolay,
  spline,
  harmonics,
};

/** The detrender of a recipe. */
export function detrenderOf<K extends DetrendKind>({ kind }: Detrend & { readonly kind: K }): Detrender<K> {
  return DETRENDERS[kind];
}

/** Full width of what a trend looks at around a time; undefined where it looks at everything. */
export const scaleDaysOf = (detrend: Detrend): number | undefined =>
  (detrenderOf(detrend) as Detrender<DetrendKind>).scaleDays(detrend);
