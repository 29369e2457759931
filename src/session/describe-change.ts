import type { Command } from './commands.ts';
import type { SessionDocument } from './document.ts';
import { findCase, findTarget, standingRuling } from './selectors.ts';

/** What a command did, as a journal entry says it; undefined for what is not worth an entry. */
export function describeChange(document: SessionDocument, command: Command): string | undefined {
  switch (command.kind) {
    case 'name session':
      return `named the session ${command.name}`;
    case 'name analyst':
      return `analyst is ${command.analyst}`;
    case 'add targets':
      return `added ${command.targets.length} ${command.targets.length === 1 ? 'target' : 'targets'}`;
    case 'describe stars':
      return `read parameters of ${command.rows.length} stars`;
    case 'remove target':
      return `removed ${findTarget(document, command.targetId)!.label}`;
    case 'set recipe':
      return 'changed the recipe';
    case 'set search':
      return 'changed the search';
    case 'remap file':
      return `corrected the columns of ${command.file.name}`;
    case 'add mark':
      return `marked ${command.mark.kind}`;
    case 'edit mark':
      return 'changed a mark';
    case 'delete mark':
      return 'deleted a mark';
    case 'make case':
      return `made case ${findTarget(document, command.targetId)!.lastCaseNumber + 1}`;
    default:
      return describeCaseChange(document, command);
  }
}

function describeCaseChange(
  document: SessionDocument,
  command: Extract<Command, { kind: 'time case' | 'delete case' | 'rule' | 'park' | 'unpark' }>,
): string {
  const found = findCase(document, command.targetId, command.caseId)!;
  switch (command.kind) {
    case 'time case':
      return `retimed case ${found.number}`;
    case 'delete case':
      return `deleted case ${found.number}`;
    case 'rule': {
      const before = standingRuling(found)?.kind;
      return before === undefined ? `ruled ${command.ruling.kind}` : `ruled ${command.ruling.kind}, before ${before}`;
    }
    case 'park':
      return `parked${command.until === undefined ? '' : ` until ${command.until}`}: ${command.reason}`;
    case 'unpark':
      return 'took up the parked case again';
  }
}
