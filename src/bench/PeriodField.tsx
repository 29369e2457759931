import { useEffect, useState } from 'react';
import { numberLabel } from '../plot/number-label.ts';
import { useBench, useCandling } from '../store/use-candling.ts';

/** The fold's period: typed with Enter, or halved and doubled by a key. */
export function PeriodField() {
  const { actions } = useCandling();
  const { ephemeris } = useBench();
  const period = ephemeris?.periodDays;
  const [text, setText] = useState('');
  useEffect(() => setText(period === undefined ? '' : plainNumber(period)), [period]);
  if (ephemeris === undefined) return null;
  return (
    <form
      className="period-field"
      onSubmit={(event) => {
        event.preventDefault();
        const typed = Number(text.replace(/[\s\u00a0]/g, ''));
        if (typed > 0) actions.setEphemeris({ ...ephemeris, periodDays: typed });
        else setText(plainNumber(ephemeris.periodDays));
      }}
    >
      <label>
        <span className="symbol">P</span>
        <input
          className="field"
          inputMode="decimal"
          aria-label="Period in days"
          title={`${numberLabel(ephemeris.periodDays, 6)} d`}
          value={text}
          onChange={(event) => setText(event.target.value)}
          onBlur={() => setText(plainNumber(ephemeris.periodDays))}
        />
        d
      </label>
    </form>
  );
}

const plainNumber = (value: number) => String(Number(value.toPrecision(9)));
