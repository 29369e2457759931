import { type DensityGrid, makeDensityGrid } from './density-grid.ts';
import { displayExtent } from './display-extent.ts';
import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import { drawText, uiFont } from './draw-text.ts';
import { type Frame, GUTTER_PX, makeFrame, RIGHT_PX } from './frame.ts';
import { drawTrend } from './line-layer.ts';
import { drawPoints } from './points-layer.ts';
import { toPx } from './scale.ts';
import type { Span } from './span.ts';
import type { SceneBasis } from './surface/mount-plot.ts';
import type { SurfaceSize } from './surface/plot-surface.ts';
import type { PlotTheme } from './theme.ts';

/** The whole series in a narrow band, with the window that the strip shows. */
export interface OverviewScene extends SceneBasis {
  readonly series: { readonly time: Float64Array; readonly values: Float64Array };
  readonly trend?: Float64Array | undefined;
  readonly view: Span;
  readonly fullSpan: Span;
  /** One word in the gutter: what is shown, as "raw". */
  readonly title: string;
}

export function overviewFrame(scene: OverviewScene, size: SurfaceSize): Frame {
  const { values } = scene.series;
  return makeFrame({
    ...size,
    margins: { left: GUTTER_PX, right: RIGHT_PX, top: 3, bottom: 3 },
    xDomain: scene.fullSpan,
    yDomain: displayExtent(values, 0, values.length),
  });
}

export function drawOverview(
  context: DrawContext,
  frame: Frame,
  scene: OverviewScene,
  theme: PlotTheme,
  grid: DensityGrid = makeDensityGrid(),
): void {
  const { time, values } = scene.series;
  const cloud = { x: time, y: values, from: 0, to: time.length, inside: time.length, outside: 'edge' } as const;
  drawPoints(context, frame, cloud, theme, grid);
  if (scene.trend) drawTrend(context, frame, time, scene.trend, theme);
  drawLine(context, crisp(frame.left), 0, crisp(frame.left), frame.heightPx, { colour: theme.axis });
  drawText(context, scene.title, frame.left - 6, frame.heightPx / 2, {
    colour: theme.tickText,
    align: 'right',
    font: uiFont(theme),
  });
}

/** The window in flame; what lies outside it goes unlit. */
export function drawWindow(context: DrawContext, frame: Frame, view: Span, theme: PlotTheme): void {
  const left = Math.max(frame.left, toPx(frame.x, view[0]));
  const right = Math.min(frame.right, Math.max(left + 3, toPx(frame.x, view[1])));
  context.fillStyle = theme.ground;
  context.globalAlpha = 0.6;
  context.fillRect(frame.left + 1, 0, left - frame.left - 1, frame.heightPx);
  context.fillRect(right, 0, frame.right - right, frame.heightPx);
  context.globalAlpha = 1;
  context.strokeStyle = theme.flame;
  context.lineWidth = 1;
  context.setLineDash([]);
  context.strokeRect(crisp(left), 0.5, Math.max(2, Math.round(right - left) - 1), frame.heightPx - 1);
}
