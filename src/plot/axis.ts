import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import { drawText, drawUprightTitle, uiFont } from './draw-text.ts';
import type { Frame } from './frame.ts';
import { numberLabel } from './number-label.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';
import { linearTicks, shortestDecimals, type Ticks } from './ticks.ts';

const TITLE_X_PX = 11;

/** Up to seven y ticks, 18 px apart at least; none while there are no data, as no number would be true. */
export function yTicks(frame: Frame, empty = false): Ticks {
  if (empty) return { major: [], minor: [], segments: [], decimals: 0 };
  return linearTicks(frame.y.domain, Math.min(7, Math.max(2, Math.floor((frame.bottom - frame.top) / 18))));
}

export function timeTicks(frame: Frame): Ticks {
  const width = frame.right - frame.left;
  const rough = linearTicks(frame.x.domain, Math.max(2, Math.floor(width / 55)));
  const longest = Math.max(...rough.major.map((value) => numberLabel(value, rough.decimals).length), 1);
  return linearTicks(frame.x.domain, Math.max(2, Math.floor(width / Math.max(48, longest * 6 + 14))));
}

/** Horizontal grid, the zero line stronger. Drawn before the data. */
export function drawGrid(context: DrawContext, frame: Frame, ticks: Ticks, theme: PlotTheme): void {
  for (const value of ticks.major) {
    const y = crisp(toPx(frame.y, value));
    drawLine(context, frame.left, y, frame.right, y, { colour: value === 0 ? theme.line2 : theme.grid });
  }
}

/** The left axis line from `lineTop` down, inward ticks, labels and the upright title. */
export function drawLeftAxis(
  context: DrawContext,
  frame: Frame,
  ticks: Ticks,
  theme: PlotTheme,
  title: string,
  lineTop = 0,
): void {
  for (const value of ticks.major) {
    const y = crisp(toPx(frame.y, value));
    drawLine(context, frame.left, y, frame.left + 5, y, { colour: theme.axis });
    drawText(context, numberLabel(value, ticks.decimals), frame.left - 6, y, {
      colour: theme.tickText,
      align: 'right',
      font: uiFont(theme),
    });
  }
  drawLine(context, crisp(frame.left), lineTop, crisp(frame.left), frame.bottom, { colour: theme.axis });
  drawUprightTitle(context, theme, title, TITLE_X_PX, (frame.top + frame.bottom) / 2);
}

/** The bottom axis as on a map's margin: segments between major ticks filled and open in turn, ticks inward. */
export function drawMarginScale(context: DrawContext, frame: Frame, ticks: Ticks, theme: PlotTheme): void {
  drawSegments(context, frame, ticks, theme);
  for (const value of ticks.minor) drawTick(context, frame, value, 2.5, theme);
  for (const value of ticks.major) drawTick(context, frame, value, 5, theme);
  drawTickLabels(context, frame, ticks, theme);
}

function drawSegments(context: DrawContext, frame: Frame, ticks: Ticks, theme: PlotTheme): void {
  for (const { from, to, filled } of ticks.segments) {
    const left = Math.max(frame.left, toPx(frame.x, from));
    const right = Math.min(frame.right, toPx(frame.x, to));
    if (right <= left) continue;
    context.fillStyle = filled ? theme.axis : theme.plot;
    context.fillRect(left, frame.bottom, right - left, 3);
  }
  context.strokeStyle = theme.axis;
  context.lineWidth = 1;
  context.setLineDash([]);
  context.strokeRect(crisp(frame.left), frame.bottom + 0.5, Math.round(frame.right - frame.left) - 1, 3);
}

function drawTick(context: DrawContext, frame: Frame, value: number, lengthPx: number, theme: PlotTheme): void {
  const x = crisp(toPx(frame.x, value));
  if (x < frame.left || x > frame.right + 1) return;
  drawLine(context, x, frame.bottom, x, frame.bottom - lengthPx, { colour: theme.axis });
}

function drawTickLabels(context: DrawContext, frame: Frame, ticks: Ticks, theme: PlotTheme): void {
  const font = uiFont(theme);
  context.font = font;
  let usedTo = Number.NEGATIVE_INFINITY;
  for (const value of ticks.major) {
    const label = numberLabel(
      value,
      frame.x.kind === 'log' ? Math.max(ticks.decimals, shortestDecimals(value)) : ticks.decimals,
    );
    const half = context.measureText(label).width / 2;
    const x = Math.min(toPx(frame.x, value), frame.widthPx - half - 2);
    if (x - half < usedTo + 6) continue;
    drawText(context, label, x, frame.bottom + 12, { colour: theme.tickText, align: 'center', font });
    usedTo = x + half;
  }
}
