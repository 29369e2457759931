import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';

/** The interval being dragged out for a new mark. */
export function drawBrush(context: DrawContext, frame: Frame, from: number, to: number, theme: PlotTheme): void {
  const edge = (value: number) => Math.min(Math.max(toPx(frame.x, value), frame.left), frame.right);
  const left = edge(Math.min(from, to));
  const right = edge(Math.max(from, to));
  context.fillStyle = theme.flame;
  context.globalAlpha = 0.14;
  context.fillRect(left, frame.top, right - left, frame.bottom - frame.top);
  context.globalAlpha = 1;
  for (const x of [left, right])
    drawLine(context, crisp(x), frame.top, crisp(x), frame.bottom, { colour: theme.flame });
}
