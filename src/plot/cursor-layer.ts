import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';

/** The flame line with a pennant, and a ring about the point it stands on where there is one. */
export function drawCursor(
  context: DrawContext,
  frame: Frame,
  theme: PlotTheme,
  x: number,
  y: number | undefined,
  top = frame.top,
): void {
  const xPx = toPx(frame.x, x);
  if (!(xPx >= frame.left - 1 && xPx <= frame.right + 1)) return;
  drawLine(context, crisp(xPx), top - 2, crisp(xPx), frame.bottom, { colour: theme.flame });
  drawPennant(context, theme, crisp(xPx), top - 3);
  if (y !== undefined && Number.isFinite(y)) drawRing(context, theme, xPx, clampY(frame, toPx(frame.y, y)), 4.5);
}

/** What is linked between plots carries a ring. */
export function drawRing(context: DrawContext, theme: PlotTheme, xPx: number, yPx: number, radiusPx: number): void {
  context.beginPath();
  context.arc(xPx, yPx, radiusPx, 0, 2 * Math.PI);
  context.strokeStyle = theme.flame;
  context.lineWidth = 1.5;
  context.setLineDash([]);
  context.stroke();
}

function drawPennant(context: DrawContext, theme: PlotTheme, x: number, y: number): void {
  context.beginPath();
  context.moveTo(x - 3.5, y - 3);
  context.lineTo(x + 3.5, y - 3);
  context.lineTo(x, y + 3);
  context.closePath();
  context.fillStyle = theme.flame;
  context.fill();
}

function clampY(frame: Frame, yPx: number): number {
  return Math.min(Math.max(yPx, frame.top), frame.bottom);
}
