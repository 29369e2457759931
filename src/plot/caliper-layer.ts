import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import { drawHaloText, drawText, uiFont } from './draw-text.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';

/** Where the duration caliper's bar lies, over the plot area. */
export const CALIPER_Y_PX = 14;

/** Duration above the event: a bar, two feet dotted down to the axis, the value between them or beside. */
export function drawDurationCaliper(
  context: DrawContext,
  frame: Frame,
  theme: PlotTheme,
  colour: string,
  halfWidth: number,
  label: string,
): void {
  const left = toPx(frame.x, -halfWidth);
  const right = toPx(frame.x, halfWidth);
  for (const x of [left, right]) {
    if (x < frame.left || x > frame.right) continue;
    drawLine(context, crisp(x), CALIPER_Y_PX, crisp(x), frame.bottom, { colour, dash: [1, 3] });
    drawLine(context, crisp(x), CALIPER_Y_PX - 4, crisp(x), CALIPER_Y_PX + 5, { colour });
  }
  const y = CALIPER_Y_PX + 0.5;
  drawLine(context, Math.max(left, frame.left), y, Math.min(right, frame.right), y, { colour });
  drawCaliperLabel(context, frame, theme, label, left, right);
}

function drawCaliperLabel(
  context: DrawContext,
  frame: Frame,
  theme: PlotTheme,
  label: string,
  left: number,
  right: number,
): void {
  const look = { colour: theme.ink, font: uiFont(theme, 12, 500) };
  context.font = look.font;
  const width = context.measureText(label).width;
  const middle = (Math.max(left, frame.left) + Math.min(right, frame.right)) / 2;
  if (right - left < width + 24) {
    const beside = right + 8 + width < frame.right ? right + 8 : left - 8 - width;
    drawHaloText(context, theme, label, Math.max(beside, frame.left + 4), CALIPER_Y_PX, look);
    return;
  }
  context.fillStyle = theme.plot;
  context.fillRect(middle - width / 2 - 6, CALIPER_Y_PX - 8, width + 12, 16);
  drawText(context, label, middle, CALIPER_Y_PX, { ...look, align: 'center' });
}

/** Depth beside the event, right of it where there is room for the words, else left. */
export function drawDepthCaliper(
  context: DrawContext,
  frame: Frame,
  theme: PlotTheme,
  colour: string,
  halfWidth: number,
  depth: number,
  label: string,
): void {
  const top = crisp(toPx(frame.y, 0));
  const bottom = crisp(toPx(frame.y, -depth));
  const look = { colour: theme.ink, font: uiFont(theme, 12, 500) };
  context.font = look.font;
  const room = context.measureText(label).width + 36;
  const toRight = toPx(frame.x, halfWidth) + room < frame.right;
  const x = toRight ? toPx(frame.x, halfWidth) + 20 : toPx(frame.x, -halfWidth) - 20;
  if (x < frame.left + 4 || Math.abs(bottom - top) < 6) return;
  drawLine(context, crisp(x), top, crisp(x), bottom, { colour });
  drawLine(context, x - 4, top, x + 5, top, { colour });
  drawLine(context, toPx(frame.x, 0), bottom, x, bottom, { colour, dash: [1, 3] });
  drawLine(context, x - 4, bottom, x + 5, bottom, { colour });
  const y = top + (bottom - top) * 0.62;
  drawHaloText(context, theme, label, toRight ? x + 9 : x - 9, y, { ...look, align: toRight ? 'left' : 'right' });
}
