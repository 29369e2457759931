import { makeDensityGrid } from './density-grid.ts';
import {
  IDLE_OVERVIEW,
  type OverviewGesture,
  type OverviewIntent,
  overviewPointerStyle,
  stepOverview,
} from './interactions/overview-gesture.ts';
import { drawOverview, drawWindow, type OverviewScene, overviewFrame } from './overview-scene.ts';
import type { PlotSpec } from './surface/mount-plot.ts';

/** An overview with scratch space of its own; one for each mounted plot. */
export function overviewPlot(): PlotSpec<OverviewScene, OverviewGesture, OverviewIntent> {
  const grid = makeDensityGrid();
  return {
    idle: IDLE_OVERVIEW,
    baseKey: ({ series, trend, fullSpan, title }) => [
      series.time,
      series.values,
      trend,
      fullSpan[0],
      fullSpan[1],
      title,
    ],
    frame: (scene, _gesture, size) => overviewFrame(scene, size),
    drawBase: (context, frame, scene, _gesture, theme) => drawOverview(context, frame, scene, theme, grid),
    drawOverlay: (context, frame, scene, _gesture, theme) => drawWindow(context, frame, scene.view, theme),
    step: stepOverview,
    pointerStyle: (gesture, xPx, _yPx, frame, scene) => overviewPointerStyle(gesture, xPx, frame, scene),
  };
}
