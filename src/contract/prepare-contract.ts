import type { Ephemeris } from '../core/ephemeris.ts';
import type { Interval } from '../core/interval.ts';
import type { FluxUnit, LightCurve } from '../core/light-curve.ts';
import type { Recipe } from '../core/recipe.ts';
import type { Outcome } from './outcome.ts';

export interface PrepareJob {
  readonly jobId: string;
  /** Echoed in the result. */
  readonly key: string;
  readonly lightCurve: LightCurve;
  readonly recipe: Recipe;
  /** Points inside are left out (marks of kind exclude). */
  readonly excluded: readonly Interval[];
  /** Points inside these events carry no weight in the trend. */
  readonly protectedEvents: readonly Ephemeris[];
  readonly protectedIntervals: readonly Interval[];
}

/** Why a point is not in the prepared series. */
export type DropReason = 'flagged' | 'clipped' | 'excluded';
export const DROP_REASONS: readonly DropReason[] = ['flagged', 'clipped', 'excluded'];

/** All arrays of one length n, ascending in time, without NaN. Flux is relative: out of events it is near 1. */
export interface PreparedSeries {
  readonly key: string;
  readonly time: Float64Array;
  /** The chosen flux column divided by its median (magnitudes are turned into flux first). */
  readonly raw: Float64Array;
  /** Same unit as `raw`; 1 everywhere without detrending. */
  readonly trend: Float64Array;
  /** raw / trend. */
  readonly flux: Float64Array;
  /** One sigma of `flux`. */
  readonly error: Float64Array;
  readonly errorOrigin: 'given' | 'estimated';
  /** Index of each point in the light curve. */
  readonly sourceIndex: Int32Array;
  /** Points that were left out but have a flux: drawn apart. `reason` indexes DROP_REASONS. */
  readonly dropped: { readonly time: Float64Array; readonly raw: Float64Array; readonly reason: Uint8Array };
  readonly missing: number;
  /** Robust standard deviation of `flux` (1.4826 MAD), relative. */
  readonly scatter: number;
  readonly cadenceDays: number;
  readonly spanDays: number;
  readonly fluxColumn: string;
  /** Of the column as read. With 'sigma', depths are in sigma and not relative. */
  readonly fluxUnit: FluxUnit;
  readonly warnings: readonly string[];
}

export interface PrepareWorker {
  prepare(job: PrepareJob): Promise<Outcome<PreparedSeries>>;
  cancel(jobId: string): Promise<void>;
}
