import { useMemo, useState } from 'react';
import { numberLabel } from '../plot/number-label.ts';
import type { BenchSelection } from '../store/bench-selection.ts';
import { useBench, useCandling, useView } from '../store/use-candling.ts';
import { ArrangementToggle } from './ArrangementToggle.tsx';
import { PeriodogramPlot } from './PeriodogramPlot.tsx';
import { boxView, sinesView } from './periodogram-view.ts';
import { SearchProgress } from './SearchProgress.tsx';
import { Toggle } from './Toggle.tsx';
import { useThemeKey } from './use-theme-key.ts';

const KINDS = { box: 'box', sines: 'Lomb-Scargle' } as const;

export function PeriodogramPane() {
  const { actions, view } = useCandling();
  const bench = useBench();
  const { search, sines, ephemeris, running, runningSines } = bench;
  const { periodogram, periodogramValue, arrangement } = useView((state) => state);
  const [cursor, setCursor] = useState<{ period: number; value: number | undefined }>();
  const themeKey = useThemeKey();
  const isBox = periodogram === 'box';
  const shown = useMemo(
    () => (isBox ? boxView(bench, periodogramValue) : sinesView(bench)),
    [bench, isBox, periodogramValue],
  );
  const waiting = isBox ? (search === undefined ? running : undefined) : sines === undefined ? runningSines : undefined;
  return (
    <section className="periodogram-pane" aria-label="Periodogram">
      <header className="pane-head">
        <h2>Periodogram</h2>
        <Toggle
          legend="Periodogram shown"
          value={periodogram}
          options={['box', 'sines']}
          words={KINDS}
          onChoose={(kind) => actions.showPeriodogram(kind)}
        />
        {isBox && arrangement === 'search' && (
          <Toggle
            legend="Quantity shown"
            value={periodogramValue}
            options={['SDE', 'levelled', 'S/N']}
            onChoose={(quantity) => view.setState({ periodogramValue: quantity })}
          />
        )}
        <span className="quiet">{isBox ? roundWords(bench) : 'floating mean, on the undetrended flux'}</span>
        <span className="spread" />
        {cursor !== undefined && (
          <span className="readout">
            <span className="symbol">P</span> <em>{numberLabel(cursor.period, 5)}</em> d{' '}
            {cursor.value !== undefined && (
              <>
                {shown.yTitle} <em>{numberLabel(cursor.value, isBox ? 1 : 3)}</em>
              </>
            )}
          </span>
        )}
        {arrangement === 'search' ? (
          <ArrangementToggle />
        ) : (
          <button type="button" className="recipe-words" onClick={() => view.setState({ dialog: 'search settings' })}>
            {search === undefined
              ? 'search settings'
              : `${numberLabel(search.settings.trialCount)} trial periods, ${numberLabel(search.settings.shortestPeriodDays, 2)} to ${numberLabel(search.settings.longestPeriodDays, 1)} d`}
          </button>
        )}
      </header>
      <div className="plot-host">
        {waiting !== undefined ? (
          <SearchProgress job={waiting} />
        ) : (
          <PeriodogramPlot
            periods={shown.periods}
            values={shown.values}
            yTitle={shown.yTitle}
            xTitle="trial period / d"
            peaks={shown.peaks}
            aliases={shown.aliases}
            threshold={shown.threshold}
            selectedPeriodDays={ephemeris?.periodDays}
            label={shown.sentence}
            themeKey={themeKey}
            emptyText={emptyText(bench, isBox)}
            onPick={(periodDays) => pick(bench, actions, isBox, periodDays)}
            onCursor={(period, value) => setCursor(period === undefined ? undefined : { period, value })}
          />
        )}
      </div>
    </section>
  );
}

function roundWords({ search }: BenchSelection): string {
  if (search === undefined) return '';
  const { round, maskedPoints } = search.settings;
  return round === 1
    ? 'round 1, nothing masked'
    : `round ${round}, ${numberLabel(maskedPoints)} points of ${round - 1} ${round === 2 ? 'signal' : 'signals'} masked`;
}

function emptyText({ failure, searchCancelled, sines }: BenchSelection, isBox: boolean): string {
  if (!isBox) return sines === undefined ? (failure ?? 'Computing.') : ' ';
  return failure ?? (searchCancelled ? 'The search was cancelled. Press R to search again.' : ' ');
}

function pick(
  { search, sines }: BenchSelection,
  actions: ReturnType<typeof useCandling>['actions'],
  isBox: boolean,
  periodDays: number,
): void {
  if (!isBox) {
    const sine = sines?.peaks.find((peak) => peak.periodDays === periodDays);
    actions.pickSine(periodDays, sine?.maximumDays ?? 0);
    return;
  }
  const rank = search?.peaks.findIndex((peak) => peak.periodDays === periodDays) ?? -1;
  if (rank >= 0) actions.pickPeak(search!.peaks[rank]!, rank + 1);
  else actions.pickPeriod(periodDays);
}
