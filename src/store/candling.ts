import type { Jobs } from '../jobs/jobs.ts';
import type { SessionDocument } from '../session/document.ts';
import { newDocument } from '../session/new-document.ts';
import { type AddFiles, createAddFiles } from './add-files.ts';
import { startAutosave } from './autosave.ts';
import { type BenchActions, createBenchActions } from './bench-actions.ts';
import { createCommonModes } from './common-modes-results.ts';
import { createDocumentStore, type DocumentStore } from './document-store.ts';
import { followSelection } from './follow-selection.ts';
import { createResultsStore, type ResultsStore } from './results-store.ts';
import { createRunOnce, type RunOnce } from './run-once.ts';
import type { SessionStorage } from './session-storage.ts';
import { createSignalResults, type SignalResults } from './signal-results.ts';
import { createSweep, type Sweep } from './sweep.ts';
import { createTargetResults, type TargetResults } from './target-results.ts';
import { createViewStore, type ViewStore } from './view-store.ts';
import type { WritingLock } from './writing-lock.ts';

/** The whole state of the app and everything that can be done to it; the screen only draws it. */
export interface Candling {
  readonly document: DocumentStore;
  readonly view: ViewStore;
  readonly results: ResultsStore;
  readonly actions: BenchActions;
  readonly files: AddFiles;
  readonly targetResults: TargetResults;
  readonly signals: SignalResults;
  readonly runs: RunOnce;
  readonly sweep: Sweep;
  readonly storage: SessionStorage;
  readonly app: string;
  /** Starts a fresh session; the present one stays saved on this machine. */
  startSession(name: string): Promise<void>;
  /** Opens the session last saved on this machine; false where there is none. */
  reopenLast(): Promise<boolean>;
  /** Opens a document as the session, replacing what is open. */
  openSession(document: SessionDocument): Promise<void>;
  /** Takes the writing of this session over from another tab. */
  writeHere(): Promise<void>;
  dispose(): void;
}

export interface CandlingDeps {
  readonly jobs: Jobs;
  readonly storage: SessionStorage;
  readonly lock: WritingLock;
  readonly app: string;
  readonly now: () => Date;
  readonly newId: () => string;
}

export function createCandling(deps: CandlingDeps): Candling {
  const { jobs, storage, lock, app, now, newId } = deps;
  const milliseconds = () => now().getTime();
  const document = createDocumentStore({ now, newId, app });
  const view = createViewStore();
  const results = createResultsStore();
  const current = () => document.getState().document;
  const runs = createRunOnce(results, milliseconds);
  const commonModes = createCommonModes({ jobs, results, runs, document: current, targetResults: () => targetResults });
  const targetResults: TargetResults = createTargetResults({
    jobs,
    storage,
    results,
    runs,
    document: current,
    commonModes,
  });
  const signals = createSignalResults({ jobs, results, runs, targetResults, document: current });
  const stops = [
    startAutosave({ document, view, results, storage, now }),
    followSelection({ document, view, results, runs, targetResults }),
  ];

  async function takeLock(sessionId: string, steal: boolean): Promise<void> {
    const onLost = () => document.setState({ readOnly: true });
    document.setState({ readOnly: !(await lock.take(sessionId, { steal, onLost })) });
  }

  async function openSession(session: SessionDocument): Promise<void> {
    await takeLock(session.id, false);
    const remembered = await storage.readView(session.id);
    results.setState({ summaries: await storage.readSummaries(session.id) });
    document.getState().load(session);
    view.setState({
      ...createViewStore({ theme: view.getState().theme, targetId: session.targets[0]?.id, ...remembered }).getState(),
    });
  }

  return {
    document,
    view,
    results,
    targetResults,
    signals,
    runs,
    storage,
    app,
    actions: createBenchActions({ document, view, results, signals, newId }),
    files: createAddFiles({ jobs, storage, document, view, results, newId }),
    sweep: createSweep({ document, view, results, runs, targetResults, signals, now: milliseconds }),
    openSession,
    async startSession(name) {
      const analyst = document.getState().document?.analyst ?? '';
      await openSession(newDocument({ id: newId(), name, analyst, app, at: now().toISOString() }));
    },
    async reopenLast() {
      const last = await storage.lastSession();
      if (last === undefined) return false;
      await openSession(last.document);
      document.setState({ saveState: { kind: 'saved', at: last.savedAt } });
      return true;
    },
    async writeHere() {
      const current = document.getState().document;
      if (current === undefined) return;
      // The other tab may have written since this one read.
      const last = await storage.lastSession();
      await takeLock(current.id, true);
      if (last?.document.id === current.id) document.getState().load(last.document);
    },
    dispose() {
      for (const stop of stops) stop();
      lock.release();
      jobs.dispose();
    },
  };
}
