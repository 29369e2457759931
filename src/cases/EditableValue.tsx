import { useState } from 'react';

/** A printed number that turns into a field when it is pressed; Enter takes the new one, Escape leaves the old. */
export function EditableValue(props: {
  readonly label: string;
  readonly shown: string;
  readonly value: number;
  readonly onCommit: (value: number) => void;
}) {
  const { label, shown, value, onCommit } = props;
  const [text, setText] = useState<string>();
  if (text === undefined)
    return (
      <button
        type="button"
        className="editable number"
        aria-label={`${label}: ${shown}. Change it`}
        onClick={() => setText(String(Number(value.toPrecision(12))))}
      >
        {shown}
      </button>
    );
  const commit = () => {
    const typed = Number(text.replace(/[\s\u00a0]/g, '').replace('\u2212', '-'));
    if (text.trim() !== '' && Number.isFinite(typed) && typed !== value) onCommit(typed);
    setText(undefined);
  };
  return (
    <input
      className="field editing"
      aria-label={label}
      inputMode="decimal"
      // biome-ignore lint/a11y/noAutofocus: the analyst has just asked to change this number
      autoFocus
      value={text}
      onFocus={(event) => event.target.select()}
      onChange={(event) => setText(event.target.value)}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') commit();
        if (event.key === 'Escape') setText(undefined);
      }}
    />
  );
}
