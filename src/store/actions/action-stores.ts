import type { Command } from '../../session/commands.ts';
import type { Target } from '../../session/document.ts';
import { type BenchSelection, selectBench } from '../bench-selection.ts';
import { shownTargets } from '../docket-rows.ts';
import type { DocumentStore } from '../document-store.ts';
import type { ResultsStore } from '../results-store.ts';
import type { SignalResults } from '../signal-results.ts';
import type { ViewStore } from '../view-store.ts';

/** What every action works on. */
export interface ActionStores {
  readonly document: DocumentStore;
  readonly view: ViewStore;
  readonly results: ResultsStore;
  readonly signals: SignalResults;
  readonly newId: () => string;
}

export type DragPhase = 'preview' | 'commit' | 'cancel';

/** The stores with what actions do to them again and again. */
export interface ActionKit extends ActionStores {
  readonly bench: () => BenchSelection;
  readonly run: (command: Command) => boolean;
  /** The docket's targets in their order on the screen. */
  readonly shown: () => readonly Target[];
  readonly say: (sentence: string) => void;
  /** A drag's command: shown while it moves, one entry in the history when it is let go. */
  readonly drag: (phase: DragPhase, command: Command) => void;
}

export function makeActionKit(stores: ActionStores): ActionKit {
  const { document, view, results } = stores;
  const run = document.getState().run;
  return {
    ...stores,
    run,
    bench: () => selectBench(document.getState().document, view.getState(), results.getState()),
    shown: () => shownTargets(document.getState().document, results.getState(), view.getState()),
    say: (sentence) => view.setState({ notice: { kind: 'notice', sentence } }),
    drag(phase, command) {
      if (phase === 'preview') document.getState().preview(command);
      else document.getState().abandon();
      if (phase === 'commit') run(command);
    },
  };
}
