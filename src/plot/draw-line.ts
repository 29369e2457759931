import type { DrawContext } from './draw-context.ts';

export interface LineLook {
  readonly colour: string;
  readonly width?: number;
  readonly dash?: readonly number[];
}

const SOLID: readonly number[] = [];

export function drawLine(context: DrawContext, x0: number, y0: number, x1: number, y1: number, look: LineLook): void {
  context.strokeStyle = look.colour;
  context.lineWidth = look.width ?? 1;
  context.setLineDash([...(look.dash ?? SOLID)]);
  context.beginPath();
  context.moveTo(x0, y0);
  context.lineTo(x1, y1);
  context.stroke();
  context.setLineDash([]);
}

/** The middle of a device-independent pixel, where a line of 1 px is sharp. */
export function crisp(px: number): number {
  return Math.round(px) + 0.5;
}

/** Draws `draw` cut to a rectangle. */
export function clipped(
  context: DrawContext,
  box: { readonly left: number; readonly top: number; readonly right: number; readonly bottom: number },
  draw: () => void,
): void {
  context.save();
  context.beginPath();
  context.rect(box.left, box.top, box.right - box.left, box.bottom - box.top);
  context.clip();
  draw();
  context.restore();
}
