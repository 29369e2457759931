import type { DrawContext } from './draw-context.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';
import { visibleRange } from './visible-range.ts';

/** Points that preparation left out: a cross of 4 px each, at the edge where their value is off the scale. */
export function drawFlagged(
  context: DrawContext,
  frame: Frame,
  time: Float64Array,
  values: Float64Array,
  theme: PlotTheme,
): void {
  const { from, to } = visibleRange(time, frame.x.domain);
  context.strokeStyle = theme.flagged;
  context.lineWidth = 1;
  context.setLineDash([]);
  context.beginPath();
  for (let i = from; i < to; i += 1) {
    if (Number.isNaN(values[i]!)) continue;
    const x = toPx(frame.x, time[i]!);
    const y = Math.min(Math.max(toPx(frame.y, values[i]!), frame.top + 2), frame.bottom - 2);
    context.moveTo(x - 2, y - 2);
    context.lineTo(x + 2, y + 2);
    context.moveTo(x + 2, y - 2);
    context.lineTo(x - 2, y + 2);
  }
  context.stroke();
}
