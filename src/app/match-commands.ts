import type { AppCommand } from './commands/app-command.ts';

export interface Piece {
  readonly text: string;
  readonly matched: boolean;
  readonly start: number;
}

export interface FoundCommand {
  readonly command: AppCommand;
  /** The title cut at the typed words. */
  readonly pieces: readonly Piece[];
}

/** Commands whose title or room holds every typed word. */
export function matchCommands(commands: readonly AppCommand[], typed: string): readonly FoundCommand[] {
  const words = typed.toLowerCase().split(/\s+/).filter(Boolean);
  return commands
    .filter(({ title, room }) => words.every((word) => `${title} ${room}`.toLowerCase().includes(word)))
    .map((command) => ({ command, pieces: cutAtWords(command.title, words) }));
}

function cutAtWords(title: string, words: readonly string[]): Piece[] {
  const lower = title.toLowerCase();
  const matched = new Array<boolean>(title.length).fill(false);
  for (const word of words)
    for (let at = lower.indexOf(word); at >= 0; at = lower.indexOf(word, at + 1))
      matched.fill(true, at, at + word.length);
  const pieces: Piece[] = [];
  for (let start = 0, end = 1; end <= title.length; end += 1) {
    if (end < title.length && matched[end] === matched[start]) continue;
    pieces.push({ text: title.slice(start, end), matched: matched[start]!, start });
    start = end;
  }
  return pieces;
}
