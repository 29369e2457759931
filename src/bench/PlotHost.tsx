import { useLayoutEffect, useRef } from 'react';
import type { Figure } from '../plot/save-figure.ts';
import { type MountedPlot, mountPlot, type PlotSpec, type SceneBasis } from '../plot/surface/mount-plot.ts';
import './bench-plots.css';

/** Where a plot lives: mounts it once, shows it each new scene, and says in words what it shows. */
export function PlotHost<Scene extends SceneBasis, Gesture, Intent>(props: {
  readonly makeSpec: () => PlotSpec<Scene, Gesture, Intent>;
  readonly scene: Scene;
  readonly onIntent: (intent: Intent) => void;
  /** Hands out what saves the plot as SVG and PNG. */
  readonly onFigure?: ((figure: Figure) => void) | undefined;
  /** Said in place of data while there are none. */
  readonly emptyText?: string | undefined;
}) {
  const { makeSpec, scene, onIntent, onFigure, emptyText } = props;
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<MountedPlot<Scene, Intent>>(undefined);
  useLayoutEffect(() => {
    const mounted = mountPlot(host.current!, makeSpec());
    plot.current = mounted;
    return mounted.dispose;
  }, [makeSpec]);
  useLayoutEffect(() => plot.current?.show(scene, onIntent));
  useLayoutEffect(() => {
    if (plot.current) onFigure?.(plot.current.figure);
  }, [onFigure]);
  const label = emptyText ? `${scene.label} ${emptyText}` : scene.label;
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a plot is read and worked by keys
    <div ref={host} className="plot" role="img" tabIndex={0} aria-label={label}>
      {emptyText && <p className="plot-empty">{emptyText}</p>}
    </div>
  );
}
