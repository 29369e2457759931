import type { Target } from '../session/document.ts';
import { nextUnruledTarget } from '../session/selectors.ts';
import { shownTargets } from './docket-rows.ts';
import type { DocumentStore } from './document-store.ts';
import type { ResultsState, ResultsStore } from './results-store.ts';
import type { RunOnce } from './run-once.ts';
import { lightCurveKey, preparedKey, searchKey } from './target-keys.ts';
import type { TargetResults } from './target-results.ts';
import type { ViewStore } from './view-store.ts';

/**
 * Computes what the selected target needs, then what the analyst will most likely ask for next, and drops what is no
 * longer needed: when the recipe or the selection changes, everything running for another key is cancelled, and its
 * answer could not be shown anyway.
 */
export function followSelection(deps: {
  document: DocumentStore;
  view: ViewStore;
  results: ResultsStore;
  runs: RunOnce;
  targetResults: TargetResults;
}): () => void {
  const { document, view, results, runs, targetResults } = deps;
  let followed = '';

  function follow() {
    // A drag's preview must not start searches: only what is committed counts.
    const committed = document.getState().history?.present;
    const target = committed?.targets.find(({ id }) => id === view.getState().targetId);
    if (committed === undefined || target === undefined) return;
    const key = searchKey(target);
    if (key === followed) return;
    followed = key;
    const next = likelyNext(shownTargets(committed, results.getState(), view.getState()), target);
    const kept = new Set([target, ...next].flatMap((one) => [searchKey(one), preparedKey(one), lightCurveKey(one)]));
    runs.cancelAllBut((running) => kept.has(running) || running.startsWith('sweep ') || running.startsWith('modes '));
    const wanted = results.getState().cancelledKeys.has(key)
      ? targetResults.prepared(target)
      : targetResults.search(target);
    void wanted.then(() => fetchAhead(key, next));
  }

  /** One after another, and only while the analyst stays here. */
  async function fetchAhead(key: string, targets: readonly Target[]): Promise<void> {
    for (const target of targets) {
      if (followed !== key) return;
      if (!results.getState().cancelledKeys.has(searchKey(target))) await targetResults.search(target, 'ahead');
    }
  }

  /** Files that were missing may have come: what failed is tried again. */
  function retry(state: ResultsState, before: ResultsState) {
    if (state.failures.size > 0 || before.failures.size === 0) return;
    followed = '';
    follow();
  }

  const stops = [document.subscribe(follow), view.subscribe(follow), results.subscribe(retry)];
  follow();
  return () => {
    for (const stop of stops) stop();
  };
}

/** The next unruled target, and the next and last in the docket as it is shown. */
function likelyNext(targets: readonly Target[], target: Target): readonly Target[] {
  const at = targets.indexOf(target);
  const likely = [nextUnruledTarget(targets, target.id), targets[at + 1], targets[at - 1]];
  return [...new Set(likely)].filter((one) => one !== undefined && one !== target) as Target[];
}
