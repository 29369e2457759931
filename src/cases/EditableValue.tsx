import { useRef, useState } from 'react';
import { openTyped, readTyped } from './typed-number.ts';

/** A printed number that turns into a field when it is pressed; Enter takes the new one, Escape leaves the old. */
export function EditableValue(props: {
  readonly label: string;
  readonly shown: string;
  readonly value: number;
  readonly mustBePositive?: boolean;
  readonly onCommit: (value: number) => void;
}) {
  const { label, shown, value, mustBePositive = false, onCommit } = props;
  const [text, setText] = useState<string>();
  const [refusal, setRefusal] = useState<string>();
  const isComingBack = useRef(false);
  const edit = (next: string | undefined) => {
    setText(next);
    setRefusal(undefined);
  };
  if (text === undefined)
    return (
      <button
        // Keys that left the field go on from the number.
        ref={(button) => {
          if (isComingBack.current) button?.focus();
          isComingBack.current = false;
        }}
        type="button"
        className="editable number"
        aria-label={`${label}: ${shown}. Change it`}
        onClick={() => edit(openTyped(value))}
      >
        {shown}
      </button>
    );

  /** A field left as it was opened changes nothing: its text has fewer digits than the value. */
  const commit = (): boolean => {
    if (text.trim() !== '' && text !== openTyped(value)) {
      const typed = readTyped(text, mustBePositive);
      if (typed.kind === 'refused') {
        setRefusal(typed.sentence);
        return false;
      }
      onCommit(typed.value);
    }
    edit(undefined);
    return true;
  };
  return (
    <>
      <input
        className="field editing"
        aria-label={label}
        aria-invalid={refusal !== undefined}
        inputMode="decimal"
        // biome-ignore lint/a11y/noAutofocus: the analyst has just asked to change this number
        autoFocus
        value={text}
        onFocus={(event) => event.target.select()}
        onChange={(event) => edit(event.target.value)}
        onBlur={() => {
          if (refusal === undefined) commit();
          else edit(undefined);
        }}
        onKeyDown={(event) => {
          if (event.key !== 'Enter' && event.key !== 'Escape') return;
          // Or the button that comes back under the keys would be pressed by the same Enter.
          event.preventDefault();
          isComingBack.current = true;
          if (event.key === 'Escape') edit(undefined);
          else isComingBack.current = commit();
        }}
      />
      {refusal !== undefined && (
        <span className="refused small" role="alert">
          {refusal}
        </span>
      )}
    </>
  );
}
