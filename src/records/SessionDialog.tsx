import { useEffect, useRef, useState } from 'react';
import { useCandling, useDocument } from '../store/use-candling.ts';
import { exportSession, exportVettingLog } from './session-files.ts';
import './records.css';

/** The session as a whole: its name, its analyst, what goes in and out. */
export function SessionDialog(props: { readonly onLeave: () => void; readonly onImport: () => void }) {
  const { onLeave, onImport } = props;
  const candling = useCandling();
  const session = useDocument((state) => state.document);
  const dialog = useRef<HTMLDialogElement>(null);
  const [isLeavingSession, setLeavingSession] = useState(false);
  useEffect(() => dialog.current?.showModal(), []);
  if (session === undefined) return null;
  const { run } = candling.document.getState();
  const close = () => dialog.current?.close();
  const startNew = () => void candling.startSession('untitled').then(onLeave);
  return (
    <dialog ref={dialog} className="sheet" aria-label="Session" onClose={onLeave}>
      <header className="head-line">
        <h2>Session</h2>
        <span className="spread" />
        <button type="button" className="button compact" onClick={close}>
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
          <button
            type="button"
            className="button"
            onClick={() => {
              // What the import says must not stand behind this dialog.
              close();
              onImport();
            }}
          >
            Import a session
          </button>
          <button type="button" className="button" onClick={() => exportVettingLog(candling, 'csv')}>
            Vetting log as CSV
          </button>
          <button type="button" className="button" onClick={() => exportVettingLog(candling, 'json')}>
            Vetting log as JSON
          </button>
          <button
            type="button"
            className="button"
            onClick={() => (session.targets.length > 0 ? setLeavingSession(true) : startNew())}
          >
            New session
          </button>
        </div>
        {isLeavingSession && (
          <LeaveSession
            onExport={() => {
              exportSession(candling);
              startNew();
            }}
            onDiscard={startNew}
            onStay={() => setLeavingSession(false)}
          />
        )}
        <p className="small quiet">
          A session file holds targets, recipes, marks, cases, rulings and the journal, with the SHA-256 of each light
          curve, but not the flux. A new or imported session takes the place of this one: export this one first to come
          back to it. The vetting log records judgements, not confirmed planets.
        </p>
      </div>
    </dialog>
  );
}

/** Asked before a session with targets leaves the screen: only its file brings it back. */
function LeaveSession(props: {
  readonly onExport: () => void;
  readonly onDiscard: () => void;
  readonly onStay: () => void;
}) {
  return (
    <div className="notice leave-session" role="alert">
      <span>This session leaves the screen, and only an exported file of it brings it back.</span>
      <span className="record-actions">
        <button type="button" className="button compact primary" onClick={props.onExport}>
          Export it and start a new one
        </button>
        <button type="button" className="button compact" onClick={props.onDiscard}>
          Start without exporting
        </button>
        <button type="button" className="button compact" onClick={props.onStay}>
          Stay
        </button>
      </span>
    </div>
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
          if (typed === '') event.target.value = value;
          else if (typed !== value) onCommit(typed);
        }}
        onKeyDown={(event) => {
          if (event.key === 'Enter') event.currentTarget.blur();
        }}
      />
    </label>
  );
}
