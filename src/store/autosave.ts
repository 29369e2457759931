import type { DocumentStore } from './document-store.ts';
import type { ResultsStore } from './results-store.ts';
import type { SessionStorage } from './session-storage.ts';
import { rememberedView, type ViewStore } from './view-store.ts';

/**
 * Keeps the machine's copy of a session up to date: the document after every commit, the view and the docket's
 * summaries a moment after they settle. Writes follow one another; only the newest state waits.
 */
export function startAutosave(deps: {
  document: DocumentStore;
  view: ViewStore;
  results: ResultsStore;
  storage: SessionStorage;
  now: () => Date;
}): () => void {
  const { document, view, results, storage, now } = deps;

  const saveDocument = newestOnly(async () => {
    const { history, readOnly } = document.getState();
    if (history === undefined || readOnly) return;
    document.setState({ saveState: { kind: 'saving' } });
    const savedAt = now().toISOString();
    try {
      // The present without a drag's preview: a drag that was never let go is not a decision.
      await storage.saveSession({ document: history.present, savedAt });
      document.setState({ saveState: { kind: 'saved', at: savedAt } });
    } catch (cause) {
      const reason = cause instanceof Error ? cause.message : 'no reason given';
      document.setState({
        saveState: { kind: 'not saved', sentence: `Not saved: ${reason}. Export the session to keep it.` },
      });
    }
  });
  const saveView = newestOnly(async () => {
    const { document: current, readOnly } = document.getState();
    if (current !== undefined && !readOnly) await storage.saveView(current.id, rememberedView(view.getState()));
  }, 150);
  const saveSummaries = newestOnly(async () => {
    const { document: current, readOnly } = document.getState();
    if (current !== undefined && !readOnly) await storage.saveSummaries(current.id, results.getState().summaries);
  }, 500);

  const stops = [
    document.subscribe((state, before) => {
      if (state.history?.present !== before.history?.present) saveDocument();
    }),
    view.subscribe(saveView),
    results.subscribe((state, before) => {
      if (state.summaries !== before.summaries) saveSummaries();
    }),
  ];
  return () => {
    for (const stop of stops) stop();
  };
}

/** Runs the task after `delayMs`, never twice at once; calls while it runs become one more run after it. */
function newestOnly(task: () => Promise<void>, delayMs = 0): () => void {
  let waiting = false;
  let running = false;
  const start = async () => {
    waiting = false;
    running = true;
    await task().catch(() => undefined);
    running = false;
    if (waiting) start();
  };
  return () => {
    if (waiting) return;
    waiting = true;
    if (running) return;
    if (delayMs === 0) queueMicrotask(start);
    else setTimeout(start, delayMs);
  };
}
