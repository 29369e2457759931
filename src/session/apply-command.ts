import { produce, type WritableDraft } from 'immer';
import { authorOf, type Command, type CommandStamp, type RulingFields, subjectOf } from './commands.ts';
import { describeChange } from './describe-change.ts';
import type { Case, Ruling, SessionDocument, Target } from './document.ts';
import { refusalOf } from './refusal.ts';

type Draft = WritableDraft<SessionDocument>;

/**
 * The document after a command: pure and structurally shared. A refused command leaves the very same document.
 * What matters for defending a ruling is written to the journal.
 */
export function applyCommand(document: SessionDocument, command: Command, stamp: CommandStamp): SessionDocument {
  if (refusalOf(document, command) !== undefined) return document;
  return produce(document, (draft) => {
    const what = describeChange(document, command);
    change(draft, command, stamp);
    draft.app = stamp.app;
    if (what !== undefined) draft.journal.push({ id: stamp.newId(), ...authorOf(stamp), ...subjectOf(command), what });
  });
}

function change(draft: Draft, command: Command, stamp: CommandStamp): void {
  switch (command.kind) {
    case 'name session':
      draft.name = command.name;
      return;
    case 'name analyst':
      draft.analyst = command.analyst;
      return;
    case 'add targets':
      for (const target of command.targets) addTarget(draft, target);
      return;
    case 'describe stars':
      for (const { label, star } of command.rows)
        for (const target of draft.targets)
          if (sameLabel(target.label, label)) Object.assign(target.star, definedOnly(star));
      return;
    case 'set recipes':
      for (const target of draft.targets)
        if (command.targetIds.includes(target.id))
          target.recipe = writable({ ...command.recipe, fluxColumn: target.recipe.fluxColumn });
      return;
    case 'use instrument table':
      draft.instrumentTables = withoutId(draft.instrumentTables, command.table.id);
      draft.instrumentTables.push(writable(command.table));
      for (const target of draft.targets) target.instrumentTable = command.table.id;
      return;
    case 'use mode set':
      draft.modeSets = withoutId(draft.modeSets, command.modeSet.id);
      draft.modeSets.push(writable(command.modeSet));
      for (const target of draft.targets) target.modeSet = command.modeSet.id;
      return;
    default:
      changeTarget(draft, command, stamp);
  }
}

function changeTarget(draft: Draft, command: Extract<Command, { targetId: string }>, stamp: CommandStamp): void {
  const at = draft.targets.findIndex(({ id }) => id === command.targetId);
  const target = draft.targets[at]!;
  switch (command.kind) {
    case 'remove target':
      draft.targets.splice(at, 1);
      return;
    case 'set recipe':
      target.recipe = writable(command.recipe);
      return;
    case 'set search':
      target.search = writable(command.search);
      return;
    case 'remap file':
      target.files = target.files.map((file) => (file.name === command.file.name ? writable(command.file) : file));
      Object.assign(target.star, definedOnly(command.star));
      return;
    case 'add mark':
      target.marks.push({ id: command.markId, ...writable(command.mark) });
      return;
    case 'edit mark':
      Object.assign(target.marks.find(({ id }) => id === command.markId)!, command.mark);
      return;
    case 'delete mark':
      target.marks = target.marks.filter(({ id }) => id !== command.markId);
      return;
    case 'make case':
      makeCase(target, command);
      return;
    case 'delete case':
      target.cases = target.cases.filter(({ id }) => id !== command.caseId);
      return;
    default:
      changeCase(target, command, stamp);
  }
}

function changeCase(
  target: WritableDraft<Target>,
  command: Extract<Command, { kind: 'time case' | 'rule' | 'park' | 'unpark' }>,
  stamp: CommandStamp,
): void {
  const found = target.cases.find(({ id }) => id === command.caseId)!;
  switch (command.kind) {
    case 'time case':
      found.timing = writable(command.timing);
      found.numbers = command.numbers;
      return;
    case 'rule':
      found.rulings.push(writable(newRuling(target, found, command.ruling, stamp)));
      found.parked = undefined;
      return;
    case 'park':
      found.parked = { reason: command.reason, until: command.until, at: stamp.at, analyst: stamp.analyst };
      return;
    case 'unpark':
      found.parked = undefined;
      return;
  }
}

/** A ruling freezes what it rested on. */
function newRuling(target: Target, of: Case, ruling: RulingFields, stamp: CommandStamp): Ruling {
  const { timing, numbers } = of;
  return { id: stamp.newId(), ...ruling, ...authorOf(stamp), timing, recipe: target.recipe, numbers };
}

function makeCase(target: WritableDraft<Target>, command: Extract<Command, { kind: 'make case' }>): void {
  const { caseId, origin, timing, numbers } = command;
  target.lastCaseNumber += 1;
  target.cases.push(
    writable({ id: caseId, number: target.lastCaseNumber, origin, timing, numbers, rulings: [], parked: undefined }),
  );
}

/** The same file is not added twice; a label that is taken gets a number. */
function addTarget(draft: Draft, target: Target): void {
  const hashes = new Set(draft.targets.flatMap(({ files }) => files.map(({ sha256 }) => sha256)));
  if (target.files.some(({ sha256 }) => hashes.has(sha256))) return;
  const taken = new Set(draft.targets.map(({ label }) => label));
  let label = target.label;
  for (let copy = 2; taken.has(label); copy += 1) label = `${target.label} (${copy})`;
  const instrumentTable = target.instrumentTable ?? draft.instrumentTables.at(-1)?.id;
  draft.targets.push(writable({ ...target, label, instrumentTable }));
}

const withoutId = <T extends { id: string }>(list: T[], id: string): T[] => list.filter((one) => one.id !== id);

function sameLabel(a: string, b: string): boolean {
  const bare = (label: string) => label.toLowerCase().replace(/\s+/g, '');
  return bare(a) === bare(b);
}

function definedOnly<T extends object>(fields: T): Partial<T> {
  return Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined)) as Partial<T>;
}

/** A readonly value put into a draft: immer never writes to it, it replaces it. */
function writable<T>(value: T): WritableDraft<T> {
  return value as WritableDraft<T>;
}
