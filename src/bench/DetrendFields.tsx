import type { Detrend, DetrendKind } from '../core/recipe.ts';
import { NumberField } from './NumberField.tsx';
import { Toggle } from './Toggle.tsx';

const DEFAULT_WINDOW_DAYS = 1.5;
const DEFAULT_SINES = 8;

/** Each detrender as it starts, its time scale kept from the last one where both have one. */
const START: Readonly<Record<DetrendKind, (scaleDays: number) => Detrend>> = {
  none: () => ({ kind: 'none' }),
  biweight: (windowDays) => ({ kind: 'biweight', windowDays }),
  'running median': (windowDays) => ({ kind: 'running median', windowDays }),
  'savitzky-golay': (windowDays) => ({ kind: 'savitzky-golay', windowDays, degree: 2 }),
  spline: (knotDays) => ({ kind: 'spline', knotDays }),
  harmonics: () => ({ kind: 'harmonics', count: DEFAULT_SINES }),
};

const WORDS = { 'running median': 'median', 'savitzky-golay': 'Savitzky-Golay' } as const;

export function DetrendFields(props: { readonly detrend: Detrend; readonly onSet: (detrend: Detrend) => void }) {
  const { detrend, onSet } = props;
  const scaleDays = scaleOf(detrend) ?? DEFAULT_WINDOW_DAYS;
  return (
    <div className="choices">
      <Toggle
        legend="Detrend"
        value={detrend.kind}
        options={Object.keys(START) as DetrendKind[]}
        words={WORDS}
        onChoose={(kind) => onSet(START[kind](scaleDays))}
      />
      {'windowDays' in detrend && (
        <NumberField
          label="width of the sliding window in days"
          unit="d"
          value={detrend.windowDays}
          least={0.01}
          onCommit={(windowDays) => onSet({ ...detrend, windowDays })}
        />
      )}
      {detrend.kind === 'savitzky-golay' && (
        <NumberField
          label="degree of the polynomial"
          value={detrend.degree}
          least={0}
          whole
          onCommit={(degree) => onSet({ ...detrend, degree: Math.min(5, degree) })}
        />
      )}
      {detrend.kind === 'spline' && (
        <NumberField
          label="time scale that the spline can follow in days"
          unit="d"
          value={detrend.knotDays}
          least={0.01}
          onCommit={(knotDays) => onSet({ ...detrend, knotDays })}
        />
      )}
      {detrend.kind === 'harmonics' && (
        <NumberField
          label="at most so many sines"
          unit="sines"
          value={detrend.count}
          least={1}
          whole
          onCommit={(count) => onSet({ ...detrend, count: Math.min(50, count) })}
        />
      )}
    </div>
  );
}

function scaleOf(detrend: Detrend): number | undefined {
  if ('windowDays' in detrend) return detrend.windowDays;
  return detrend.kind === 'spline' ? detrend.knotDays : undefined;
}
