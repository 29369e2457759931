import { drawGrid, drawLeftAxis, drawMarginScale, timeTicks, yTicks } from './axis.ts';
import { type DensityGrid, makeDensityGrid } from './density-grid.ts';
import { displayExtent } from './display-extent.ts';
import type { DrawContext } from './draw-context.ts';
import { drawTitle } from './draw-text.ts';
import { drawLanes, type Lane, lanesHeight } from './events-layer.ts';
import { drawFlagged } from './flagged-layer.ts';
import { type Frame, GUTTER_PX, makeFrame, RIGHT_PX } from './frame.ts';
import { drawTrend } from './line-layer.ts';
import type { PlotMark } from './marks-layer.ts';
import { drawPoints } from './points-layer.ts';
import type { Span } from './span.ts';
import type { SceneBasis } from './surface/mount-plot.ts';
import type { SurfaceSize } from './surface/plot-surface.ts';
import type { PlotTheme } from './theme.ts';
import { visibleRange } from './visible-range.ts';

/** Flux against time. `values` in the unit that `yTitle` names. */
export interface StripScene extends SceneBasis {
  readonly series: { readonly time: Float64Array; readonly values: Float64Array };
  readonly yTitle: string;
  /** "BJD_TDB − 2 459 000 / d": printed under the axis where the plot is tall enough, always in a saved figure. */
  readonly timeTitle?: string | undefined;
  /** Aligned to `series.time`, same unit as the values. */
  readonly trend?: Float64Array | undefined;
  /** Points that preparation left out. */
  readonly dropped?: { readonly time: Float64Array; readonly values: Float64Array } | undefined;
  readonly marks: readonly PlotMark[];
  readonly lanes: readonly Lane[];
  readonly view: Span;
  readonly fullSpan: Span;
  readonly cursorTime?: number | undefined;
  readonly tool: 'pan' | 'mark';
}

const TALL_PX = 230;

export function stripFrame(scene: StripScene, size: SurfaceSize): Frame {
  const { series, view, dropped } = scene;
  const { from, to } = visibleRange(series.time, view);
  const titled = scene.timeTitle !== undefined && size.heightPx >= TALL_PX;
  const shown = from < to || !dropped ? series : dropped;
  const range = shown === series ? { from, to } : visibleRange(shown.time, view);
  return makeFrame({
    ...size,
    margins: { left: GUTTER_PX, right: RIGHT_PX, top: lanesHeight(scene.lanes.length), bottom: titled ? 38 : 22 },
    xDomain: view,
    yDomain: displayExtent(shown.values, range.from, range.to),
  });
}

/** Everything but marks, brush and cursor. @param grid scratch space of this plot */
export function drawStrip(
  context: DrawContext,
  frame: Frame,
  scene: StripScene,
  theme: PlotTheme,
  grid: DensityGrid = makeDensityGrid(),
): void {
  const { series, dropped, trend } = scene;
  const ticks = yTicks(frame, series.time.length === 0 && !dropped?.time.length);
  drawGrid(context, frame, ticks, theme);
  drawLanes(context, frame, scene.lanes, theme);
  const { from, to } = visibleRange(series.time, frame.x.domain);
  const cloud = { x: series.time, y: series.values, from, to, inside: to - from, outside: 'edge' } as const;
  drawPoints(context, frame, cloud, theme, grid);
  if (dropped) drawFlagged(context, frame, dropped.time, dropped.values, theme);
  if (trend) drawTrend(context, frame, series.time, trend, theme);
  drawLeftAxis(context, frame, ticks, theme, scene.yTitle);
  drawMarginScale(context, frame, timeTicks(frame), theme);
  if (scene.timeTitle !== undefined && frame.heightPx - frame.bottom > 30) {
    drawTitle(context, theme, scene.timeTitle, (frame.left + frame.right) / 2, frame.heightPx - 9);
  }
}
