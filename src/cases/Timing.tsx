import { timeTitle } from '../core/describe-time.ts';
import type { Ephemeris, Timing } from '../core/ephemeris.ts';
import { formatNumber, formatValueWithError } from '../core/number-format.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { AliasSet } from './AliasSet.tsx';
import { EditableValue } from './EditableValue.tsx';

/** Period, epoch and duration with their errors; each is changed by typing another number. */
export function TimingSection() {
  const { actions } = useCandling();
  const { case: chosen, ephemeris, lightCurve } = useBench();
  if (ephemeris === undefined) return null;
  const timing: Timing = chosen?.timing ?? { kind: 'linear', ...ephemeris };
  const set = (change: Partial<Ephemeris>) => actions.setEphemeris({ ...ephemeris, ...change });
  const reference = lightCurve && timeTitle(lightCurve.lightCurve.timeReference).replace(' / d', '');
  const linear = timing.kind === 'linear' ? timing : undefined;
  const single = timing.kind === 'single' ? timing : undefined;
  return (
    <section className="sheet-section" aria-label="Timing">
      <h3>
        Timing <span className="kind">{timing.kind}</span> <small>{reference}</small>
      </h3>
      <div className="numbers">
        {linear && (
          <Row
            symbol="P"
            name="period"
            unit="d"
            value={linear.periodDays}
            error={linear.periodErrorDays}
            decimals={5}
            mustBePositive
            onCommit={(periodDays) => set({ periodDays })}
          />
        )}
        <Row
          symbol="T"
          index="0"
          name={single ? 'mid-event' : 'epoch'}
          unit="d"
          value={ephemeris.epochDays}
          error={linear?.epochErrorDays}
          decimals={4}
          onCommit={(epochDays) => set({ epochDays })}
        />
        <Row
          symbol="T"
          index="box"
          name="box duration"
          unit="h"
          value={ephemeris.durationDays * 24}
          error={linear?.durationErrorDays === undefined ? undefined : linear.durationErrorDays * 24}
          decimals={2}
          mustBePositive
          onCommit={(hours) => set({ durationDays: hours / 24 })}
        />
        {single && (
          <>
            <span className="symbol">P</span>
            <span className="name">period</span>
            <span className="value number">
              {single.shortestPeriodDays === undefined
                ? 'not bounded'
                : `> ${formatNumber(single.shortestPeriodDays, 1)}`}
            </span>
            <span className="error" />
            <span className="unit">d</span>
            {single.likelyPeriodDays !== undefined && (
              <>
                <span className="symbol">P</span>
                <span className="name">likely period</span>
                <span className="value number">{formatNumber(single.likelyPeriodDays, 1)}</span>
                <span className="error number">
                  {formatNumber(single.likelyFromDays, 1)} to {formatNumber(single.likelyToDays, 1)}
                </span>
                <span className="unit">d</span>
              </>
            )}
          </>
        )}
      </div>
      {chosen?.timing.kind === 'alias set' && <AliasSet timing={chosen.timing} />}
      {single && (
        <p className="small quiet">
          For every longer period, no other event of it falls on these data. A shorter one may hide in the gaps.
          {single.likelyPeriodDays !== undefined &&
            ' The likely one: median and central 68 % from duration, density and window (Kipping 2018), on a circular orbit.'}
        </p>
      )}
    </section>
  );
}

function Row(props: {
  readonly symbol: string;
  readonly index?: string;
  readonly name: string;
  readonly unit: string;
  readonly value: number;
  readonly error: number | undefined;
  readonly decimals: number;
  readonly mustBePositive?: boolean;
  readonly onCommit: (value: number) => void;
}) {
  const { symbol, index, name, unit, value, error, decimals, mustBePositive = false, onCommit } = props;
  const shown = formatValueWithError(value, error, decimals);
  return (
    <>
      <span>
        <span className="symbol">{symbol}</span>
        {index && <sub>{index}</sub>}
      </span>
      <span className="name">{name}</span>
      <span className="value">
        <EditableValue
          label={`${name} in ${unit}`}
          shown={shown.value}
          value={value}
          mustBePositive={mustBePositive}
          onCommit={onCommit}
        />
      </span>
      <span className="error number">{shown.error}</span>
      <span className="unit">{unit}</span>
    </>
  );
}
