import { type KeyboardEvent, type RefObject, useEffect, useRef, useState } from 'react';
import { CONFIDENCES } from '../session/document.ts';
import { reasonsFor } from '../session/reasons.ts';
import { standingRuling } from '../session/selectors.ts';
import { useBench, useCandling, useView } from '../store/use-candling.ts';
import type { RulingDraft } from '../store/view-store.ts';
import { RulingBar } from './RulingBar.tsx';
import { nextAfterRecording, recordRuling, ruleWith } from './ruling-actions.ts';
import { CONFIDENCE_MEANING, draftAfterKey, toggleReason } from './ruling-draft.ts';

/** The ruling being made: nothing is recorded until Enter. */
export function RulingForm() {
  const draft = useView((state) => state.rulingDraft);
  return draft === undefined ? null : <OpenForm draft={draft} />;
}

function OpenForm({ draft }: { readonly draft: RulingDraft }) {
  const candling = useCandling();
  const { case: chosen } = useBench();
  const form = useRef<HTMLFormElement>(null);
  useEffect(() => form.current?.focus(), []);
  const set = (next: RulingDraft) => candling.view.setState({ rulingDraft: next });
  const leave = () => candling.view.setState({ rulingDraft: undefined });
  const record = () => recordRuling(candling);
  const standing = chosen && standingRuling(chosen);
  const next = nextAfterRecording(candling);

  /** True where the key meant something here. */
  function takeKey({ key, ctrlKey, metaKey, altKey }: Key): boolean {
    const after = draftAfterKey(draft, key);
    if (key === 'Escape') leave();
    else if (key === 'Enter') record();
    else if (ctrlKey || metaKey || altKey) return false;
    else if (after !== undefined) set(after);
    else if (key.toLowerCase() === 'u') form.current?.querySelector<HTMLInputElement>('#own-reason')?.focus();
    else if (key.toLowerCase() === 'k') candling.view.setState({ dialog: 'park' });
    else return false;
    return true;
  }

  function onKeyDown(event: KeyboardEvent<HTMLFormElement>): void {
    const isTyping = event.target instanceof HTMLElement && event.target.matches('input[type="text"], textarea');
    const isOurs = event.key === 'Escape' || (event.key === 'Enter' && (event.ctrlKey || event.metaKey));
    if (isTyping && !isOurs) return;
    // Enter on a button presses it.
    if (event.key === 'Enter' && event.target instanceof HTMLButtonElement && event.target.type === 'button') return;
    if (takeKey(event)) event.preventDefault();
  }

  useKeysElsewhere(form, takeKey);

  return (
    <form
      ref={form}
      className="ruling-form"
      aria-label="Rule on the case"
      tabIndex={-1}
      onKeyDown={onKeyDown}
      onSubmit={(event) => {
        event.preventDefault();
        record();
      }}
    >
      <h3>
        Rule on case {chosen?.number} <small>nothing is recorded until Enter</small>
      </h3>
      <RulingBar chosen={draft.kind} onChoose={(kind) => ruleWith(candling, kind)} />
      <Reasons draft={draft} onChange={set} />
      <fieldset className="confidence">
        <legend>Confidence</legend>
        <span className="toggle">
          {CONFIDENCES.map((confidence) => (
            <button
              key={confidence}
              type="button"
              aria-pressed={confidence === draft.confidence}
              onClick={() => set({ ...draft, confidence })}
            >
              {confidence}
            </button>
          ))}
        </span>
        <span className="small quiet">{CONFIDENCE_MEANING[draft.confidence]}</span>
      </fieldset>
      <label className="note">
        Note
        <textarea
          className="field"
          rows={2}
          value={draft.note}
          onChange={(event) => set({ ...draft, note: event.target.value })}
        />
      </label>
      <p className="small quiet">
        {standing && (
          <>
            Supersedes <b>{standing.kind}</b>.{' '}
          </>
        )}
        Frozen with it: timing, recipe and numbers as they are now. A ruling is the analyst’s judgement of these data,
        not a confirmation of a planet.
      </p>
      <div className="ruling-actions">
        <button type="submit" className="button primary">
          <kbd>Enter</kbd> {next === undefined ? 'Record' : `Record and go to ${next}`}
        </button>
        <button type="button" className="button" onClick={leave}>
          <kbd>Esc</kbd> Leave
        </button>
      </div>
    </form>
  );
}

type Key = Pick<globalThis.KeyboardEvent, 'key' | 'ctrlKey' | 'metaKey' | 'altKey'>;

/** After a look at the plots with the mouse the form's keys still work, but for where text is typed or a button has Enter. */
function useKeysElsewhere(form: RefObject<HTMLFormElement | null>, takeKey: (key: Key) => boolean): void {
  const { view } = useCandling();
  useEffect(() => {
    const listen = (event: globalThis.KeyboardEvent) => {
      const { dialog, mappingQuestions } = view.getState();
      if (event.defaultPrevented || dialog !== undefined || mappingQuestions.length > 0) return;
      const at = event.target instanceof HTMLElement ? event.target : document.body;
      if (form.current?.contains(at) || at.matches('input, textarea, select')) return;
      if (event.key === 'Enter' && at.matches('button, a, [role="option"], [role="listbox"]')) return;
      if (takeKey(event)) event.preventDefault();
    };
    globalThis.addEventListener('keydown', listen);
    return () => globalThis.removeEventListener('keydown', listen);
  });
}

interface ReasonsProps {
  readonly draft: RulingDraft;
  readonly onChange: (draft: RulingDraft) => void;
}

function Reasons({ draft, onChange }: ReasonsProps) {
  const listed = reasonsFor(draft.kind);
  const own = draft.reasons.filter((reason) => !listed.some(({ text }) => text === reason));
  return (
    <fieldset className="reasons">
      <legend>Reasons</legend>
      {listed.map(({ key, text }) => (
        <ReasonLine key={text} letter={key} text={text} draft={draft} onChange={onChange} />
      ))}
      {own.map((text) => (
        <ReasonLine key={text} letter="" text={text} draft={draft} onChange={onChange} />
      ))}
      <OwnReason draft={draft} onChange={onChange} />
    </fieldset>
  );
}

function ReasonLine({
  letter,
  text,
  draft,
  onChange,
}: ReasonsProps & { readonly letter: string; readonly text: string }) {
  return (
    <label className="reason">
      {letter === '' ? <span className="no-key" /> : <kbd>{letter.toUpperCase()}</kbd>}
      <input
        type="checkbox"
        checked={draft.reasons.includes(text)}
        onChange={() => onChange(toggleReason(draft, text))}
      />
      {text}
    </label>
  );
}

function OwnReason({ draft, onChange }: ReasonsProps) {
  const [text, setText] = useState('');
  const add = () => {
    const reason = text.trim();
    if (reason !== '' && !draft.reasons.includes(reason)) onChange(toggleReason(draft, reason));
    setText('');
  };
  return (
    <label className="reason">
      <kbd>U</kbd>
      <input
        id="own-reason"
        type="text"
        className="field"
        aria-label="Another reason"
        placeholder="write another reason"
        value={text}
        onChange={(event) => setText(event.target.value)}
        onBlur={add}
        onKeyDown={(event) => {
          if (event.key !== 'Enter') return;
          add();
          // With Ctrl the form records, this reason with it.
          if (event.ctrlKey || event.metaKey) return;
          event.preventDefault();
          event.stopPropagation();
          event.currentTarget.closest('form')?.focus();
        }}
      />
    </label>
  );
}
