import { useLayoutEffect, useRef } from 'react';
import type { DragPhase, StripIntent } from '../plot/interactions/strip-gesture.ts';
import type { Figure } from '../plot/save-figure.ts';
import { stripPlot } from '../plot/strip-plot.ts';
import type { StripScene } from '../plot/strip-scene.ts';
import { type MountedPlot, mountPlot } from '../plot/surface/mount-plot.ts';
import './bench-plots.css';

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
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<MountedPlot<StripScene, StripIntent>>(undefined);
  const { onFigure, emptyText, label } = props;
  const empty = props.series.time.length === 0 && !props.dropped?.time.length ? emptyText : undefined;
  useLayoutEffect(() => {
    const mounted = mountPlot(host.current!, stripPlot());
    plot.current = mounted;
    return mounted.dispose;
  }, []);
  useLayoutEffect(() => plot.current?.show(props, (intent) => tellStrip(props, intent)));
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
