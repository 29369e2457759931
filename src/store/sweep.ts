import type { Target } from '../session/document.ts';
import type { DocumentStore } from './document-store.ts';
import type { ResultsStore, SweepKind } from './results-store.ts';
import type { RunOnce } from './run-once.ts';
import type { SignalResults } from './signal-results.ts';
import { falseAlarmKey, preparedKey, searchKey } from './target-keys.ts';
import { runKey, type TargetResults } from './target-results.ts';
import type { ViewStore } from './view-store.ts';

/**
 * Searches every target of the docket that has no summary of its present recipe and search (or, when asked, no
 * false-alarm probability), from the selected one on and round to it, a few at a time.
 */
export interface Sweep {
  start(what?: SweepKind): Promise<void>;
  cancel(): void;
}

/** As many as keep the readers, the preparation and the search busy at once. */
const AT_ONCE = 4;

const DONE: Readonly<Record<SweepKind, string>> = {
  search: 'Every target of the docket is searched.',
  'false alarms': 'Every signal of the docket has its false-alarm probability.',
};

export function createSweep(deps: {
  document: DocumentStore;
  view: ViewStore;
  results: ResultsStore;
  runs: RunOnce;
  targetResults: TargetResults;
  signals: SignalResults;
  now: () => number;
}): Sweep {
  const { document, view, results, runs, targetResults, signals, now } = deps;
  const current = new Map<string, Target>();
  let waiting: Target[] = [];

  function isDone(target: Target, what: SweepKind): boolean {
    const summary = results.getState().summaries.get(target.id);
    if (summary?.key !== searchKey(target)) return false;
    return what === 'search' || summary.objective === undefined || summary.falseAlarmProbability !== undefined;
  }

  function unfinished(what: SweepKind): Target[] {
    const targets = document.getState().document?.targets ?? [];
    const from = Math.max(
      0,
      targets.findIndex(({ id }) => id === view.getState().targetId),
    );
    return [...targets.slice(from), ...targets.slice(0, from)].filter((target) => !isDone(target, what));
  }

  async function work(what: SweepKind): Promise<void> {
    for (let target = waiting.shift(); target !== undefined; target = waiting.shift()) {
      current.set(target.id, target);
      if (!isDone(target, 'search')) await targetResults.search(target, 'sweep');
      if (!isDone(target, what)) await signals.falseAlarms(target, 'sweep');
      current.delete(target.id);
      const { sweep } = results.getState();
      if (sweep !== undefined) results.setState({ sweep: { ...sweep, done: sweep.done + 1 } });
    }
  }

  return {
    async start(what = 'search') {
      if (results.getState().sweep !== undefined) return;
      waiting = unfinished(what);
      if (waiting.length === 0) {
        view.setState({ notice: { kind: 'notice', sentence: DONE[what] } });
        return;
      }
      results.setState({ sweep: { what, done: 0, total: waiting.length, startedAt: now() } });
      await Promise.all(Array.from({ length: AT_ONCE }, () => work(what)));
      results.setState({ sweep: undefined });
    },
    cancel() {
      waiting = [];
      for (const target of current.values())
        for (const key of [searchKey(target), preparedKey(target), falseAlarmKey(target)])
          runs.cancel(runKey(key, 'sweep'));
    },
  };
}
