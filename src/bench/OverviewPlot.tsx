import { overviewPlot } from '../plot/overview-plot.ts';
import type { OverviewScene } from '../plot/overview-scene.ts';
import { PlotHost } from './PlotHost.tsx';

export interface OverviewPlotProps extends OverviewScene {
  readonly onView: (view: readonly [number, number]) => void;
}

export function OverviewPlot(props: OverviewPlotProps) {
  return <PlotHost makeSpec={overviewPlot} scene={props} onIntent={(intent) => props.onView(intent.view)} />;
}
