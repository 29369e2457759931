import type { ModelCurve } from './model-layer.ts';
import type { SceneBasis } from './surface/mount-plot.ts';

/** A period, epoch and duration in days, as a hand sets them. */
export interface HandEphemeris {
  readonly periodDays: number;
  readonly epochDays: number;
  readonly durationDays: number;
}

/** Flux against time from mid-event, or against phase. */
export interface FoldScene extends SceneBasis, HandEphemeris {
  /** Days, any order; length n. */
  readonly time: Float64Array;
  /** ppm from the level outside events, length n. */
  readonly flux: Float64Array;
  readonly mode: 'event' | 'full';
  /** Half the width of the plot in event mode; never more than half a period is shown. */
  readonly halfWidthHours: number;
  /** Undefined: chosen from the duration. */
  readonly binMinutes?: number | undefined;
  /** Box model and depth caliper; undefined draws neither. */
  readonly boxDepthPpm?: number | undefined;
  /** A fitted model in place of the box: hours from mid-event and ppm. */
  readonly curve?: ModelCurve | undefined;
  /** Beside the depth caliper; undefined says the box depth. */
  readonly depthLabel?: string | undefined;
  /** In the duration caliper; undefined says "duration" and hours. */
  readonly durationLabel?: string | undefined;
  /** What the model leaves of the bins, under the fold, where the plot is tall enough. */
  readonly residuals?: boolean | undefined;
  readonly caseNumber: number | undefined;
  readonly tool?: 'epoch' | 'period' | undefined;
  readonly cursorHours?: number | undefined;
  readonly yTitle: string;
  readonly xTitle: string;
}
