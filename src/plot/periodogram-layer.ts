import type { DrawContext } from './draw-context.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';
import { visibleRange } from './visible-range.ts';

/** Lowest and highest value in each pixel column; NaN where a column holds no sample. */
export interface ColumnExtremes {
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
}

/** @param x ascending, length n; @param values length n, NaN passed over */
export function columnExtremes(x: Float64Array, values: Float64Array, frame: Frame): ColumnExtremes {
  const columns = Math.max(1, Math.round(frame.right - frame.left));
  const lowest = new Float64Array(columns).fill(Number.NaN);
  const highest = new Float64Array(columns).fill(Number.NaN);
  const { from, to } = visibleRange(x, frame.x.domain);
  for (let i = from; i < to; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    const column = Math.min(columns - 1, Math.max(0, Math.floor(toPx(frame.x, x[i]!) - frame.left)));
    if (!(lowest[column]! <= value)) lowest[column] = value;
    if (!(highest[column]! >= value)) highest[column] = value;
  }
  return { lowest, highest };
}

/** Filled from the lowest to the highest value of each column, joined to its neighbour so that no step is lost. */
export function drawPeriodogram(
  context: DrawContext,
  frame: Frame,
  periods: Float64Array,
  values: Float64Array,
  theme: PlotTheme,
): void {
  const { from, to } = visibleRange(periods, frame.x.domain);
  if (to - from < 2 * (frame.right - frame.left)) drawAsLine(context, frame, periods, values, from, to, theme);
  else drawAsColumns(context, frame, columnExtremes(periods, values, frame), theme);
}

function drawAsColumns(context: DrawContext, frame: Frame, columns: ColumnExtremes, theme: PlotTheme): void {
  const { lowest, highest } = columns;
  context.fillStyle = theme.point;
  let lastLow = Number.NaN;
  let lastHigh = Number.NaN;
  for (let column = 0; column < lowest.length; column += 1) {
    if (Number.isNaN(lowest[column]!)) continue;
    const joined = !Number.isNaN(lastLow);
    const low = joined ? Math.min(lastHigh, lowest[column]!) : lowest[column]!;
    const high = joined ? Math.max(lastLow, highest[column]!) : highest[column]!;
    const top = Math.max(frame.top, toPx(frame.y, high));
    const bottom = Math.min(frame.bottom, toPx(frame.y, low));
    // What lies wholly under the frame is not drawn over its axis.
    if (top < frame.bottom) context.fillRect(frame.left + column, top, 1, Math.max(1, bottom - top));
    lastLow = lowest[column]!;
    lastHigh = highest[column]!;
  }
}

/** Magnified so far that samples stand apart. */
function drawAsLine(
  context: DrawContext,
  frame: Frame,
  periods: Float64Array,
  values: Float64Array,
  from: number,
  to: number,
  theme: PlotTheme,
): void {
  context.save();
  context.beginPath();
  context.rect(frame.left, 0, frame.right - frame.left, frame.bottom);
  context.clip();
  context.beginPath();
  for (let i = Math.max(0, from - 1); i < Math.min(periods.length, to + 1); i += 1) {
    const x = toPx(frame.x, periods[i]!);
    const y = toPx(frame.y, values[i]!);
    if (i === Math.max(0, from - 1)) context.moveTo(x, y);
    else context.lineTo(x, y);
  }
  context.strokeStyle = theme.point;
  context.lineWidth = 1.2;
  context.lineJoin = 'round';
  context.setLineDash([]);
  context.stroke();
  context.restore();
}

/** Highest value within `reachPx` of a pixel: what a click means. @returns its index, undefined where there is none */
export function highestNear(
  frame: Frame,
  periods: Float64Array,
  values: Float64Array,
  xPx: number,
  reachPx: number,
): number | undefined {
  let best: number | undefined;
  const first = frame.x.domain[0] * Math.exp((xPx - reachPx - frame.left) / frame.x.slope);
  const last = frame.x.domain[0] * Math.exp((xPx + reachPx - frame.left) / frame.x.slope);
  const { from, to } = visibleRange(periods, [first, last]);
  for (let i = from; i < to; i += 1) {
    if (!Number.isNaN(values[i]!) && (best === undefined || values[i]! > values[best]!)) best = i;
  }
  return best;
}
