import { createStore } from 'zustand/vanilla';
import type { Command, CommandStamp } from '../session/commands.ts';
import type { SessionDocument } from '../session/document.ts';
import * as history from '../session/history.ts';
import { refusalOf } from '../session/refusal.ts';

export type SaveState =
  | { readonly kind: 'saved'; readonly at: string }
  | { readonly kind: 'saving' }
  | { readonly kind: 'not saved'; readonly sentence: string };

export interface DocumentState {
  readonly history: history.History | undefined;
  /** What is shown: the present with a drag's preview on top. */
  readonly document: SessionDocument | undefined;
  /** Another tab writes this session. */
  readonly readOnly: boolean;
  readonly saveState: SaveState | undefined;
  /** Why the last command was refused; cleared by the next that is not. */
  readonly refusal: string | undefined;
  run(command: Command): boolean;
  /** A drag: shown at once, one entry in the history at `settle`, none at `abandon`. */
  preview(command: Command): void;
  settle(): void;
  abandon(): void;
  undo(): void;
  redo(): void;
  load(document: SessionDocument): void;
}

export type DocumentStore = ReturnType<typeof createDocumentStore>;

const READ_ONLY = 'This session is open for writing in another tab. Nothing can be changed here.';

export function createDocumentStore(clock: { now: () => Date; newId: () => string; app: string }) {
  return createStore<DocumentState>()((set, get) => {
    const stamp = (): CommandStamp => ({
      at: clock.now().toISOString(),
      analyst: get().document?.analyst ?? '',
      app: clock.app,
      newId: clock.newId,
    });
    const show = (next: history.History) => set({ history: next, document: history.shownDocument(next) });
    /** Runs a change of the history where there is one that may be changed. */
    const change = (step: (current: history.History) => history.History) => {
      const { history: current, readOnly } = get();
      if (current === undefined) return;
      if (readOnly) set({ refusal: READ_ONLY });
      else show(step(current));
    };
    return {
      history: undefined,
      document: undefined,
      readOnly: false,
      saveState: undefined,
      refusal: undefined,
      run(command) {
        const { document, readOnly } = get();
        const refusal = readOnly ? READ_ONLY : document && refusalOf(document, command);
        set({ refusal });
        if (refusal === undefined) change((current) => history.commit(current, command, stamp()));
        return refusal === undefined;
      },
      preview: (command) => change((current) => history.preview(current, command, stamp())),
      settle: () => change((current) => history.settle(current, stamp())),
      abandon: () => change((current) => history.abandonPreview(current)),
      undo: () => change((current) => history.undo(current, stamp())),
      redo: () => change((current) => history.redo(current, stamp())),
      load(document) {
        set({ refusal: undefined });
        show(history.createHistory(document));
      },
    };
  });
}
