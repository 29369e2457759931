import type { CommonModes, PreparedSeries } from '../contract/prepare-contract.ts';
import type { BoxSearchResult, SearchSeries } from '../contract/search-contract.ts';
import type { Jobs, TaskPriority } from '../jobs/jobs.ts';
import type { SessionDocument, Target } from '../session/document.ts';
import { instrumentSpansOf } from './instrument-spans.ts';
import { fileResult, type LightCurveRead, type ResultsStore, type TargetSummary, withEntry } from './results-store.ts';
import type { RunOnce } from './run-once.ts';
import type { SessionStorage } from './session-storage.ts';
import { failedSummary, summariseTarget } from './summarise-target.ts';
import { lightCurveKey, preparationOf, preparedKey, searchKey, searchSettingsOf } from './target-keys.ts';

/**
 * Brings what is computed of a target into the results store, each step once however often it is asked for. Every
 * step is filed under the key of its own inputs, so an answer that comes late can only ever be filed, never shown in
 * the place of another. A sweep files no series, only summaries: the caches stay with what is on the screen.
 */
export interface TargetResults {
  lightCurve(target: Target, priority?: TaskPriority): Promise<LightCurveRead | undefined>;
  prepared(target: Target, priority?: TaskPriority): Promise<PreparedSeries | undefined>;
  search(target: Target, priority?: TaskPriority): Promise<BoxSearchResult | undefined>;
  /** Searches even where the analyst cancelled before. */
  searchAgain(target: Target): void;
}

export interface TargetResultsDeps {
  readonly jobs: Jobs;
  readonly storage: SessionStorage;
  readonly results: ResultsStore;
  readonly runs: RunOnce;
  readonly document: () => SessionDocument | undefined;
  /** Undefined where they cannot be found; the reason is filed under the key. */
  readonly commonModes: (target: Target, key: string) => Promise<CommonModes | undefined>;
}

const MOST_SUMMARIES = 20_000;

export function createTargetResults(deps: TargetResultsDeps): TargetResults {
  const { jobs, storage, results, runs } = deps;
  const { once, settle } = runs;

  async function readLightCurve(target: Target, key: string, priority: TaskPriority) {
    const file = target.files[0]!;
    const bytes = await storage.readFile(file.sha256);
    if (bytes === undefined) {
      fileResult(results, 'failures', key, `${file.name} is not on this machine. Open the file again to see its flux.`);
      return undefined;
    }
    const outcome = await jobs.readFile(file.name, bytes, file.mapping);
    if (outcome.kind === 'failed') fileResult(results, 'failures', key, outcome.error.sentence);
    if (outcome.kind !== 'done' || outcome.value.kind !== 'light curve') return undefined;
    if (priority !== 'sweep') fileResult(results, 'lightCurves', key, outcome.value);
    return outcome.value;
  }

  async function prepareTarget(target: Target, key: string, priority: TaskPriority) {
    const read = await lightCurve(target, priority);
    if (read === undefined) {
      const reason = results.getState().failures.get(lightCurveKey(target));
      if (reason !== undefined) fileResult(results, 'failures', key, reason);
      return undefined;
    }
    const needsModes = target.recipe.commonModes > 0;
    const commonModes = needsModes ? await deps.commonModes(target, key) : undefined;
    if (needsModes && commonModes === undefined) return undefined;
    const job = {
      key,
      lightCurve: read.lightCurve,
      ...preparationOf(target),
      instrumentSpans: instrumentSpansOf(target, deps.document()),
      commonModes,
    };
    const value = await settle(runKey(key, priority), jobs.prepare(job, priority), key);
    if (value !== undefined && priority !== 'sweep') fileResult(results, 'prepared', key, value);
    return value;
  }

  async function searchTarget(target: Target, key: string, priority: TaskPriority) {
    const series = await prepared(target, priority);
    if (series === undefined) {
      summariseFailure(target, key, preparedKey(target));
      return undefined;
    }
    const task = jobs.searchBox(
      { key, series: seriesOf(series), settings: searchSettingsOf(target) },
      priority === 'sweep' ? () => undefined : runs.progressOf(key, 'Box search', 'periods'),
      priority,
    );
    const value = await settle(runKey(key, priority), task, key);
    if (value === undefined) summariseFailure(target, key, key);
    else {
      if (priority !== 'sweep') fileResult(results, 'searches', key, value);
      summarise(target, summariseTarget(series, value));
    }
    return value;
  }

  function summarise(target: Target, summary: TargetSummary): void {
    results.setState({ summaries: withEntry(results.getState().summaries, target.id, summary, MOST_SUMMARIES) });
  }

  /** So that the docket says why there is nothing, and a sweep does not try again what cannot be done. */
  function summariseFailure(target: Target, key: string, failureKey: string): void {
    const failure = results.getState().failures.get(failureKey);
    if (failure !== undefined) summarise(target, failedSummary(key, failure));
  }

  /** A sweep waits for what runs for the screen anyway; the screen never waits for a sweep. */
  const runFor = (key: string, priority: TaskPriority): string => (runs.isUnderway(key) ? key : runKey(key, priority));

  function lightCurve(target: Target, priority: TaskPriority = 'now') {
    const key = lightCurveKey(target);
    const known = results.getState().lightCurves.get(key);
    return known !== undefined
      ? Promise.resolve(known)
      : once(runFor(key, priority), () => readLightCurve(target, key, priority));
  }

  function prepared(target: Target, priority: TaskPriority = 'now') {
    const key = preparedKey(target);
    const known = results.getState().prepared.get(key);
    return known !== undefined
      ? Promise.resolve(known)
      : once(runFor(key, priority), () => prepareTarget(target, key, priority));
  }

  function search(target: Target, priority: TaskPriority = 'now') {
    const key = searchKey(target);
    const known = results.getState().searches.get(key);
    return known !== undefined
      ? Promise.resolve(known)
      : once(runFor(key, priority), () => searchTarget(target, key, priority));
  }

  return {
    lightCurve,
    prepared,
    search,
    searchAgain(target) {
      runs.forgive(searchKey(target));
      void search(target);
    },
  };
}

/** What a sweep computes is not filed: whoever needs it for the screen runs it for himself. */
export const runKey = (key: string, priority: TaskPriority): string => (priority === 'sweep' ? `sweep ${key}` : key);

export function seriesOf({ key, time, flux, error }: PreparedSeries): SearchSeries {
  return { seriesId: key, time, flux, error };
}
