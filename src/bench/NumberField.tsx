import { useEffect, useState } from 'react';

/** A number that takes effect on Enter or when it is left; what cannot be used goes back to what was. */
export function NumberField(props: {
  readonly label: string;
  readonly value: number | undefined;
  readonly onCommit: (value: number) => void;
  readonly onClear?: (() => void) | undefined;
  readonly unit?: string | undefined;
  readonly least?: number | undefined;
  readonly whole?: boolean | undefined;
  readonly placeholder?: string | undefined;
}) {
  const { label, value, onCommit, onClear, unit, least = 0, whole = false, placeholder } = props;
  const shown = value === undefined ? '' : String(value);
  const [text, setText] = useState(shown);
  useEffect(() => setText(shown), [shown]);
  const commit = () => {
    const typed = Number(text);
    if (text.trim() === '') {
      if (onClear === undefined) setText(shown);
      else onClear();
    } else if (typed >= least && Number.isFinite(typed) && !(whole && !Number.isInteger(typed))) {
      if (typed !== value) onCommit(typed);
    } else setText(shown);
  };
  return (
    <span className="number-field">
      <input
        className="field"
        inputMode="decimal"
        aria-label={label}
        placeholder={placeholder}
        value={text}
        onChange={(event) => setText(event.target.value)}
        onBlur={commit}
        onKeyDown={(event) => {
          if (event.key === 'Enter') commit();
        }}
      />
      {unit}
    </span>
  );
}
