import { useMemo, useState } from 'react';
import { isSameSignal } from '../core/same-signal.ts';
import { numberLabel } from '../plot/number-label.ts';
import type { BenchSelection } from '../store/bench-selection.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { PeriodogramPlot } from './PeriodogramPlot.tsx';
import { SearchProgress } from './SearchProgress.tsx';
import { useThemeKey } from './use-theme-key.ts';

const NO_PERIODS = new Float64Array();

export function PeriodogramPane() {
  const { actions, view } = useCandling();
  const bench = useBench();
  const { search, running, ephemeris, searchCancelled, failure } = bench;
  const [cursor, setCursor] = useState<{ period: number; value: number | undefined }>();
  const themeKey = useThemeKey();
  const peaks = useMemo(() => peaksOf(bench), [bench]);
  const pick = (periodDays: number) => {
    const rank = search?.peaks.findIndex((peak) => peak.periodDays === periodDays) ?? -1;
    if (rank >= 0) actions.pickPeak(search!.peaks[rank]!, rank + 1);
    else actions.pickPeriod(periodDays);
  };
  return (
    <section className="periodogram-pane" aria-label="Periodogram">
      <header className="pane-head">
        <h2>Periodogram</h2>
        <span>box least squares, signal detection efficiency</span>
        <span className="spread" />
        {cursor !== undefined && (
          <span className="readout">
            <span className="symbol">P</span> <em>{numberLabel(cursor.period, 5)}</em> d{' '}
            {cursor.value !== undefined && (
              <>
                SDE <em>{numberLabel(cursor.value, 1)}</em>
              </>
            )}
          </span>
        )}
        <button type="button" className="recipe-words" onClick={() => view.setState({ dialog: 'search settings' })}>
          {search === undefined
            ? 'search settings'
            : `${numberLabel(search.settings.trialCount)} trial periods, ${numberLabel(search.settings.shortestPeriodDays, 2)} to ${numberLabel(search.settings.longestPeriodDays, 1)} d`}
        </button>
      </header>
      <div className="plot-host">
        {running !== undefined && search === undefined ? (
          <SearchProgress job={running} />
        ) : (
          <PeriodogramPlot
            periods={search?.periods ?? NO_PERIODS}
            values={search?.sde ?? NO_PERIODS}
            yTitle="SDE"
            xTitle="trial period / d"
            peaks={peaks}
            selectedPeriodDays={ephemeris?.periodDays}
            label={periodogramSentence(bench)}
            themeKey={themeKey}
            emptyText={failure ?? (searchCancelled ? 'The search was cancelled. Press R to search again.' : ' ')}
            onPick={pick}
            onCursor={(period, value) => setCursor(period === undefined ? undefined : { period, value })}
          />
        )}
      </div>
    </section>
  );
}

/** A peak wears its case's shape where a case has the same signal. */
function peaksOf({ search, target, prepared }: BenchSelection) {
  return (search?.peaks ?? []).map((peak) => ({
    periodDays: peak.periodDays,
    value: peak.sde,
    label: `${numberLabel(peak.periodDays, 5)} d`,
    caseNumber: target?.cases.find(
      ({ timing }) => timing.kind === 'linear' && isSameSignal(timing, peak, prepared?.spanDays ?? 0),
    )?.number,
  }));
}

function periodogramSentence({ search }: BenchSelection): string {
  const best = search?.peaks[0];
  if (best === undefined) return 'Periodogram: nothing searched yet.';
  return (
    `Periodogram: strongest peak at ${numberLabel(best.periodDays, 5)} days, ` +
    `SDE ${numberLabel(best.sde, 1)}, S/N ${numberLabel(best.signalToNoise, 1)}.`
  );
}
