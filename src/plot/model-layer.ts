import type { CaseLook } from './case-shape.ts';
import type { DrawContext } from './draw-context.ts';
import { clipped } from './draw-line.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';

/** A model as a line through its vertices; steps are two vertices at one x. */
export interface ModelCurve {
  readonly x: readonly number[] | Float64Array;
  readonly y: readonly number[] | Float64Array;
}

/** A two-level box over the whole width of the plot. @param halfWidth in the plot's x unit, as are first and last */
export function boxCurve(first: number, last: number, halfWidth: number, depth: number): ModelCurve {
  return {
    x: [first, -halfWidth, -halfWidth, halfWidth, halfWidth, last],
    y: [0, 0, -depth, -depth, 0, 0],
  };
}

/** Value of a curve at x by straight lines, 0 outside its reach. @param curve x ascending */
export function curveAt(curve: ModelCurve, x: number): number {
  const { x: xs, y: ys } = curve;
  let low = 0;
  let high = xs.length - 1;
  if (high < 0 || x < xs[0]! || x > xs[high]!) return 0;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (xs[middle]! <= x) low = middle;
    else high = middle;
  }
  const width = xs[high]! - xs[low]!;
  return width > 0 ? ys[low]! + ((x - xs[low]!) / width) * (ys[high]! - ys[low]!) : ys[high]!;
}

/** 2 px in the colour and dash of the case over a casing of the plot surface. */
export function drawModel(
  context: DrawContext,
  frame: Frame,
  curve: ModelCurve,
  look: CaseLook,
  theme: PlotTheme,
): void {
  clipped(context, frame, () => {
    context.beginPath();
    for (let i = 0; i < curve.x.length; i += 1) {
      const x = toPx(frame.x, curve.x[i]!);
      const y = toPx(frame.y, curve.y[i]!);
      if (i === 0) context.moveTo(x, y);
      else context.lineTo(x, y);
    }
    context.lineJoin = 'miter';
    context.setLineDash([]);
    context.strokeStyle = theme.plot;
    context.lineWidth = 5;
    context.stroke();
    context.strokeStyle = look.colour;
    context.lineWidth = 2;
    context.setLineDash([...look.dash]);
    context.stroke();
    context.setLineDash([]);
  });
}
