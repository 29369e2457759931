import { useMemo, useState } from 'react';
import type { PreparedSeries } from '../contract/prepare-contract.ts';
import type { Ephemeris } from '../core/ephemeris.ts';
import { measureBox } from '../core/measure-box.ts';
import { binMinutesFor } from '../plot/bin-points.ts';
import { numberLabel } from '../plot/number-label.ts';
import type { Case } from '../session/document.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { FoldPlot } from './FoldPlot.tsx';
import { fluxValues, shownScale } from './flux-values.ts';
import { PeriodField } from './PeriodField.tsx';
import { useThemeKey } from './use-theme-key.ts';

/** Six durations in all, three on each side. */
const HALF_WIDTH_DURATIONS = 3;

export function FoldPane() {
  const { case: chosen, ephemeris, prepared } = useBench();
  const [halfWidth, setHalfWidth] = useState<number>();
  const [tool, setTool] = useState<'epoch' | 'period'>('epoch');
  const single = chosen?.timing.kind === 'single';
  const hours = halfWidth ?? (ephemeris === undefined ? 6 : HALF_WIDTH_DURATIONS * ephemeris.durationDays * 24);
  return (
    <section className="fold-pane" aria-label="Fold">
      <header className="pane-head">
        <h2>Fold</h2>
        <span>{foldWords(chosen, ephemeris, hours)}</span>
        <span className="spread" />
        {ephemeris !== undefined && !single && (
          <>
            <fieldset className="toggle">
              <legend className="visually-hidden">A drag over the fold changes</legend>
              {(['epoch', 'period'] as const).map((name) => (
                <button key={name} type="button" aria-pressed={tool === name} onClick={() => setTool(name)}>
                  drag {name}
                </button>
              ))}
            </fieldset>
            <PeriodField />
          </>
        )}
      </header>
      <FoldPlots ephemeris={ephemeris} prepared={prepared} hours={hours} tool={tool} onHours={setHalfWidth} />
    </section>
  );
}

function foldWords(chosen: Case | undefined, ephemeris: Ephemeris | undefined, hours: number): string {
  if (ephemeris === undefined) return 'no period chosen';
  const what = chosen === undefined ? 'trial, not a case yet' : `case ${chosen.number}`;
  return `${what}, bins ${numberLabel(binMinutesFor(ephemeris.durationDays, hours))} min`;
}

const NO_VALUES = new Float64Array();

function FoldPlots(props: {
  readonly ephemeris: Ephemeris | undefined;
  readonly prepared: PreparedSeries | undefined;
  readonly hours: number;
  readonly tool: 'epoch' | 'period';
  readonly onHours: (hours: number) => void;
}) {
  const { ephemeris, prepared, hours, tool, onHours } = props;
  const { actions } = useCandling();
  const { case: chosen, target } = useBench();
  const themeKey = useThemeKey();
  const shown = useMemo(() => prepared && fluxValues(prepared, 'prepared'), [prepared]);
  const box = useMemo(
    () => prepared && ephemeris && measureBox(prepared.time, prepared.flux, prepared.error, ephemeris),
    [prepared, ephemeris],
  );
  const { factor, unit } = prepared === undefined ? { factor: 1e6, unit: 'ppm' } : shownScale(prepared);
  const at = ephemeris ?? { periodDays: 1, epochDays: 0, durationDays: 0.1 };
  const ready = ephemeris !== undefined && shown !== undefined;
  const depth = box && box.depth * factor;
  const common = {
    ...at,
    time: ready ? shown.time : NO_VALUES,
    flux: ready ? shown.values : NO_VALUES,
    halfWidthHours: hours,
    boxDepthPpm: ready ? depth : undefined,
    depthLabel: box && `box depth ${numberLabel(depth!)} ± ${numberLabel(box.depthError * factor)} ${unit}`,
    caseNumber: chosen?.number,
    tool,
    themeKey,
    yTitle: `flux / ${unit}`,
    onEphemeris: (moved: { periodDays: number; epochDays: number }, phase: 'preview' | 'commit' | 'cancel') =>
      actions.setEphemeris({ ...at, ...moved }, phase),
    onDuration: (durationDays: number, phase: 'preview' | 'commit' | 'cancel') =>
      actions.setEphemeris({ ...at, durationDays }, phase),
  };
  const sentence = foldSentence(target?.label, ephemeris, depth, unit);
  return (
    <>
      <div className="plot-host">
        <FoldPlot
          {...common}
          mode="event"
          xTitle="hours from mid-event"
          label={sentence}
          emptyText="Pick a peak of the periodogram, or make a case from marks or by hand."
          onHalfWidth={onHours}
        />
      </div>
      {chosen?.timing.kind !== 'single' && (
        <div className="full-phase-host">
          <FoldPlot
            {...common}
            mode="full"
            depthLabel=""
            durationLabel=""
            boxDepthPpm={undefined}
            xTitle="phase"
            label={`The whole cycle. ${sentence}`}
          />
        </div>
      )}
    </>
  );
}

function foldSentence(
  label: string | undefined,
  ephemeris: Ephemeris | undefined,
  depth: number | undefined,
  unit: string,
): string {
  if (ephemeris === undefined) return 'Fold: no period chosen.';
  const { periodDays, durationDays } = ephemeris;
  const depthWords = depth === undefined ? '' : `, box depth ${numberLabel(depth)} ${unit}`;
  return (
    `Fold of ${label ?? 'the target'} at ${numberLabel(periodDays, 5)} days, ` +
    `duration ${numberLabel(durationDays * 24, 2)} hours${depthWords}.`
  );
}
