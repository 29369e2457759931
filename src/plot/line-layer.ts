import type { DrawContext } from './draw-context.ts';
import { clipped } from './draw-line.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';
import { visibleRange } from './visible-range.ts';

/** A line is never drawn over a gap of this many times the usual spacing: nothing was measured there. */
const GAP_SPACINGS = 8;

/** A trend through its samples, broken at gaps and at NaN, at most a few vertices to a pixel. */
export function drawTrend(
  context: DrawContext,
  frame: Frame,
  time: Float64Array,
  trend: Float64Array,
  theme: PlotTheme,
): void {
  const { from, to } = visibleRange(time, frame.x.domain);
  const first = Math.max(0, from - 1);
  const last = Math.min(time.length, to + 1);
  const gap = GAP_SPACINGS * usualSpacing(time);
  const stride = Math.max(1, Math.floor((last - first) / (4 * (frame.right - frame.left))));
  clipped(context, frame, () => {
    context.beginPath();
    traceBroken(context, frame, time, trend, first, last, stride, gap);
    context.strokeStyle = theme.trend;
    context.lineWidth = 1.4;
    context.lineJoin = 'round';
    context.setLineDash([]);
    context.stroke();
  });
}

function traceBroken(
  context: DrawContext,
  frame: Frame,
  time: Float64Array,
  values: Float64Array,
  first: number,
  last: number,
  stride: number,
  gap: number,
): void {
  let drawn = first;
  let down = false;
  for (let i = first; i < last; i += 1) {
    const broken = i === first || time[i]! - time[i - 1]! > gap || Number.isNaN(values[i]!);
    const ends = i + 1 === last || time[i + 1]! - time[i]! > gap;
    if (broken) down = false;
    if (Number.isNaN(values[i]!) || (down && !ends && i - drawn < stride)) continue;
    const x = toPx(frame.x, time[i]!);
    const y = toPx(frame.y, values[i]!);
    if (down) context.lineTo(x, y);
    else context.moveTo(x, y);
    down = true;
    drawn = i;
  }
}

/** Median of at most a thousand spacings taken evenly over the series. @param time ascending */
function usualSpacing(time: Float64Array): number {
  const stride = Math.max(1, Math.floor(time.length / 1000));
  const spacings: number[] = [];
  for (let i = stride; i < time.length; i += stride) spacings.push(time[i]! - time[i - 1]!);
  spacings.sort((a, b) => a - b);
  return spacings[spacings.length >> 1] ?? Number.POSITIVE_INFINITY;
}
