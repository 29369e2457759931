import { useLayoutEffect, useRef } from 'react';
import type { OverviewIntent } from '../plot/interactions/overview-gesture.ts';
import { overviewPlot } from '../plot/overview-plot.ts';
import type { OverviewScene } from '../plot/overview-scene.ts';
import { type MountedPlot, mountPlot } from '../plot/surface/mount-plot.ts';
import './bench-plots.css';

export interface OverviewPlotProps extends OverviewScene {
  readonly onView: (view: readonly [number, number]) => void;
}

export function OverviewPlot(props: OverviewPlotProps) {
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<MountedPlot<OverviewScene, OverviewIntent>>(undefined);
  useLayoutEffect(() => {
    const mounted = mountPlot(host.current!, overviewPlot());
    plot.current = mounted;
    return mounted.dispose;
  }, []);
  useLayoutEffect(() => plot.current?.show(props, (intent) => props.onView(intent.view)));
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a plot is read and worked by keys
    <div ref={host} className="plot" role="img" tabIndex={0} aria-label={props.label} />
  );
}
