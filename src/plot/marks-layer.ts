import type { DrawContext } from './draw-context.ts';
import { clipped, crisp, drawLine } from './draw-line.ts';
import { drawHaloText, uiFont } from './draw-text.ts';
import type { Frame } from './frame.ts';
import { toPx } from './scale.ts';
import type { MarkLook, PlotTheme } from './theme.ts';

export interface PlotMark {
  readonly id: string;
  readonly kind: MarkLook;
  /** Days. */
  readonly start: number;
  readonly end: number;
  readonly selected: boolean;
}

interface Band {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** Full-height bands with the hatch of their kind; the kind stands in words beside the top where there is room. */
export function drawMarks(context: DrawContext, frame: Frame, marks: readonly PlotMark[], theme: PlotTheme): void {
  const seen = marks.filter((mark) => mark.end >= frame.x.domain[0] && mark.start <= frame.x.domain[1]);
  for (const mark of seen) drawBand(context, frame, mark, theme);
  const words = [...seen].sort((a, b) => Number(b.selected) - Number(a.selected) || a.start - b.start);
  const used: Band[] = [];
  for (const mark of words) drawKind(context, frame, mark, theme, used);
}

/** The pixels that a mark covers, two wide at least so that a short one can be seen and grasped. */
export function markBand(frame: Frame, mark: Pick<PlotMark, 'start' | 'end'>): Band {
  const left = toPx(frame.x, mark.start);
  const right = Math.max(left + 2, toPx(frame.x, mark.end));
  return {
    left: Math.max(left, frame.left),
    right: Math.min(right, frame.right),
    top: frame.top,
    bottom: frame.bottom,
  };
}

function drawBand(context: DrawContext, frame: Frame, mark: PlotMark, theme: PlotTheme): void {
  const band = markBand(frame, mark);
  const colour = theme.mark[mark.kind];
  clipped(context, band, () => {
    context.globalAlpha = 0.5;
    drawHatch(context, band, mark.kind, colour);
    context.globalAlpha = 1;
  });
  if (mark.kind === 'dip') {
    context.fillStyle = colour;
    context.fillRect(band.left, band.top, band.right - band.left, 3);
  }
  const side = { colour: mark.selected ? theme.flame : colour, width: mark.selected ? 2 : 1 };
  if (mark.start >= frame.x.domain[0])
    drawLine(context, crisp(band.left), band.top, crisp(band.left), band.bottom, side);
  if (mark.end <= frame.x.domain[1])
    drawLine(context, crisp(band.right), band.top, crisp(band.right), band.bottom, side);
  if (mark.selected) drawGrips(context, band, theme);
}

/** What a selected mark is moved by: a small bar on each side. */
function drawGrips(context: DrawContext, band: Band, theme: PlotTheme): void {
  const middle = (band.top + band.bottom) / 2;
  context.fillStyle = theme.flame;
  context.fillRect(crisp(band.left) - 4, middle - 8, 4, 16);
  context.fillRect(crisp(band.right), middle - 8, 4, 16);
}

/** Dip none, artefact diagonal, exclude crossed, flare dots: the kind is told without its colour. */
function drawHatch(context: DrawContext, band: Band, kind: MarkLook, colour: string): void {
  if (kind === 'dip') return;
  context.strokeStyle = colour;
  context.fillStyle = colour;
  context.lineWidth = 1;
  context.setLineDash([]);
  if (kind === 'flare') drawDots(context, band);
  else drawLines(context, band, kind === 'exclude');
}

function drawLines(context: DrawContext, band: Band, crossed: boolean): void {
  context.beginPath();
  const height = band.bottom - band.top;
  const step = crossed ? 6 : 5;
  for (let x = band.left - height; x < band.right; x += step) {
    context.moveTo(x, band.bottom);
    context.lineTo(x + height, band.top);
    if (!crossed) continue;
    context.moveTo(x, band.top);
    context.lineTo(x + height, band.bottom);
  }
  context.stroke();
}

function drawDots(context: DrawContext, band: Band): void {
  for (let row = 0, y = band.top + 3; y < band.bottom; row += 1, y += 5) {
    for (let x = band.left + (row % 2 === 0 ? 2 : 4.5); x < band.right; x += 5)
      context.fillRect(x - 0.75, y - 0.75, 1.5, 1.5);
  }
}

function drawKind(context: DrawContext, frame: Frame, mark: PlotMark, theme: PlotTheme, used: Band[]): void {
  const font = uiFont(theme);
  context.font = font;
  const width = context.measureText(mark.kind).width;
  const band = markBand(frame, mark);
  const toRight = band.right + 5 + width < frame.right;
  const left = toRight ? band.right + 5 : band.left - 5 - width;
  const place = { left, right: left + width, top: frame.top, bottom: frame.top + 16 };
  if (left < frame.left || used.some((other) => place.left < other.right + 4 && place.right > other.left - 4)) return;
  used.push(place);
  drawHaloText(context, theme, mark.kind, left, frame.top + 8, { colour: theme.ink2, font });
}
