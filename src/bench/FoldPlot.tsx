import { foldPlot } from '../plot/fold-plot.ts';
import type { FoldScene } from '../plot/fold-scene.ts';
import type { FoldIntent } from '../plot/interactions/fold-gesture.ts';
import type { DragPhase } from '../plot/interactions/strip-gesture.ts';
import type { Figure } from '../plot/save-figure.ts';
import { PlotHost } from './PlotHost.tsx';

export interface FoldPlotProps extends FoldScene {
  readonly onEphemeris: (
    ephemeris: { readonly periodDays: number; readonly epochDays: number },
    phase: DragPhase,
  ) => void;
  readonly onDuration?: ((durationDays: number, phase: DragPhase) => void) | undefined;
  /** Hours from mid-event (cycles in full mode) and ppm. */
  readonly onCursor?: ((x: number | undefined, fluxPpm: number | undefined) => void) | undefined;
  /** The wheel and + - ask for another width. */
  readonly onHalfWidth?: ((hours: number) => void) | undefined;
  readonly onFigure?: ((figure: Figure) => void) | undefined;
  readonly emptyText?: string | undefined;
}

export function FoldPlot(props: FoldPlotProps) {
  return (
    <PlotHost
      makeSpec={foldPlot}
      scene={props}
      onIntent={(intent) => tellFold(props, intent)}
      onFigure={props.onFigure}
      emptyText={props.time.length === 0 ? props.emptyText : undefined}
    />
  );
}

function tellFold(props: FoldPlotProps, intent: FoldIntent): void {
  switch (intent.kind) {
    case 'ephemeris':
      props.onEphemeris({ periodDays: intent.periodDays, epochDays: intent.epochDays }, intent.phase);
      return;
    case 'duration':
      props.onDuration?.(intent.durationDays, intent.phase);
      return;
    case 'half width':
      props.onHalfWidth?.(intent.hours);
      return;
    case 'cursor':
      props.onCursor?.(intent.x, intent.fluxPpm);
      return;
  }
}
