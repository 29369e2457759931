import { useEffect, useRef, useState } from 'react';
import { useBench, useCandling } from '../store/use-candling.ts';
import { HOURS_A_DAY, readHandTiming } from './hand-timing.ts';
import { openTyped } from './typed-number.ts';

/** A case from numbers that the analyst brings: a period of another source, or one event. */
export function HandTimingDialog({ onLeave }: { readonly onLeave: () => void }) {
  const { actions } = useCandling();
  const { target, ephemeris } = useBench();
  const dialog = useRef<HTMLDialogElement>(null);
  const [kind, setKind] = useState<'linear' | 'single'>('linear');
  const [period, setPeriod] = useState(ephemeris === undefined ? '' : openTyped(ephemeris.periodDays));
  const [epoch, setEpoch] = useState(ephemeris === undefined ? '' : openTyped(ephemeris.epochDays));
  const [hours, setHours] = useState(ephemeris === undefined ? '' : openTyped(ephemeris.durationDays * HOURS_A_DAY));
  useEffect(() => dialog.current?.showModal(), []);
  if (target === undefined) return null;
  const handTiming = readHandTiming({ kind, period, epoch, hours });
  const isUsable = handTiming !== undefined;
  return (
    <dialog ref={dialog} className="sheet" aria-label="Make a case by hand" onClose={onLeave}>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          if (handTiming === undefined) return;
          const { epochDays, durationDays } = handTiming;
          void actions.makeCaseByHand(
            handTiming.kind === 'linear' ? handTiming : { kind: 'single', timeDays: epochDays, durationDays },
          );
          dialog.current?.close();
        }}
      >
        <header className="head-line">
          <h2>Make a case by hand</h2>
        </header>
        <div className="sheet-body">
          <fieldset className="toggle">
            <legend className="visually-hidden">Kind of timing</legend>
            {(['linear', 'single'] as const).map((name) => (
              <button key={name} type="button" aria-pressed={name === kind} onClick={() => setKind(name)}>
                {name}
              </button>
            ))}
          </fieldset>
          {kind === 'linear' && <Field label="period / d" text={period} onChange={setPeriod} />}
          <Field label="mid-event time / d, as on the strip" text={epoch} onChange={setEpoch} />
          <Field label="duration / h" text={hours} onChange={setHours} />
          {!isUsable && (
            <p className="small quiet">
              {kind === 'linear'
                ? 'A case needs a time, a duration over 0 and a period longer than the duration.'
                : 'A case needs a time and a duration over 0.'}
            </p>
          )}
          <div className="sheet-actions">
            <button type="button" className="button" onClick={() => dialog.current?.close()}>
              <kbd>Esc</kbd> Leave
            </button>
            <button type="submit" className={isUsable ? 'button primary' : 'button'} disabled={!isUsable}>
              <kbd>Enter</kbd> Make the case
            </button>
          </div>
        </div>
      </form>
    </dialog>
  );
}

function Field(props: { readonly label: string; readonly text: string; readonly onChange: (text: string) => void }) {
  return (
    <label className="stacked">
      {props.label}
      <input
        className="field"
        inputMode="decimal"
        value={props.text}
        onChange={(event) => props.onChange(event.target.value)}
      />
    </label>
  );
}
