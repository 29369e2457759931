import type { Detrend, DetrendKind } from '../../../src/core/recipe.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { locateByBiweight } from './biweight.ts';
import { fitHarmonicTrend } from './harmonics.ts';
import { locateByMedian } from './running-median.ts';
import { locateByPolynomial } from './savitzky-golay.ts';
import { fitSlidingTrend } from './sliding-trend.ts';
import { fitSplineTrend } from './spline.ts';
import type { TrendInput } from './trend-input.ts';

/** The trend of a series, in the unit of its flux; undefined when cancelled. */
type Detrender<K extends DetrendKind> = (
  detrend: Extract<Detrend, { kind: K }>,
  input: TrendInput,
  checkpoint: Checkpoint,
) => Promise<Float64Array | undefined>;

/** Every detrender there is: its file, and its row here. */
const DETRENDERS: { readonly [K in DetrendKind]: Detrender<K> } = {
  none: async (_, { time }) => new Float64Array(time.length).fill(1),
  biweight: ({ windowDays }, input, checkpoint) => fitSlidingTrend(input, windowDays, locateByBiweight, checkpoint),
  'running median': ({ windowDays }, input, checkpoint) =>
    fitSlidingTrend(input, windowDays, locateByMedian, checkpoint),
  'savitzky-golay': ({ windowDays, degree }, input, checkpoint) =>
    fitSlidingTrend(input, windowDays, locateByPolynomial(degree), checkpoint),
  spline: async ({ knotDays }, input) => fitSplineTrend(input, knotDays),
  harmonics: ({ count }, input, checkpoint) => fitHarmonicTrend(input, count, checkpoint),
};

export function fitTrend(
  detrend: Detrend,
  input: TrendInput,
  checkpoint: Checkpoint,
): Promise<Float64Array | undefined> {
  const detrender = DETRENDERS[detrend.kind] as Detrender<DetrendKind>;
  return detrender(detrend, input, checkpoint);
}

/** Time scale below which a detrender follows what it sees; undefined where it has none. */
export function scaleDaysOf(detrend: Detrend): number | undefined {
  if ('windowDays' in detrend) return detrend.windowDays;
  return detrend.kind === 'spline' ? detrend.knotDays : undefined;
}
