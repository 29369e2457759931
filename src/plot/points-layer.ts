import { countPoints, type DensityGrid, paintDensity, resetDensityGrid } from './density-grid.ts';
import type { DrawContext } from './draw-context.ts';
import { clipped } from './draw-line.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import { type PlotTheme, packColour } from './theme.ts';

/** Above this many points to a pixel of width, squares would only make a slab. */
const DENSE_PER_PX = 3;
const SQUARE_PX = 1.5;
const ALPHA = 0.5;

export interface PointCloud {
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Looked at from this index (included) to `to` (not). */
  readonly from: number;
  readonly to: number;
  /** How many of these lie inside the plot's x span: decides between squares and density. */
  readonly inside: number;
  /** What is above or below the plot area: pressed to its edge, or left out. */
  readonly outside: 'edge' | 'hide';
}

function isDense(cloud: PointCloud, frame: Frame): boolean {
  return cloud.inside > DENSE_PER_PX * (frame.right - frame.left);
}

/** Squares where points are few, a density of log counts where they are many. The grid is scratch space. */
export function drawPoints(
  context: DrawContext,
  frame: Frame,
  cloud: PointCloud,
  theme: PlotTheme,
  grid: DensityGrid,
): void {
  if (isDense(cloud, frame)) drawDensity(context, frame, cloud, theme, grid);
  else clipped(context, frame, () => drawSquares(context, frame, cloud, theme));
}

function drawDensity(context: DrawContext, frame: Frame, cloud: PointCloud, theme: PlotTheme, grid: DensityGrid): void {
  const width = Math.max(1, Math.round(frame.right - frame.left));
  const height = Math.max(1, Math.round(frame.bottom - frame.top));
  resetDensityGrid(grid, width, height);
  countPoints(grid, cloud.x, cloud.y, cloud.from, cloud.to, frame.x, frame.y, cloud.outside);
  context.drawPixels(paintDensity(grid, theme.density, packColour(theme.point)), frame.left, frame.top);
}

function drawSquares(context: DrawContext, frame: Frame, cloud: PointCloud, theme: PlotTheme): void {
  const { x, y, from, to, outside } = cloud;
  const half = SQUARE_PX / 2;
  context.fillStyle = theme.point;
  context.globalAlpha = ALPHA;
  for (let i = from; i < to; i += 1) {
    const xPx = toPx(frame.x, x[i]!);
    const yPx = toPx(frame.y, y[i]!);
    if (!(xPx >= frame.left && xPx <= frame.right) || Number.isNaN(yPx)) continue;
    if (outside === 'hide' && (yPx < frame.top || yPx > frame.bottom)) continue;
    const inside = Math.min(Math.max(yPx, frame.top + half), frame.bottom - half);
    context.fillRect(xPx - half, inside - half, SQUARE_PX, SQUARE_PX);
  }
  context.globalAlpha = 1;
}
