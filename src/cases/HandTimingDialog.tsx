import { useEffect, useRef, useState } from 'react';
import { singleTiming } from '../store/bench-actions.ts';
import { useBench, useCandling } from '../store/use-candling.ts';

/** A case from numbers that the analyst brings: a period of another source, or one event. */
export function HandTimingDialog({ onLeave }: { readonly onLeave: () => void }) {
  const { actions } = useCandling();
  const { target, ephemeris, prepared } = useBench();
  const dialog = useRef<HTMLDialogElement>(null);
  const [kind, setKind] = useState<'linear' | 'single'>('linear');
  const [period, setPeriod] = useState(
    ephemeris === undefined ? '' : String(Number(ephemeris.periodDays.toPrecision(9))),
  );
  const [epoch, setEpoch] = useState(ephemeris === undefined ? '' : String(Number(ephemeris.epochDays.toPrecision(9))));
  const [hours, setHours] = useState(
    ephemeris === undefined ? '' : String(Number((ephemeris.durationDays * 24).toPrecision(4))),
  );
  useEffect(() => dialog.current?.showModal(), []);
  if (target === undefined) return null;
  const epochDays = epoch.trim() === '' ? Number.NaN : Number(epoch);
  const durationDays = Number(hours) / 24;
  const periodDays = Number(period);
  const usable = Number.isFinite(epochDays) && durationDays > 0 && (kind === 'single' || periodDays > durationDays);
  return (
    <dialog ref={dialog} className="sheet" aria-label="Make a case by hand" onClose={onLeave}>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          if (!usable) return;
          actions.makeCaseByHand(
            kind === 'linear'
              ? { kind, periodDays, epochDays, durationDays }
              : singleTiming(epochDays, durationDays, prepared?.time),
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
          <div className="sheet-actions">
            <button type="button" className="button" onClick={() => dialog.current?.close()}>
              <kbd>Esc</kbd> Leave
            </button>
            <button type="submit" className="button primary" disabled={!usable}>
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
