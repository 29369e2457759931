import { type KeyboardEvent, useEffect, useRef, useState } from 'react';
import { CONFIDENCES, RULING_KINDS } from '../session/document.ts';
import { reasonsFor } from '../session/reasons.ts';
import { standingRuling } from '../session/selectors.ts';
import { useBench, useCandling, useView } from '../store/use-candling.ts';
import type { RulingDraft } from '../store/view-store.ts';
import { RulingBar } from './RulingBar.tsx';
import { nextAfterRecording, recordRuling, ruleWith } from './ruling-actions.ts';
import { CONFIDENCE_MEANING, stepConfidence, toggleReason, toggleReasonByKey } from './ruling-draft.ts';

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

  function onKeyDown(event: KeyboardEvent<HTMLFormElement>): void {
    const typing = event.target instanceof HTMLElement && event.target.matches('input[type="text"], textarea');
    if (event.key === 'Escape') leave();
    else if (event.key === 'Enter' && (!typing || event.ctrlKey || event.metaKey)) {
      if (event.target instanceof HTMLButtonElement && event.target.type === 'button') return;
      record();
    } else if (typing || event.ctrlKey || event.metaKey || event.altKey) return;
    else if (RULING_KINDS[Number(event.key) - 1] !== undefined)
      ruleWith(candling, RULING_KINDS[Number(event.key) - 1]!);
    else if (event.key === 'j') set(stepConfidence(draft, -1));
    else if (event.key === 'l') set(stepConfidence(draft, 1));
    else if (event.key === 'u') form.current?.querySelector<HTMLInputElement>('#own-reason')?.focus();
    else if (event.key === 'k') candling.view.setState({ rulingDraft: undefined, dialog: 'park' });
    else if (toggleReasonByKey(draft, event.key) !== draft) set(toggleReasonByKey(draft, event.key));
    else return;
    event.preventDefault();
  }

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
          <kbd>Enter</kbd> {next === undefined ? 'Record' : `Record, go to ${next}`}
        </button>
        <button type="button" className="button" onClick={leave}>
          <kbd>Esc</kbd> Leave
        </button>
      </div>
    </form>
  );
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
          if (event.key !== 'Enter' || event.ctrlKey) return;
          event.preventDefault();
          event.stopPropagation();
          add();
          event.currentTarget.closest('form')?.focus();
        }}
      />
    </label>
  );
}
