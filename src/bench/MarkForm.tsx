import { useEffect, useRef } from 'react';
import { numberLabel } from '../plot/number-label.ts';
import { MARK_KINDS } from '../session/document.ts';
import { useCandling, useView } from '../store/use-candling.ts';

const MEANING = {
  dip: 'a dimming to be explained',
  artefact: 'made by the instrument or the processing',
  flare: 'a brightening of the star',
  exclude: 'these points are left out of the prepared flux',
} as const;

/** What kind of mark was drawn, and a note: it slides the panes down, it never covers the data. */
export function MarkForm() {
  const { actions, view } = useCandling();
  const draft = useView((state) => state.markDraft);
  const note = useRef<HTMLInputElement>(null);
  const open = draft !== undefined;
  useEffect(() => {
    if (open) note.current?.focus();
  }, [open]);
  if (draft === undefined) return null;
  const { markId, kind, interval } = draft;
  return (
    <form
      className="mark-form"
      aria-label={markId === undefined ? 'New mark' : 'Edit mark'}
      onSubmit={(event) => {
        event.preventDefault();
        actions.saveMark(interval, { kind, note: draft.note.trim() }, markId);
      }}
      onKeyDown={(event) => {
        if (event.key === 'Escape') view.setState({ markDraft: undefined });
      }}
    >
      <span className="mark-span number">
        mark {numberLabel(interval.start, 3)} to {numberLabel(interval.end, 3)},{' '}
        {numberLabel((interval.end - interval.start) * 24, 1)} h
      </span>
      <fieldset className="toggle">
        <legend className="visually-hidden">Kind of mark</legend>
        {MARK_KINDS.map((name) => (
          <button
            key={name}
            type="button"
            aria-pressed={name === kind}
            title={MEANING[name]}
            onClick={() => view.setState({ markDraft: { ...draft, kind: name } })}
          >
            {name}
          </button>
        ))}
      </fieldset>
      <input
        ref={note}
        className="field"
        aria-label="Note of the mark"
        placeholder="note"
        value={draft.note}
        onChange={(event) => view.setState({ markDraft: { ...draft, note: event.target.value } })}
      />
      <button type="submit" className="button compact primary">
        <kbd>Enter</kbd> save mark
      </button>
      {markId !== undefined && (
        <button type="button" className="button compact" onClick={() => actions.deleteMark(markId)}>
          delete
        </button>
      )}
      <button type="button" className="button compact" onClick={() => view.setState({ markDraft: undefined })}>
        <kbd>Esc</kbd> leave
      </button>
    </form>
  );
}
