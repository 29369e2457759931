/** Only what tests use of it; the JSDoc of the modules says the rest. */
export interface SignalTruth {
  readonly what: string;
  readonly periodDays?: number;
  readonly epochBjdMinus2459000: number;
  readonly durationHours: number;
  readonly depthPpm: number;
  readonly midDepthPpm: number;
  readonly eventsSeen: number;
  readonly timesBjdMinus2459000?: readonly number[];
}

export interface TargetTruth {
  readonly target: string;
  readonly file: string;
  readonly kind: string;
  readonly what: string;
  readonly cadenceMinutes: number;
  readonly noisePpm: number;
  readonly inStarsTable: boolean;
  readonly densityGcc?: number;
  readonly rotationDays?: number;
  readonly boxPeriodDays?: number;
  readonly signals: readonly SignalTruth[];
}

export interface MadeTarget {
  readonly target: {
    readonly id: string;
    readonly pair?: { readonly lightFraction?: number; readonly offsetPixels?: readonly [number, number] };
  };
  readonly series: {
    readonly time: Float64Array;
    readonly dips: Float64Array;
    readonly variability: Float64Array;
    readonly raw: Float64Array;
    readonly corrected: Float64Array;
    readonly error: Float64Array;
    readonly quality: Float64Array;
    readonly centroidX: Float64Array;
    readonly centroidY: Float64Array;
    readonly background: Float64Array;
    readonly level: number;
  };
}

export function buildDemoDocket(): {
  files: Map<string, Uint8Array>;
  made: MadeTarget[];
  truths: { readonly invented: boolean; readonly timeZeroJd: number; readonly targets: readonly TargetTruth[] };
};
