import { useMemo } from 'react';
import type { PeriodogramIntent } from '../plot/interactions/periodogram-gesture.ts';
import { periodogramPlot } from '../plot/periodogram-plot.ts';
import { ascendingPeriods, type PeriodogramScene } from '../plot/periodogram-scene.ts';
import type { Figure } from '../plot/save-figure.ts';
import { PlotHost } from './PlotHost.tsx';

export interface PeriodogramPlotProps extends PeriodogramScene {
  readonly onPick: (periodDays: number) => void;
  readonly onCursor?: ((periodDays: number | undefined, value: number | undefined) => void) | undefined;
  readonly onFigure?: ((figure: Figure) => void) | undefined;
  readonly emptyText?: string | undefined;
}

export function PeriodogramPlot(props: PeriodogramPlotProps) {
  const { periods, values } = props;
  const ascending = useMemo(() => ascendingPeriods(periods, values), [periods, values]);
  return (
    <PlotHost
      makeSpec={periodogramPlot}
      scene={{ ...props, ...ascending }}
      onIntent={(intent) => tellPeriodogram(props, intent)}
      onFigure={props.onFigure}
      emptyText={periods.length === 0 ? props.emptyText : undefined}
    />
  );
}

function tellPeriodogram(props: PeriodogramPlotProps, intent: PeriodogramIntent): void {
  if (intent.kind === 'pick') props.onPick(intent.periodDays);
  else props.onCursor?.(intent.periodDays, intent.value);
}
