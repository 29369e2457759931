import type { DocumentStore } from './document-store.ts';
import type { ResultsStore } from './results-store.ts';
import { searchKey } from './target-keys.ts';
import type { TargetResults } from './target-results.ts';

/** Searches every target of the docket that has no summary of its present recipe, one after another. */
export interface Sweep {
  start(): Promise<void>;
  cancel(): void;
}

export function createSweep(deps: {
  document: DocumentStore;
  results: ResultsStore;
  targetResults: TargetResults;
  now: () => number;
}): Sweep {
  const { document, results, targetResults, now } = deps;
  let stopped = false;
  let current: string | undefined;

  function unsearched() {
    const { summaries } = results.getState();
    const targets = document.getState().document?.targets ?? [];
    return targets.filter((target) => summaries.get(target.id)?.key !== searchKey(target));
  }

  return {
    async start() {
      if (results.getState().sweep !== undefined) return;
      stopped = false;
      const targets = unsearched();
      const startedAt = now();
      for (let done = 0; done < targets.length && !stopped; done += 1) {
        results.setState({ sweep: { done, total: targets.length, startedAt } });
        current = searchKey(targets[done]!);
        await targetResults.search(targets[done]!, 'sweep');
      }
      results.setState({ sweep: undefined });
    },
    cancel() {
      stopped = true;
      if (current !== undefined) targetResults.cancel(current);
    },
  };
}
