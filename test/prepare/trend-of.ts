import type { Detrend, DetrendKind } from '../../src/core/recipe.ts';
import { detrenderOf } from '../../workers/prepare/detrend/detrenders.ts';
import type { Detrender, TrendInput } from '../../workers/prepare/detrend/trend-input.ts';
import { quietCheckpoint } from '../search/search-box.ts';

/** The trend of a detrender alone, every point with weight unless told otherwise. */
export async function trendOf(
  detrend: Detrend,
  time: Float64Array,
  flux: Float64Array,
  rest: Partial<TrendInput> = {},
): Promise<Float64Array> {
  const hasWeight = new Uint8Array(time.length).fill(1);
  const detrender = detrenderOf(detrend) as Detrender<DetrendKind>;
  const input = { time, flux, hasWeight, splits: [], protectedEvents: [], ...rest };
  return (await detrender.fit(detrend, input, quietCheckpoint()))!;
}
