import type { Clip, Detrend, DetrendKind } from '../../src/core/recipe.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { detrenderOf } from './detrend/detrenders.ts';
import type { Detrender, TrendInput } from './detrend/trend-input.ts';
import { clipBySigma } from './sigma-clip.ts';

export interface TrendJob extends Pick<TrendInput, 'time' | 'splits' | 'protectedEvents'> {
  /** Relative, length n. */
  readonly raw: Float64Array;
  readonly detrend: Detrend;
  readonly clip: Clip;
  /** 1 where a point carries no weight in the trend and is never clipped. */
  readonly isProtected: Uint8Array;
  /** Whether the trend is subtracted instead of divided by. */
  readonly isSubtracted: boolean;
}

export interface Trended {
  /** Length n, also at clipped points. */
  readonly trend: Float64Array;
  readonly flux: Float64Array;
  /** 1 where a point survived the clip. */
  readonly kept: Uint8Array;
}

/**
 * Detrends, clips outliers of the detrended flux, and does both again without them, so that outliers shape neither
 * the trend nor the clip.
 *
 * @returns a sentence when the trend cannot be divided by, undefined when cancelled
 */
export async function removeTrend(job: TrendJob, checkpoint: Checkpoint): Promise<Trended | string | undefined> {
  const { time, raw, clip, isProtected, splits, protectedEvents, detrend } = job;
  const kept = new Uint8Array(raw.length).fill(1);
  const detrender = detrenderOf(detrend) as Detrender<DetrendKind>;
  let trend: Float64Array | undefined;
  let before: TrendInput['before'];
  let flux = raw;
  for (let pass = 0; pass < 2; pass += 1) {
    const hasWeight = kept.map((keep, i) => (keep === 1 && isProtected[i] === 0 ? 1 : 0));
    const input = { time, flux: raw, hasWeight, splits, protectedEvents, ...(before && { before }) };
    trend = await detrender.fit(detrend, input, checkpoint);
    if (trend === undefined) return undefined;
    before = { hasWeight, trend };
    const low = trend.findIndex((value) => !job.isSubtracted && !(value > 0));
    if (low >= 0)
      return `The trend falls to ${Number(trend[low]!.toPrecision(3))} of the median flux at time ${time[low]}, and flux cannot be divided by it: exclude that span, widen the window or prepare without detrending.`;
    flux = applyTrend(raw, trend, job.isSubtracted);
    if (clip.kind === 'none' || clipBySigma(flux, kept, isProtected, clip.side, clip.sigma) === 0) break;
  }
  return { trend: trend ?? new Float64Array(raw.length).fill(1), flux, kept };
}

export function applyTrend(raw: Float64Array, trend: Float64Array, isSubtracted: boolean): Float64Array {
  return raw.map((value, i) => (isSubtracted ? 1 + value - trend[i]! : value / trend[i]!));
}

/** One trend that does what both do. */
export function joinTrends(a: Float64Array, b: Float64Array, isSubtracted: boolean): Float64Array<ArrayBuffer> {
  const joined = new Float64Array(a.length);
  for (let i = 0; i < joined.length; i += 1) joined[i] = isSubtracted ? a[i]! + b[i]! - 1 : a[i]! * b[i]!;
  return joined;
}
