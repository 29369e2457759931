import type { DragPhase, StripIntent } from '../plot/interactions/strip-gesture.ts';
import type { Figure } from '../plot/save-figure.ts';
import { stripPlot } from '../plot/strip-plot.ts';
import type { StripScene } from '../plot/strip-scene.ts';
import { PlotHost } from './PlotHost.tsx';

export interface StripPlotProps extends StripScene {
  readonly onView: (view: readonly [number, number]) => void;
  readonly onCursor?: ((time: number | undefined, value: number | undefined) => void) | undefined;
  readonly onBrush?: ((start: number, end: number) => void) | undefined;
  readonly onBrushPreview?: ((start: number, end: number) => void) | undefined;
  readonly onMarkClick?: ((id: string) => void) | undefined;
  readonly onMarkDrag?: ((id: string, start: number, end: number, phase: DragPhase) => void) | undefined;
  readonly onEventClick?: ((caseNumber: number | undefined, cycle: number) => void) | undefined;
  /** Hands out what saves the plot as SVG and PNG. */
  readonly onFigure?: ((figure: Figure) => void) | undefined;
  /** Said in place of data while there are none. */
  readonly emptyText?: string | undefined;
}

export function StripPlot(props: StripPlotProps) {
  return (
    <PlotHost
      makeSpec={stripPlot}
      scene={props}
      onIntent={(intent) => tellStrip(props, intent)}
      onFigure={props.onFigure}
      emptyText={props.series.time.length === 0 && !props.dropped?.time.length ? props.emptyText : undefined}
    />
  );
}

function tellStrip(props: StripPlotProps, intent: StripIntent): void {
  switch (intent.kind) {
    case 'view':
      props.onView(intent.view);
      return;
    case 'cursor':
      props.onCursor?.(intent.time, intent.value);
      return;
    case 'brush':
      props.onBrush?.(intent.start, intent.end);
      return;
    case 'brush preview':
      props.onBrushPreview?.(intent.start, intent.end);
      return;
    case 'mark click':
      props.onMarkClick?.(intent.id);
      return;
    case 'mark drag':
      props.onMarkDrag?.(intent.id, intent.start, intent.end, intent.phase);
      return;
    case 'event click':
      props.onEventClick?.(intent.caseNumber, intent.cycle);
      return;
  }
}
