import { useEffect, useRef } from 'react';
import { useCandling, useDocument } from '../store/use-candling.ts';
import { exportSession, exportVettingLog } from './session-files.ts';
import './records.css';

/** The session as a whole: its name, its analyst, what goes in and out. */
export function SessionDialog(props: { readonly onLeave: () => void; readonly onImport: () => void }) {
  const { onLeave, onImport } = props;
  const candling = useCandling();
  const session = useDocument((state) => state.document);
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => dialog.current?.showModal(), []);
  if (session === undefined) return null;
  const { run } = candling.document.getState();
  return (
    <dialog ref={dialog} className="sheet" aria-label="Session" onClose={onLeave}>
      <header className="head-line">
        <h2>Session</h2>
        <span className="spread" />
        <button type="button" className="button compact" onClick={() => dialog.current?.close()}>
          <kbd>Esc</kbd> close
        </button>
      </header>
      <div className="sheet-body">
        <NameField
          label="name of the session"
          value={session.name}
          onCommit={(name) => run({ kind: 'name session', name })}
        />
        <NameField
          label="analyst, written into every ruling"
          value={session.analyst}
          onCommit={(analyst) => run({ kind: 'name analyst', analyst })}
        />
        <div className="record-actions">
          <button type="button" className="button" onClick={() => exportSession(candling)}>
            Export the session
          </button>
          <button type="button" className="button" onClick={onImport}>
            Import a session
          </button>
          <button type="button" className="button" onClick={() => exportVettingLog(candling, 'csv')}>
            Vetting log as CSV
          </button>
          <button type="button" className="button" onClick={() => exportVettingLog(candling, 'json')}>
            Vetting log as JSON
          </button>
          <button type="button" className="button" onClick={() => void candling.startSession('untitled').then(onLeave)}>
            New session
          </button>
        </div>
        <p className="small quiet">
          A session file holds targets, recipes, marks, cases, rulings and the journal, with the SHA-256 of each light
          curve, but not the flux. The vetting log records judgements, not confirmed planets.
        </p>
      </div>
    </dialog>
  );
}

function NameField(props: {
  readonly label: string;
  readonly value: string;
  readonly onCommit: (value: string) => void;
}) {
  const { label, value, onCommit } = props;
  return (
    <label className="stacked">
      {label}
      <input
        className="field"
        key={value}
        defaultValue={value}
        onBlur={(event) => {
          const typed = event.target.value.trim();
          if (typed !== value && typed !== '') onCommit(typed);
        }}
        onKeyDown={(event) => {
          if (event.key === 'Enter') event.currentTarget.blur();
        }}
      />
    </label>
  );
}
