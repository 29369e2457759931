import { useMemo, useState } from 'react';
import type { PreparedSeries } from '../contract/prepare-contract.ts';
import { timeTitle, timeWords } from '../core/describe-time.ts';
import type { Interval } from '../core/interval.ts';
import { numberLabel } from '../plot/number-label.ts';
import { describeRecipe } from '../session/describe-recipe.ts';
import { ephemerisOf } from '../store/bench-selection.ts';
import { useBench, useCandling, useView } from '../store/use-candling.ts';
import type { FluxView } from '../store/view-store.ts';
import { ArrangementToggle } from './ArrangementToggle.tsx';
import { laneOf, singlesLane } from './event-lanes.ts';
import { fluxValues } from './flux-values.ts';
import { OverviewPlot } from './OverviewPlot.tsx';
import { StripPlot } from './StripPlot.tsx';
import { useThemeKey } from './use-theme-key.ts';

const VIEWS: readonly FluxView[] = ['raw', 'trend', 'prepared'];
const NO_TIMES = new Float64Array();

interface Cursor {
  readonly time: number;
  readonly value: number | undefined;
}

export function StripPane() {
  const { view } = useCandling();
  const { target, prepared } = useBench();
  const [cursor, setCursor] = useState<Cursor>();
  const { fluxView, arrangement } = useView((state) => state);
  return (
    <section className="strip-pane" aria-label="Strip">
      <header className="pane-head">
        <h2>Strip</h2>
        <fieldset className="toggle">
          <legend className="visually-hidden">Flux shown</legend>
          {VIEWS.map((name) => (
            <button
              key={name}
              type="button"
              aria-pressed={fluxView === name}
              onClick={() => view.setState({ fluxView: name })}
            >
              {name}
            </button>
          ))}
        </fieldset>
        {arrangement === 'fold' && <ArrangementToggle />}
        <button type="button" className="recipe-words" onClick={() => view.setState({ dialog: 'recipe' })}>
          {target && describeRecipe(target.recipe)}
        </button>
        <span className="spread" />
        <Readout cursor={cursor} />
      </header>
      {prepared === undefined ? <EmptyStrip /> : <StripPlots prepared={prepared} onCursor={setCursor} />}
    </section>
  );
}

/** Time with its scale and zero, and flux, in columns that do not move. */
function Readout({ cursor }: { readonly cursor: Cursor | undefined }) {
  const { lightCurve, prepared } = useBench();
  if (lightCurve === undefined) return null;
  const { name, scale, zero } = timeWords(lightCurve.lightCurve.timeReference);
  return (
    <span className="readout">
      {name}
      {scale && <sub>{scale}</sub>}
      {zero && ` − ${zero}`}
      <em className="readout-time">{cursor === undefined ? '' : numberLabel(cursor.time, 4)}</em>
      {cursor?.value !== undefined && (
        <>
          flux <em className="readout-flux">{numberLabel(cursor.value)}</em>
          {prepared?.fluxUnit === 'sigma' ? 'σ' : 'ppm'}
        </>
      )}
    </span>
  );
}

function EmptyStrip() {
  const { failure, lightCurve } = useBench();
  const themeKey = useThemeKey();
  const waiting = lightCurve === undefined ? 'Reading the light curve.' : 'Preparing the flux.';
  return (
    <div className="plot-host">
      <StripPlot
        series={{ time: NO_TIMES, values: NO_TIMES }}
        yTitle="flux / ppm"
        marks={[]}
        lanes={[]}
        view={[0, 1]}
        fullSpan={[0, 1]}
        tool="pan"
        label="Strip."
        themeKey={themeKey}
        emptyText={failure ?? waiting}
        onView={() => undefined}
      />
    </div>
  );
}

function StripPlots({
  prepared,
  onCursor,
}: {
  readonly prepared: PreparedSeries;
  readonly onCursor: (cursor: Cursor | undefined) => void;
}) {
  const { actions, view } = useCandling();
  const { target, case: chosen, lightCurve, singles } = useBench();
  const { fluxView, stripSpan, trial, tool, selectedMarkId } = useView((state) => state);
  const themeKey = useThemeKey();
  const full = useMemo(() => fullSpan(prepared.time), [prepared.time]);
  const shown = useMemo(() => fluxValues(prepared, fluxView), [prepared, fluxView]);
  const overview = useMemo(() => fluxValues(prepared, 'trend'), [prepared]);
  const cases = target?.cases;
  const lanes = useMemo(() => {
    const own = (cases ?? []).flatMap((one) => {
      const ephemeris = ephemerisOf(one, prepared);
      const look = { caseNumber: one.number, selected: one === chosen };
      return ephemeris === undefined ? [] : [laneOf(ephemeris, prepared.time, full, look)];
    });
    const look = { caseNumber: undefined, selected: true };
    const found = singles === undefined || singles.events.length === 0 ? own : [...own, singlesLane(singles.events)];
    return trial === undefined || chosen !== undefined ? found : [...found, laneOf(trial, prepared.time, full, look)];
  }, [cases, chosen, prepared, full, trial, singles]);
  const marks = (target?.marks ?? []).map(({ id, kind, interval }) => ({
    id,
    kind,
    ...interval,
    selected: id === selectedMarkId,
  }));
  const window = stripSpan ?? full;
  const span = [window.start, window.end] as const;
  const setSpan = ([start, end]: readonly [number, number]) => view.setState({ stripSpan: { start, end } });
  const title = lightCurve && timeTitle(lightCurve.lightCurve.timeReference);

  return (
    <>
      <div className="plot-host">
        <StripPlot
          series={shown}
          trend={shown.trend}
          dropped={shown.dropped}
          yTitle={`flux / ${shown.unit}`}
          timeTitle={title}
          marks={marks}
          lanes={lanes}
          view={span}
          fullSpan={[full.start, full.end]}
          tool={tool}
          label={stripSentence(target?.label, prepared, fluxView)}
          themeKey={themeKey}
          onView={setSpan}
          onCursor={(time, value) => onCursor(time === undefined ? undefined : { time, value })}
          onBrush={(start, end) =>
            view.setState({ markDraft: { markId: undefined, kind: 'dip', interval: { start, end }, note: '' } })
          }
          onMarkClick={(id) => view.setState({ selectedMarkId: id })}
          onMarkDrag={(id, start, end, phase) => actions.moveMark(id, { start, end }, phase)}
          onEventClick={(caseNumber) => {
            const clicked = cases?.find(({ number }) => number === caseNumber);
            if (clicked !== undefined) actions.selectCase(clicked.id);
          }}
        />
      </div>
      <div className="overview-host">
        <OverviewPlot
          series={overview}
          trend={overview.trend}
          view={span}
          fullSpan={[full.start, full.end]}
          title="raw"
          label="Overview of the whole series."
          themeKey={themeKey}
          onView={setSpan}
        />
      </div>
    </>
  );
}

/** A little room on both sides, so that the first and last events are not cut. */
function fullSpan(time: Float64Array): Interval {
  const start = time[0] ?? 0;
  const end = time.at(-1) ?? 1;
  const room = Math.max((end - start) * 0.005, 0.01);
  return { start: start - room, end: end + room };
}

function stripSentence(label: string | undefined, prepared: PreparedSeries, view: FluxView): string {
  const { time, spanDays, scatter } = prepared;
  return (
    `Strip of ${label ?? 'the target'}: ${view} flux, ${numberLabel(time.length)} points over ` +
    `${numberLabel(spanDays, 1)} days, scatter ${numberLabel(scatter * 1e6)} ppm.`
  );
}
