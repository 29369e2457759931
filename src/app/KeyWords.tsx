/** A key of the list of commands as caps: "Ctrl" "K". */
export function KeyWords({ keys }: { readonly keys: string }) {
  return (
    <span className="key-words">
      {keyWords(keys).map((word) => (
        <kbd key={word}>{ARROWS[word] === undefined ? word : <ArrowSign word={word} />}</kbd>
      ))}
    </span>
  );
}

/** The bundled faces have no arrows: they are drawn. Degrees from pointing left. */
const ARROWS: Readonly<Record<string, number>> = { left: 0, up: 90, right: 180, down: 270 };

function ArrowSign({ word }: { readonly word: string }) {
  return (
    <svg width="11" height="9" viewBox="-5.5 -4.5 11 9" role="img" aria-label={word}>
      <path
        d="M5 0H-4.5M-1.5 -3L-4.5 0L-1.5 3"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.2"
        transform={`rotate(${ARROWS[word]})`}
      />
    </svg>
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
