import type { Outcome } from '../contract/outcome.ts';
import type { PreparedSeries } from '../contract/prepare-contract.ts';
import type { BoxSearchResult } from '../contract/search-contract.ts';
import type { Jobs, RunningTask, TaskPriority } from '../jobs/jobs.ts';
import type { Target } from '../session/document.ts';
import { fileResult, type LightCurveRead, type ResultsStore, withEntry, withoutEntry } from './results-store.ts';
import type { SessionStorage } from './session-storage.ts';
import { summariseTarget } from './summarise-target.ts';
import { lightCurveKey, preparationOf, preparedKey, searchKey, searchSettingsOf } from './target-keys.ts';

/**
 * Brings what is computed of a target into the results store, each step once however often it is asked for. Every
 * step is filed under the key of its own inputs, so an answer that comes late can only ever be filed, never shown in
 * the place of another.
 */
export interface TargetResults {
  lightCurve(target: Target): Promise<LightCurveRead | undefined>;
  prepared(target: Target, priority?: TaskPriority): Promise<PreparedSeries | undefined>;
  search(target: Target, priority?: TaskPriority): Promise<BoxSearchResult | undefined>;
  /** Searches even where the analyst cancelled before. */
  searchAgain(target: Target): void;
  /** Cancels every running preparation and search that is not of these keys. */
  cancelAllBut(keys: ReadonlySet<string>): void;
  /** Cancels one running search; the target is searched again when it is next shown. */
  cancel(key: string): void;
  /** The analyst cancelled it: it is not started again by itself. */
  cancelByHand(key: string): void;
}

export function createTargetResults(deps: {
  jobs: Jobs;
  storage: SessionStorage;
  results: ResultsStore;
  now: () => number;
}): TargetResults {
  const { jobs, storage, results, now } = deps;
  const underway = new Map<string, Promise<unknown>>();
  const cancels = new Map<string, () => void>();

  /** One run for each key: whoever asks while it runs waits for the same answer. */
  function once<T>(key: string, run: () => Promise<T>): Promise<T> {
    const waiting = underway.get(key);
    if (waiting !== undefined) return waiting as Promise<T>;
    const promise = run().finally(() => {
      underway.delete(key);
      cancels.delete(key);
      results.setState({ running: withoutEntry(results.getState().running, key) });
    });
    underway.set(key, promise);
    return promise;
  }

  async function settle<T>(key: string, task: RunningTask<T>): Promise<T | undefined> {
    cancels.set(key, task.cancel);
    const outcome: Outcome<T> = await task.promise;
    if (outcome.kind === 'failed') fileResult(results, 'failures', key, outcome.error.sentence);
    return outcome.kind === 'done' ? outcome.value : undefined;
  }

  async function readLightCurve(target: Target, key: string): Promise<LightCurveRead | undefined> {
    const file = target.files[0]!;
    const bytes = await storage.readFile(file.sha256);
    if (bytes === undefined) {
      fileResult(results, 'failures', key, `${file.name} is not on this machine. Open the file again to see its flux.`);
      return undefined;
    }
    const outcome = await jobs.readFile(file.name, bytes, file.mapping);
    if (outcome.kind === 'failed') fileResult(results, 'failures', key, outcome.error.sentence);
    if (outcome.kind !== 'done' || outcome.value.kind !== 'light curve') return undefined;
    fileResult(results, 'lightCurves', key, outcome.value);
    return outcome.value;
  }

  async function prepareTarget(target: Target, key: string, priority: TaskPriority) {
    const read = await lightCurve(target);
    if (read === undefined) {
      const reason = results.getState().failures.get(lightCurveKey(target));
      if (reason !== undefined) fileResult(results, 'failures', key, reason);
      return undefined;
    }
    const job = { key, lightCurve: read.lightCurve, ...preparationOf(target) };
    const value = await settle(key, jobs.prepare(job, priority));
    if (value !== undefined) fileResult(results, 'prepared', key, value);
    return value;
  }

  async function searchTarget(target: Target, key: string, priority: TaskPriority) {
    const series = await prepared(target, priority);
    if (series === undefined) return undefined;
    const startedAt = now();
    const task = jobs.searchBox(
      {
        key,
        series: { seriesId: series.key, time: series.time, flux: series.flux, error: series.error },
        settings: searchSettingsOf(target),
      },
      (progress) => {
        // A worker's last words may come after its job has ended here.
        if (!underway.has(key)) return;
        const job = { title: 'Box search', progress, startedAt, cancel: () => cancelByHand(key) };
        results.setState({ running: withEntry(results.getState().running, key, job, 64) });
      },
      priority,
    );
    const value = await settle(key, task);
    if (value === undefined) return undefined;
    fileResult(results, 'searches', key, value);
    const summary = summariseTarget(series, value);
    results.setState({ summaries: withEntry(results.getState().summaries, target.id, summary, 20_000) });
    return value;
  }

  function lightCurve(target: Target) {
    const key = lightCurveKey(target);
    const known = results.getState().lightCurves.get(key);
    return known !== undefined ? Promise.resolve(known) : once(key, () => readLightCurve(target, key));
  }

  function prepared(target: Target, priority: TaskPriority = 'now') {
    const key = preparedKey(target);
    const known = results.getState().prepared.get(key);
    return known !== undefined ? Promise.resolve(known) : once(key, () => prepareTarget(target, key, priority));
  }

  function search(target: Target, priority: TaskPriority = 'now') {
    const key = searchKey(target);
    const known = results.getState().searches.get(key);
    return known !== undefined ? Promise.resolve(known) : once(key, () => searchTarget(target, key, priority));
  }

  function cancelByHand(key: string) {
    results.setState({ cancelledKeys: new Set(results.getState().cancelledKeys).add(key) });
    cancels.get(key)?.();
  }

  return {
    lightCurve,
    prepared,
    search,
    cancelAllBut(keys) {
      for (const [key, cancel] of cancels) if (!keys.has(key)) cancel();
    },
    searchAgain(target) {
      const key = searchKey(target);
      const cancelledKeys = new Set(results.getState().cancelledKeys);
      cancelledKeys.delete(key);
      results.setState({ cancelledKeys, failures: withoutEntry(results.getState().failures, key) });
      void search(target);
    },
    cancel: (key) => cancels.get(key)?.(),
    cancelByHand,
  };
}
