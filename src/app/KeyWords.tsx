/** A key of the list of commands as caps: "Ctrl" "K". */
export function KeyWords({ keys }: { readonly keys: string }) {
  return (
    <span className="key-words">
      {keyWords(keys).map((word) => (
        <kbd key={word}>{word}</kbd>
      ))}
    </span>
  );
}

const isMac = () => /Mac|iPhone|iPad/.test(globalThis.navigator?.userAgent ?? '');
const WORDS: Readonly<Record<string, string>> = {
  ArrowUp: 'up',
  ArrowDown: 'down',
  ArrowLeft: 'left',
  ArrowRight: 'right',
  Escape: 'Esc',
  Delete: 'Del',
};

function keyWords(keys: string): string[] {
  // Shift is part of what a question mark is typed with, not of its name.
  const parts = keys === 'Shift+?' ? ['?'] : keys.split('+');
  return parts.map((part) => {
    if (part === '$mod') return isMac() ? 'Cmd' : 'Ctrl';
    return WORDS[part] ?? (part.length === 1 ? part.toUpperCase() : part);
  });
}
