import { drawBrush } from './brush-layer.ts';
import { drawCursor } from './cursor-layer.ts';
import { makeDensityGrid } from './density-grid.ts';
import {
  IDLE_STRIP,
  marksShown,
  type StripGesture,
  type StripIntent,
  stepStrip,
  stripPointerStyle,
} from './interactions/strip-gesture.ts';
import { drawMarks } from './marks-layer.ts';
import { drawStrip, type StripScene, stripFrame } from './strip-scene.ts';
import type { PlotSpec } from './surface/mount-plot.ts';
import { nearestIndex } from './visible-range.ts';

/** A strip with scratch space of its own; one for each mounted plot. */
export function stripPlot(): PlotSpec<StripScene, StripGesture, StripIntent> {
  const grid = makeDensityGrid();
  return {
    idle: IDLE_STRIP,
    baseKey: ({ series, trend, dropped, lanes, view, yTitle, timeTitle }) => [
      series.time,
      series.values,
      trend,
      dropped?.time,
      dropped?.values,
      lanes,
      view[0],
      view[1],
      yTitle,
      timeTitle,
    ],
    frame: (scene, _gesture, size) => stripFrame(scene, size),
    drawBase: (context, frame, scene, _gesture, theme) => drawStrip(context, frame, scene, theme, grid),
    drawOverlay: (context, frame, scene, gesture, theme) => {
      drawMarks(context, frame, marksShown(gesture, scene), theme);
      if (gesture.drag?.kind === 'brush') drawBrush(context, frame, gesture.drag.from, gesture.drag.to, theme);
      const cursor = gesture.cursor ?? linkedCursor(scene);
      if (cursor) drawCursor(context, frame, theme, cursor.time, cursor.value, Math.max(frame.top, 8));
    },
    step: stepStrip,
    pointerStyle: stripPointerStyle,
  };
}

/** The cursor that another plot moved, on its measured point where it names one. */
function linkedCursor(scene: StripScene): { time: number; value: number | undefined } | undefined {
  const { cursorTime: time, series } = scene;
  if (time === undefined || series.time.length === 0) return undefined;
  const index = nearestIndex(series.time, time);
  return { time, value: index !== undefined && series.time[index] === time ? series.values[index] : undefined };
}
