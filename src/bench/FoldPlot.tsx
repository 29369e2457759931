import { useLayoutEffect, useRef } from 'react';
import { foldPlot } from '../plot/fold-plot.ts';
import type { FoldScene } from '../plot/fold-scene.ts';
import type { FoldIntent } from '../plot/interactions/fold-gesture.ts';
import type { DragPhase } from '../plot/interactions/strip-gesture.ts';
import type { Figure } from '../plot/save-figure.ts';
import { type MountedPlot, mountPlot } from '../plot/surface/mount-plot.ts';
import './bench-plots.css';

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
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<MountedPlot<FoldScene, FoldIntent>>(undefined);
  const { onFigure, emptyText, label } = props;
  const empty = props.time.length === 0 ? emptyText : undefined;
  useLayoutEffect(() => {
    const mounted = mountPlot(host.current!, foldPlot());
    plot.current = mounted;
    return mounted.dispose;
  }, []);
  useLayoutEffect(() => plot.current?.show(props, (intent) => tellFold(props, intent)));
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
