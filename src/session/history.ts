import { applyCommand } from './apply-command.ts';
import { authorOf, type Command, type CommandStamp, subjectOf } from './commands.ts';
import { describeChange } from './describe-change.ts';
import type { JournalEntry, SessionDocument } from './document.ts';

/** Undo and redo as structurally shared snapshots: values, no inverse commands. */
export interface History {
  readonly past: readonly Step[];
  readonly present: SessionDocument;
  readonly future: readonly Step[];
  /** A drag in progress: shown, but not a decision yet. */
  readonly previewed: { readonly document: SessionDocument; readonly command: Command } | undefined;
}

/** A snapshot to go back (or forward) to, and what lies between it and its neighbour. */
export interface Step {
  readonly document: SessionDocument;
  readonly what: string;
  readonly targetId: string | undefined;
  readonly caseId: string | undefined;
}

const MOST_STEPS = 200;

export function createHistory(document: SessionDocument): History {
  return { past: [], present: document, future: [], previewed: undefined };
}

export function shownDocument(history: History): SessionDocument {
  return history.previewed?.document ?? history.present;
}

export function commit(history: History, command: Command, stamp: CommandStamp): History {
  const present = applyCommand(history.present, command, stamp);
  if (present === history.present) return { ...history, previewed: undefined };
  const what = describeChange(history.present, command) ?? command.kind;
  const step: Step = { document: history.present, what, ...subjectOf(command) };
  const past = [...history.past, step].slice(-MOST_STEPS);
  return { past, present, future: [], previewed: undefined };
}

/** Shows a drag's command on the present; each replaces the last, none is an entry. */
export function preview(history: History, command: Command, stamp: CommandStamp): History {
  return { ...history, previewed: { document: applyCommand(history.present, command, stamp), command } };
}

export function abandonPreview(history: History): History {
  return history.previewed === undefined ? history : { ...history, previewed: undefined };
}

/** Makes the drag's last preview one entry. */
export function settle(history: History, stamp: CommandStamp): History {
  return history.previewed === undefined ? history : commit(history, history.previewed.command, stamp);
}

export function undo(history: History, stamp: CommandStamp): History {
  const step = history.past.at(-1);
  if (step === undefined) return abandonPreview(history);
  const { present } = history;
  return {
    past: history.past.slice(0, -1),
    present: restore(step, present, `undid: ${step.what}`, stamp),
    future: [{ ...step, document: present }, ...history.future],
    previewed: undefined,
  };
}

export function redo(history: History, stamp: CommandStamp): History {
  const [step, ...future] = history.future;
  if (step === undefined) return abandonPreview(history);
  const { present } = history;
  return {
    past: [...history.past, { ...step, document: present }],
    present: restore(step, present, `redid: ${step.what}`, stamp),
    future,
    previewed: undefined,
  };
}

/** Everything goes back but the journal: it is append-only, and that something was undone belongs in it. */
function restore(step: Step, from: SessionDocument, what: string, stamp: CommandStamp): SessionDocument {
  const { targetId, caseId } = step;
  const entry: JournalEntry = { id: stamp.newId(), ...authorOf(stamp), targetId, caseId, what };
  return { ...step.document, journal: [...from.journal, entry] };
}
