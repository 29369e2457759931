import { createStore } from 'zustand/vanilla';
import type { LombScargleResult } from '../contract/lomb-scargle-contract.ts';
import type { Progress } from '../contract/outcome.ts';
import type { CommonModes, DepthLoss, PreparedSeries } from '../contract/prepare-contract.ts';
import type { ReadResult } from '../contract/read-contract.ts';
import type { BoxSearchResult, FalseAlarmResult } from '../contract/search-contract.ts';
import type { SingleEventsResult } from '../contract/single-events-contract.ts';

/**
 * What was computed, filed under the key of its inputs: bounded, rebuildable, never part of the document. A result
 * is shown only where its key equals the key of what is on the screen now.
 */

export type LightCurveRead = Extract<ReadResult, { kind: 'light curve' }>;

/** What the docket shows of a target without its series in memory. */
export interface TargetSummary {
  /** Key of the search it came from. */
  readonly key: string;
  readonly periodDays: number | undefined;
  readonly signalToNoise: number | undefined;
  readonly sde: number | undefined;
  readonly eventCount: number | undefined;
  /** Relative box depth. */
  readonly depth: number | undefined;
  /** What the strongest peak is ranked by: its S/N as the search's objective asks. */
  readonly objective: number | undefined;
  /** Of the strongest peak, from surrogates; undefined where it was not asked for. */
  readonly falseAlarmProbability: number | undefined;
  /** Why there is no search. */
  readonly failure: string | undefined;
  /** Lowest relative flux of 64 equal spans of the series (NaN where empty), for the small strip. */
  readonly smallStrip: readonly number[];
  /** 40 binned relative fluxes around mid-event (NaN where empty), for the small fold. */
  readonly smallFold: readonly number[];
}

export type SweepKind = 'search' | 'false alarms';

export interface RunningJob {
  readonly title: string;
  /** What the progress counts. */
  readonly unit: string;
  readonly progress: Progress;
  readonly startedAt: number;
  readonly cancel: () => void;
}

export interface ResultsState {
  /** By SHA-256 of the file and mapping key. */
  readonly lightCurves: ReadonlyMap<string, LightCurveRead>;
  readonly prepared: ReadonlyMap<string, PreparedSeries>;
  readonly searches: ReadonlyMap<string, BoxSearchResult>;
  readonly sines: ReadonlyMap<string, LombScargleResult>;
  readonly singles: ReadonlyMap<string, SingleEventsResult>;
  readonly falseAlarms: ReadonlyMap<string, FalseAlarmResult>;
  readonly modes: ReadonlyMap<string, CommonModes>;
  readonly depthLosses: ReadonlyMap<string, DepthLoss>;
  /** A sentence for each key whose job failed. */
  readonly failures: ReadonlyMap<string, string>;
  readonly summaries: ReadonlyMap<string, TargetSummary>;
  /** Jobs long enough to show, by key. */
  readonly running: ReadonlyMap<string, RunningJob>;
  /** Keys of searches the analyst cancelled: they are not started again by themselves. */
  readonly cancelledKeys: ReadonlySet<string>;
  readonly sweep:
    | { readonly what: SweepKind; readonly done: number; readonly total: number; readonly startedAt: number }
    | undefined;
}

export type ResultsStore = ReturnType<typeof createResultsStore>;

const LIMITS = {
  lightCurves: 24,
  prepared: 24,
  searches: 32,
  sines: 12,
  singles: 24,
  falseAlarms: 400,
  modes: 4,
  depthLosses: 100,
  failures: 400,
} as const;

export function createResultsStore() {
  return createStore<ResultsState>()(() => ({
    lightCurves: new Map(),
    prepared: new Map(),
    searches: new Map(),
    sines: new Map(),
    singles: new Map(),
    falseAlarms: new Map(),
    modes: new Map(),
    depthLosses: new Map(),
    failures: new Map(),
    summaries: new Map(),
    running: new Map(),
    cancelledKeys: new Set(),
    sweep: undefined,
  }));
}

/** A copy with the entry newest; the oldest go when there are more than `limit`. */
export function withEntry<V>(map: ReadonlyMap<string, V>, key: string, value: V, limit: number): Map<string, V> {
  const copy = new Map(map);
  copy.delete(key);
  copy.set(key, value);
  for (const oldest of copy.keys()) {
    if (copy.size <= limit) break;
    copy.delete(oldest);
  }
  return copy;
}

export function withoutEntry<V>(map: ReadonlyMap<string, V>, key: string): Map<string, V> {
  const copy = new Map(map);
  copy.delete(key);
  return copy;
}

type BoundedName = keyof typeof LIMITS;
export type BoundedValue<N extends BoundedName> = ResultsState[N] extends ReadonlyMap<string, infer V> ? V : never;

/** Files a result under its key in one of the bounded caches. */
export function fileResult<N extends BoundedName>(
  store: ResultsStore,
  name: N,
  key: string,
  value: BoundedValue<N>,
): void {
  const map = store.getState()[name] as ReadonlyMap<string, BoundedValue<N>>;
  store.setState({ [name]: withEntry(map, key, value, LIMITS[name]) } as Partial<ResultsState>);
}
