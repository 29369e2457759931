import type { DrawContext } from './draw-context.ts';
import type { PlotTheme } from './theme.ts';

type CaseShape = 'circle' | 'square' | 'triangle up' | 'diamond' | 'triangle down' | 'hexagon' | 'plus' | 'star';

/** What tells a case apart without its colour: its shape, the dash of its model line, hollow from the ninth on. */
export interface CaseLook {
  readonly shape: CaseShape;
  readonly dash: readonly number[];
  readonly colour: string;
  readonly hollow: boolean;
}

const SHAPES: readonly CaseShape[] = [
  'circle',
  'square',
  'triangle up',
  'diamond',
  'triangle down',
  'hexagon',
  'plus',
  'star',
];

const DASHES: readonly (readonly number[])[] = [
  [],
  [7, 3],
  [2, 2.5],
  [10, 3, 2, 3],
  [4, 2],
  [12, 4],
  [2, 4],
  [7, 2, 2, 2, 2, 2],
];

/** @param caseNumber from 1; undefined for a trial that is no case yet: a grey hollow circle */
export function caseLook(caseNumber: number | undefined, theme: PlotTheme): CaseLook {
  if (caseNumber === undefined) return { shape: 'circle', dash: [], colour: theme.ink2, hollow: true };
  const index = (Math.max(1, Math.round(caseNumber)) - 1) % SHAPES.length;
  return {
    shape: SHAPES[index]!,
    dash: DASHES[index]!,
    colour: theme.cases[index] ?? theme.ink2,
    hollow: caseNumber > SHAPES.length,
  };
}

/** Traces the outline of a shape of about `radiusPx`; the caller fills and strokes it. */
function traceShape(context: DrawContext, shape: CaseShape, x: number, y: number, radiusPx: number): void {
  context.beginPath();
  switch (shape) {
    case 'circle':
      context.arc(x, y, radiusPx, 0, 2 * Math.PI);
      return;
    case 'square':
      context.rect(x - radiusPx * 0.9, y - radiusPx * 0.9, radiusPx * 1.8, radiusPx * 1.8);
      return;
    case 'triangle up':
      tracePolygon(context, 3, -Math.PI / 2, x, y, radiusPx * 1.15);
      return;
    case 'diamond':
      tracePolygon(context, 4, 0, x, y, radiusPx * 1.15);
      return;
    case 'triangle down':
      tracePolygon(context, 3, Math.PI / 2, x, y, radiusPx * 1.15);
      return;
    case 'hexagon':
      tracePolygon(context, 6, 0, x, y, radiusPx * 1.15);
      return;
    case 'plus':
      tracePlus(context, x, y, radiusPx);
      return;
    case 'star':
      traceStar(context, x, y, radiusPx);
      return;
  }
}

/** A case's shape: filled, or hollow with the plot surface inside. */
export function drawCaseShape(
  context: DrawContext,
  theme: PlotTheme,
  look: CaseLook,
  x: number,
  y: number,
  radiusPx: number,
  hollow = false,
): void {
  context.setLineDash([]);
  traceShape(context, look.shape, x, y, radiusPx);
  context.fillStyle = hollow || look.hollow ? theme.plot : look.colour;
  context.fill();
  context.strokeStyle = look.colour;
  context.lineWidth = 1.5;
  context.stroke();
}

function tracePolygon(
  context: DrawContext,
  corners: number,
  start: number,
  x: number,
  y: number,
  radius: number,
): void {
  for (let i = 0; i < corners; i += 1) {
    const angle = start + (i * 2 * Math.PI) / corners;
    toCorner(context, i, x + radius * Math.cos(angle), y + radius * Math.sin(angle));
  }
  context.closePath();
}

function tracePlus(context: DrawContext, x: number, y: number, radius: number): void {
  context.moveTo(x - radius, y);
  context.lineTo(x + radius, y);
  context.moveTo(x, y - radius);
  context.lineTo(x, y + radius);
}

function traceStar(context: DrawContext, x: number, y: number, radius: number): void {
  for (let i = 0; i < 10; i += 1) {
    const angle = -Math.PI / 2 + (i * Math.PI) / 5;
    const reach = i % 2 === 1 ? radius * 0.5 : radius * 1.2;
    toCorner(context, i, x + reach * Math.cos(angle), y + reach * Math.sin(angle));
  }
  context.closePath();
}

function toCorner(context: DrawContext, i: number, x: number, y: number): void {
  if (i === 0) context.moveTo(x, y);
  else context.lineTo(x, y);
}
