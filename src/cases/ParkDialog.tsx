import { useEffect, useRef, useState } from 'react';
import { useBench, useCandling } from '../store/use-candling.ts';

/** What the case waits for, and until when. */
export function ParkDialog({ onLeave }: { readonly onLeave: () => void }) {
  const { document, view } = useCandling();
  const { target, case: chosen } = useBench();
  const dialog = useRef<HTMLDialogElement>(null);
  const [reason, setReason] = useState(chosen?.parked?.reason ?? '');
  const [until, setUntil] = useState(chosen?.parked?.until ?? '');
  const [refusal, setRefusal] = useState<string>();
  useEffect(() => dialog.current?.showModal(), []);
  if (target === undefined || chosen === undefined) return null;
  return (
    <dialog ref={dialog} className="sheet" aria-label={`Park case ${chosen.number}`} onClose={onLeave}>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          const parked = document.getState().run({
            kind: 'park',
            targetId: target.id,
            caseId: chosen.id,
            reason: reason.trim(),
            until: until || undefined,
          });
          if (parked) {
            // A ruling begun on the case was given up for parking it.
            view.setState({ rulingDraft: undefined });
            dialog.current?.close();
          } else setRefusal(document.getState().refusal);
        }}
      >
        <header className="head-line">
          <h2>
            Park {target.label} case {chosen.number}
          </h2>
        </header>
        <div className="sheet-body">
          <label className="stacked">
            waits for
            <input
              className="field"
              required
              placeholder="a second season, a spectrum, a colleague"
              value={reason}
              onChange={(event) => setReason(event.target.value)}
            />
          </label>
          <label className="stacked">
            until (empty: no date)
            <input className="field" type="date" value={until} onChange={(event) => setUntil(event.target.value)} />
          </label>
          {refusal !== undefined && (
            <p className="notice error" role="alert">
              {refusal}
            </p>
          )}
          <div className="sheet-actions">
            {chosen.parked && (
              <button
                type="button"
                className="button"
                onClick={() => {
                  document.getState().run({ kind: 'unpark', targetId: target.id, caseId: chosen.id });
                  dialog.current?.close();
                }}
              >
                Take up again
              </button>
            )}
            <button type="button" className="button" onClick={() => dialog.current?.close()}>
              <kbd>Esc</kbd> Leave
            </button>
            <button type="submit" className="button primary">
              <kbd>Enter</kbd> Park
            </button>
          </div>
        </div>
      </form>
    </dialog>
  );
}
