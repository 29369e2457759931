import { drawCursor } from './cursor-layer.ts';
import { makeDensityGrid } from './density-grid.ts';
import { drawFold, type FoldScratch, foldFrame } from './draw-fold.ts';
import type { FoldScene } from './fold-scene.ts';
import { makeFoldWork } from './fold-work.ts';
import type { Frame } from './frame.ts';
import {
  ephemerisShown,
  type FoldGesture,
  type FoldIntent,
  foldPointerStyle,
  IDLE_FOLD,
  stepFold,
} from './interactions/fold-gesture.ts';
import { toPx } from './scale.ts';
import type { PlotSpec } from './surface/mount-plot.ts';

/** How near a point must be for the pointer to mean it. */
const REACH_PX = 8;

/** A fold with arrays of its own; one for each mounted plot. */
export function foldPlot(): PlotSpec<FoldScene, FoldGesture, FoldIntent> {
  const scratch: FoldScratch = { work: makeFoldWork(), grid: makeDensityGrid() };
  return {
    idle: IDLE_FOLD,
    baseKey: (scene, gesture) => {
      const { periodDays, epochDays, durationDays } = ephemerisShown(gesture, scene);
      const { time, flux, mode, halfWidthHours, binMinutes, boxDepthPpm, curve, residuals, caseNumber } = scene;
      const words = [scene.depthLabel, scene.durationLabel, scene.yTitle, scene.xTitle];
      const model = [boxDepthPpm, curve, residuals, caseNumber];
      return [
        time,
        flux,
        mode,
        halfWidthHours,
        binMinutes,
        periodDays,
        epochDays,
        durationDays,
        gesture.drag?.yDomain,
        ...model,
        ...words,
      ];
    },
    frame: (scene, gesture, size) =>
      foldFrame(scene, ephemerisShown(gesture, scene), size, scratch, gesture.drag?.yDomain),
    drawBase: (context, frame, scene, gesture, theme) =>
      drawFold(context, frame, scene, ephemerisShown(gesture, scene), theme, scratch),
    drawOverlay: (context, frame, scene, gesture, theme) => {
      const linked = scene.cursorHours === undefined ? undefined : { x: scene.cursorHours, fluxPpm: undefined };
      const cursor = gesture.drag?.started ? undefined : (gesture.cursor ?? linked);
      if (cursor) drawCursor(context, frame, theme, cursor.x, cursor.fluxPpm, Math.max(frame.top, 8));
    },
    step: (gesture, input, frame, scene) =>
      stepFold(gesture, input, frame, scene, (xPx, yPx) => foldedPointNear(scratch, scene, frame, xPx, yPx)),
    pointerStyle: foldPointerStyle,
  };
}

function foldedPointNear(scratch: FoldScratch, scene: FoldScene, frame: Frame, xPx: number, yPx: number) {
  const { x } = scratch.work;
  const { flux } = scene;
  let best = -1;
  let bestDistance = REACH_PX * REACH_PX;
  for (let i = 0; i < x.length; i += 1) {
    const dx = toPx(frame.x, x[i]!) - xPx;
    if (!(dx > -REACH_PX && dx < REACH_PX)) continue;
    const dy = toPx(frame.y, flux[i]!) - yPx;
    const distance = dx * dx + dy * dy;
    if (distance < bestDistance) [best, bestDistance] = [i, distance];
  }
  return best < 0 ? undefined : { x: x[best]!, fluxPpm: flux[best]! };
}
