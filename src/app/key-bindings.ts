import { createKeybindingsHandler } from 'tinykeys';
import type { Candling } from '../store/candling.ts';
import { COMMANDS } from './commands.ts';
import type { RoomActions } from './room-actions.ts';

/**
 * One listener for all keys. While text is typed only keys with Ctrl or Cmd reach commands, and an open dialog or
 * ruling form keeps its keys to itself.
 */
export function bindKeys(candling: Candling, rooms: RoomActions): () => void {
  const keys = [...new Set(COMMANDS.flatMap((command) => command.keys))];
  const bindings = Object.fromEntries(
    keys.map((key) => [
      key,
      (event: KeyboardEvent) => {
        if (isTaken(event, key, candling)) return;
        const command = COMMANDS.find(({ keys, when }) => keys.includes(key) && (when === undefined || when(candling)));
        if (command === undefined) return;
        event.preventDefault();
        command.run(candling, rooms);
      },
    ]),
  );
  const handler = createKeybindingsHandler(bindings);
  globalThis.addEventListener('keydown', handler);
  return () => globalThis.removeEventListener('keydown', handler);
}

function isTaken(event: KeyboardEvent, key: string, candling: Candling): boolean {
  if (event.defaultPrevented) return true;
  const { dialog, mappingQuestions, rulingDraft } = candling.view.getState();
  if (key === '$mod+k') return false;
  if (dialog !== undefined || mappingQuestions.length > 0 || rulingDraft !== undefined) return true;
  if (isTyping(event.target)) return true;
  return key.startsWith('Arrow') && isListOrChoice(event.target);
}

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.matches('input, textarea, select, [contenteditable]');
}

/** Arrows inside these move within them. */
function isListOrChoice(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement && target.closest('[role="listbox"], [role="grid"], [role="radiogroup"]') !== null
  );
}
