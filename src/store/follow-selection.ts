import type { Target } from '../session/document.ts';
import type { DocumentStore } from './document-store.ts';
import type { ResultsState, ResultsStore } from './results-store.ts';
import { lightCurveKey, preparedKey, searchKey } from './target-keys.ts';
import type { TargetResults } from './target-results.ts';
import type { ViewStore } from './view-store.ts';

/**
 * Computes what the selected target needs, and drops what it no longer needs: when the recipe or the selection
 * changes, everything running for another key is cancelled, and its answer could not be shown anyway.
 */
export function followSelection(deps: {
  document: DocumentStore;
  view: ViewStore;
  results: ResultsStore;
  targetResults: TargetResults;
}): () => void {
  const { document, view, results, targetResults } = deps;
  let followed = '';

  function follow() {
    // A drag's preview must not start searches: only what is committed counts.
    const target = selectedTarget(document, view);
    if (target === undefined) return;
    const key = searchKey(target);
    if (key === followed) return;
    followed = key;
    if (results.getState().sweep === undefined)
      targetResults.cancelAllBut(new Set([key, preparedKey(target), lightCurveKey(target)]));
    if (results.getState().cancelledKeys.has(key)) void targetResults.prepared(target);
    else void targetResults.search(target);
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

function selectedTarget(document: DocumentStore, view: ViewStore): Target | undefined {
  const { targetId } = view.getState();
  return document.getState().history?.present.targets.find((target) => target.id === targetId);
}
