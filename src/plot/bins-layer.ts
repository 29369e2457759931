import type { Bins } from './bin-points.ts';
import type { DrawContext } from './draw-context.ts';
import { drawLine } from './draw-line.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';

export interface BinLook {
  readonly radiusPx: number;
  /** Rim of the plot surface, so that a disc stands off the points behind it. */
  readonly rimPx: number;
  readonly barColour?: string;
}

export const LARGE_BINS: BinLook = { radiusPx: 2.9, rimPx: 1.5 };
export const SMALL_BINS: BinLook = { radiusPx: 1.7, rimPx: 0 };

/**
 * Discs with error bars without caps. @param valueAt what is drawn at a bin: its mean, or what a model leaves of it
 */
export function drawBins(
  context: DrawContext,
  frame: Frame,
  bins: Bins,
  theme: PlotTheme,
  look: BinLook,
  valueAt: (index: number) => number = (index) => bins.mean[index]!,
): void {
  for (let i = 0; i < bins.count; i += 1) {
    if (bins.points[i]! === 0) continue;
    const value = valueAt(i);
    const x = toPx(frame.x, bins.centre[i]!);
    const y = toPx(frame.y, value);
    if (!(y > frame.top - 1 && y < frame.bottom + 1)) continue;
    drawErrorBar(context, frame, x, value, bins.error[i]!, look.barColour ?? theme.bin);
    drawDisc(context, x, y, theme, look);
  }
}

function drawErrorBar(
  context: DrawContext,
  frame: Frame,
  x: number,
  value: number,
  error: number,
  colour: string,
): void {
  if (!Number.isFinite(error)) return;
  const top = Math.max(frame.top, toPx(frame.y, value + error));
  const bottom = Math.min(frame.bottom, toPx(frame.y, value - error));
  drawLine(context, x, top, x, bottom, { colour, width: 1.2 });
}

function drawDisc(context: DrawContext, x: number, y: number, theme: PlotTheme, look: BinLook): void {
  context.beginPath();
  context.arc(x, y, look.radiusPx, 0, 2 * Math.PI);
  context.fillStyle = theme.bin;
  context.fill();
  if (look.rimPx === 0) return;
  context.strokeStyle = theme.plot;
  context.lineWidth = look.rimPx;
  context.setLineDash([]);
  context.stroke();
}
