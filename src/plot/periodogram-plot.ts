import { drawCursor } from './cursor-layer.ts';
import {
  IDLE_PERIODOGRAM,
  type PeriodogramGesture,
  type PeriodogramIntent,
  periodView,
  stepPeriodogram,
} from './interactions/periodogram-gesture.ts';
import { drawPeaks, drawPeriodogramBase, type PeriodogramScene, periodogramFrame } from './periodogram-scene.ts';
import type { PlotSpec } from './surface/mount-plot.ts';

export function periodogramPlot(): PlotSpec<PeriodogramScene, PeriodogramGesture, PeriodogramIntent> {
  return {
    idle: IDLE_PERIODOGRAM,
    baseKey: (scene, gesture) => {
      const [first, last] = periodView(gesture, scene);
      const { periods, values, yTitle, xTitle, threshold } = scene;
      return [periods, values, first, last, yTitle, xTitle, threshold?.value, threshold?.label];
    },
    frame: (scene, gesture, size) => periodogramFrame(scene, periodView(gesture, scene), size),
    drawBase: (context, frame, scene, _gesture, theme) => drawPeriodogramBase(context, frame, scene, theme),
    drawOverlay: (context, frame, scene, gesture, theme) => {
      drawPeaks(context, frame, scene, gesture.keyPeriodDays, theme);
      const { cursor } = gesture;
      if (cursor) drawCursor(context, frame, theme, cursor.periodDays, cursor.value, frame.top);
    },
    step: stepPeriodogram,
    pointerStyle: (gesture) => (gesture.drag?.started ? 'grabbing' : 'crosshair'),
  };
}
