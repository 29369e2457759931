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
  /** Times of the instrument (dumps, slews) at which no point is trusted. */
  readonly instrumentSpans: readonly Interval[];
  /** Needed where the recipe takes common modes out. */
  readonly commonModes: CommonModes | undefined;
}

/** Why a point is not in the prepared series. */
export type DropReason = 'flagged' | 'clipped' | 'excluded' | 'flare' | 'instrument';
export const DROP_REASONS: readonly DropReason[] = ['flagged', 'clipped', 'excluded', 'flare', 'instrument'];

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
  /** Index of the first point of each piece: no trend reaches across from one to the next. Starts with 0. */
  readonly pieceStarts: Int32Array;
  /** Length n, 1 where the window was cut off by the end of a piece: the trend is less sure there. */
  readonly isAtEdge: Uint8Array;
  /** Flares found and left out, with their tails. */
  readonly flares: readonly Interval[];
  /** Times of sudden drops at which the series was split. */
  readonly drops: readonly number[];
  /** Robust standard deviation of `flux` (1.4826 MAD), relative. */
  readonly scatter: number;
  readonly cadenceDays: number;
  readonly spanDays: number;
  readonly fluxColumn: string;
  /** Of the column as read. With 'sigma', depths are in sigma and not relative. */
  readonly fluxUnit: FluxUnit;
  readonly warnings: readonly string[];
}

/** One star's contribution to the docket's common modes: relative flux without its cases' events. */
export interface ModeStar {
  readonly time: Float64Array;
  readonly flux: Float64Array;
  /** The mask of its own events, so that no planet becomes a mode. */
  readonly masked: readonly Ephemeris[];
}

export interface CommonModesJob {
  readonly jobId: string;
  readonly key: string;
  readonly stars: readonly ModeStar[];
  readonly modeCount: number;
}

/** What the docket's quiet stars do together, on a lattice of times. */
export interface CommonModes {
  readonly key: string;
  /** Days, ascending, length n. */
  readonly time: Float64Array;
  /** Each of length n, zero mean and unit scatter, strongest first; NaN where no star has data. */
  readonly modes: readonly Float64Array[];
  /** Share of the stars' common variance of each. */
  readonly explained: readonly number[];
  readonly starsUsed: number;
}

export interface DepthLossJob extends Omit<PrepareJob, 'protectedEvents'> {
  readonly ephemeris: Ephemeris;
  /** Relative depth of the dips that are injected. */
  readonly depth: number;
}

/** What preparation leaves of a dip like this one, measured by injection at the same period but other phases. */
export interface DepthLoss {
  readonly key: string;
  /** Recovered over injected depth, mean over the phases. */
  readonly keptFraction: number;
  readonly keptFractionError: number;
  readonly injections: number;
}

export interface PrepareWorker {
  prepare(job: PrepareJob): Promise<Outcome<PreparedSeries>>;
  /** Fails with a sentence where the docket has too few quiet stars with common times. */
  findCommonModes(job: CommonModesJob): Promise<Outcome<CommonModes>>;
  measureDepthLoss(job: DepthLossJob): Promise<Outcome<DepthLoss>>;
  cancel(jobId: string): Promise<void>;
}
