import { type Command, needsCase, needsMark, needsTarget } from './commands.ts';
import type { SessionDocument } from './document.ts';
import { findCase, findTarget } from './selectors.ts';

/** Why a command cannot be carried out on this document, for the analyst; undefined where it can. */
export function refusalOf(document: SessionDocument, command: Command): string | undefined {
  if (needsTarget(command) && findTarget(document, command.targetId) === undefined)
    return 'This target is no longer in the docket.';
  if (needsCase(command) && findCase(document, command.targetId, command.caseId) === undefined)
    return 'This case no longer exists.';
  if (needsMark(command) && !findTarget(document, command.targetId)?.marks.some(({ id }) => id === command.markId))
    return 'This mark no longer exists.';
  switch (command.kind) {
    case 'delete case':
      return refusalToDeleteCase(document, command.targetId, command.caseId);
    case 'remove target':
      return findTarget(document, command.targetId)?.cases.some(({ rulings }) => rulings.length > 0)
        ? 'A target with a ruling stays in the docket, so that the ruling can be defended.'
        : undefined;
    case 'add mark':
      return refusalOfInterval(command.mark.interval);
    case 'edit mark':
      return command.mark.interval && refusalOfInterval(command.mark.interval);
    case 'park':
      return command.reason.trim() === '' ? 'Say what the case waits for.' : undefined;
    default:
      return undefined;
  }
}

function refusalToDeleteCase(document: SessionDocument, targetId: string, caseId: string): string | undefined {
  const found = findCase(document, targetId, caseId);
  return found !== undefined && found.rulings.length > 0
    ? `Case ${found.number} has a ruling and cannot be deleted. Rule on it again instead.`
    : undefined;
}

function refusalOfInterval({ start, end }: { readonly start: number; readonly end: number }): string | undefined {
  return Number.isFinite(start) && Number.isFinite(end) && start < end
    ? undefined
    : 'A mark needs a start before its end.';
}
