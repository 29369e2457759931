import { useLayoutEffect, useMemo, useRef } from 'react';
import type { PeriodogramIntent } from '../plot/interactions/periodogram-gesture.ts';
import { periodogramPlot } from '../plot/periodogram-plot.ts';
import { ascendingPeriods, type PeriodogramScene } from '../plot/periodogram-scene.ts';
import type { Figure } from '../plot/save-figure.ts';
import { type MountedPlot, mountPlot } from '../plot/surface/mount-plot.ts';
import './bench-plots.css';

export interface PeriodogramPlotProps extends PeriodogramScene {
  readonly onPick: (periodDays: number) => void;
  readonly onCursor?: ((periodDays: number | undefined, value: number | undefined) => void) | undefined;
  readonly onFigure?: ((figure: Figure) => void) | undefined;
  readonly emptyText?: string | undefined;
}

export function PeriodogramPlot(props: PeriodogramPlotProps) {
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<MountedPlot<PeriodogramScene, PeriodogramIntent>>(undefined);
  const { onFigure, emptyText, label, periods, values } = props;
  const ascending = useMemo(() => ascendingPeriods(periods, values), [periods, values]);
  const empty = periods.length === 0 ? emptyText : undefined;
  useLayoutEffect(() => {
    const mounted = mountPlot(host.current!, periodogramPlot());
    plot.current = mounted;
    return mounted.dispose;
  }, []);
  useLayoutEffect(() => plot.current?.show({ ...props, ...ascending }, (intent) => tellPeriodogram(props, intent)));
  useLayoutEffect(() => {
    if (plot.current) onFigure?.(plot.current.figure);
  }, [onFigure]);
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a plot is read and worked by keys
    <div ref={host} className="plot" role="img" tabIndex={0} aria-label={empty ? `${label} ${empty}` : label}>
      {empty && <p className="plot-empty">{empty}</p>}
    </div>
  );
}

function tellPeriodogram(props: PeriodogramPlotProps, intent: PeriodogramIntent): void {
  if (intent.kind === 'pick') props.onPick(intent.periodDays);
  else props.onCursor?.(intent.periodDays, intent.value);
}
