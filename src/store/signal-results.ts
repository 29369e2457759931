import { DEFAULT_LOMB_SCARGLE, type LombScargleResult } from '../contract/lomb-scargle-contract.ts';
import { failed, type Outcome } from '../contract/outcome.ts';
import type { DepthLoss, PreparedSeries } from '../contract/prepare-contract.ts';
import type { FalseAlarmResult, SearchSeries } from '../contract/search-contract.ts';
import type {
  PeriodsFromTimesJob,
  PeriodsFromTimesResult,
  SingleEventsResult,
  SinglePeriodJob,
  SinglePeriodResult,
} from '../contract/single-events-contract.ts';
import type { Ephemeris } from '../core/ephemeris.ts';
import { falseAlarmProbability } from '../core/extreme-value.ts';
import { stableKey } from '../core/stable-key.ts';
import type { Jobs, TaskPriority } from '../jobs/jobs.ts';
import type { SessionDocument, Target } from '../session/document.ts';
import { instrumentSpansOf } from './instrument-spans.ts';
import { type BoundedValue, fileResult, type ResultsStore } from './results-store.ts';
import type { RunOnce } from './run-once.ts';
import {
  falseAlarmKey,
  modesKey,
  preparationOf,
  preparedKey,
  SURROGATES,
  searchKey,
  searchSettingsOf,
  sinesKey,
  singleSettingsOf,
  singlesKey,
} from './target-keys.ts';
import { runKey, seriesOf, type TargetResults } from './target-results.ts';

const SURROGATES_TITLE = 'False alarms';

type CacheName = 'sines' | 'singles' | 'falseAlarms' | 'depthLosses';
type CacheValue<N extends CacheName> = BoundedValue<N>;
type Own<Job> = Omit<Job, 'jobId' | 'key' | 'seriesId'>;

/** What is asked about the signals of a target beyond its box search, each computed once and filed under its key. */
export interface SignalResults {
  sines(target: Target): Promise<LombScargleResult | undefined>;
  singles(target: Target): Promise<SingleEventsResult | undefined>;
  /** Also puts the probability of the strongest peak into the docket's summary of the target. */
  falseAlarms(target: Target, priority?: TaskPriority): Promise<FalseAlarmResult | undefined>;
  depthLoss(target: Target, ephemeris: Ephemeris, depth: number): Promise<DepthLoss | undefined>;
  periodsFromTimes(target: Target, job: Own<PeriodsFromTimesJob>): Promise<Outcome<PeriodsFromTimesResult>>;
  periodOfSingle(target: Target, job: Own<SinglePeriodJob>): Promise<Outcome<SinglePeriodResult>>;
}

export const depthLossKey = (target: Target, ephemeris: Ephemeris): string =>
  stableKey({ depthLoss: preparedKey(target), ...ephemeris });

export function createSignalResults(deps: {
  readonly jobs: Jobs;
  readonly results: ResultsStore;
  readonly runs: RunOnce;
  readonly targetResults: TargetResults;
  readonly document: () => SessionDocument | undefined;
}): SignalResults {
  const { jobs, results, runs, targetResults, document } = deps;

  /** From the cache, or computed once and filed there. */
  function cached<N extends CacheName>(
    name: N,
    key: string,
    run: () => Promise<CacheValue<N> | undefined>,
  ): Promise<CacheValue<N> | undefined> {
    const known = results.getState()[name].get(key) as CacheValue<N> | undefined;
    if (known !== undefined) return Promise.resolve(known);
    return runs.once(key, async () => {
      const value = await run();
      if (value !== undefined) fileResult(results, name, key, value);
      return value;
    });
  }

  async function onSeries<T>(
    target: Target,
    run: (series: PreparedSeries) => Promise<T | undefined>,
    priority: TaskPriority = 'now',
  ): Promise<T | undefined> {
    const series = await targetResults.prepared(target, priority);
    return series === undefined ? undefined : run(series);
  }

  /** What is asked once and kept in the case: not cached, and its reason for failing is the asker's to say. */
  async function ask<T>(target: Target, run: (series: PreparedSeries) => Promise<Outcome<T>>): Promise<Outcome<T>> {
    const series = await targetResults.prepared(target);
    return series === undefined ? failed('The flux of this target is not prepared.') : run(series);
  }

  async function measureDepthLoss(target: Target, key: string, ephemeris: Ephemeris, depth: number) {
    const read = await targetResults.lightCurve(target);
    if (read === undefined) return undefined;
    const { recipe, excluded, protectedIntervals } = preparationOf(target);
    const job = {
      key,
      lightCurve: read.lightCurve,
      recipe,
      excluded,
      protectedIntervals,
      instrumentSpans: instrumentSpansOf(target, document()),
      commonModes: results.getState().modes.get(modesKey(target)),
      ephemeris,
      depth,
    };
    return runs.settle(key, jobs.measureDepthLoss(job));
  }

  function summariseChance(target: Target, falseAlarm: FalseAlarmResult): void {
    const { summaries } = results.getState();
    const summary = summaries.get(target.id);
    if (summary?.key !== searchKey(target) || summary.objective === undefined) return;
    const probability = falseAlarmProbability(falseAlarm, summary.objective);
    const next = new Map(summaries).set(target.id, { ...summary, falseAlarmProbability: probability });
    results.setState({ summaries: next });
  }

  return {
    sines: (target) => {
      const key = sinesKey(target);
      const report = runs.progressOf(key, 'Lomb-Scargle', 'sines');
      return cached('sines', key, () =>
        onSeries(target, (series) => {
          const job = { key, series: undetrended(series), settings: DEFAULT_LOMB_SCARGLE };
          return runs.settle(key, jobs.lombScargle(job, report));
        }),
      );
    },
    singles: (target) => {
      const key = singlesKey(target);
      return cached('singles', key, () =>
        onSeries(target, (series) => {
          const job = { key, series: seriesOf(series), settings: singleSettingsOf(target) };
          return runs.settle(key, jobs.findSingleEvents(job));
        }),
      );
    },
    falseAlarms: async (target, priority = 'now') => {
      const key = falseAlarmKey(target);
      const run = runKey(key, priority);
      const report = priority === 'sweep' ? () => undefined : runs.progressOf(key, SURROGATES_TITLE, 'surrogates');
      const found = await cached('falseAlarms', key, () =>
        onSeries(
          target,
          (series) => {
            const job = { key, series: seriesOf(series), settings: searchSettingsOf(target), ...SURROGATES };
            return runs.settle(run, jobs.searchSurrogates(job, report, priority), key);
          },
          priority,
        ),
      );
      if (found !== undefined) summariseChance(target, found);
      return found;
    },
    depthLoss: (target, ephemeris, depth) => {
      const key = depthLossKey(target, ephemeris);
      return cached('depthLosses', key, () => measureDepthLoss(target, key, ephemeris, depth));
    },
    periodsFromTimes: (target, job) => {
      const key = stableKey({ periods: preparedKey(target), job });
      return ask(target, (series) => jobs.periodsFromTimes({ key, series: seriesOf(series), ...job }).promise);
    },
    periodOfSingle: (target, job) => {
      const key = stableKey({ single: preparedKey(target), job });
      return ask(target, (series) => jobs.periodOfSingle({ key, series: seriesOf(series), ...job }).promise);
    },
  };
}

/** For the star's own variation the trend must stay in: the raw flux of the points that are kept. */
function undetrended({ key, time, raw, error, trend }: PreparedSeries): SearchSeries {
  return { seriesId: `raw ${key}`, time, flux: raw, error: error.map((sigma, i) => sigma * Math.abs(trend[i]!)) };
}
