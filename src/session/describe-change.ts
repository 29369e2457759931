import type { Command } from './commands.ts';
import { describeRecipe } from './describe-recipe.ts';
import type { SessionDocument, Target } from './document.ts';
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
      return describeSearchChange(findTarget(document, command.targetId)!, command.search);
    case 'set recipes':
      return `gave ${command.targetIds.length} targets the recipe: ${describeRecipe(command.recipe)}`;
    case 'use instrument table':
      return `leaves out ${command.table.spans.length} spans of ${command.table.fileName} in every target`;
    case 'use mode set':
      return `common modes of ${command.modeSet.stars.length} stars`;
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

/** Masking a signal begins another round, and is worth its own words. */
function describeSearchChange(target: Target, next: Target['search']): string {
  const before = target.search.masked ?? [];
  const after = next.masked ?? [];
  if (after.length > before.length)
    return `masked the signal at ${Number(after.at(-1)!.periodDays.toPrecision(7))} d for round ${after.length + 1} of the search`;
  if (after.length < before.length) return `went back to round ${after.length + 1} of the search`;
  return 'changed the search';
}
