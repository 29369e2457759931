import type { DrawContext } from './draw-context.ts';
import type { PlotTheme } from './theme.ts';

export interface TextLook {
  readonly colour: string;
  readonly align?: CanvasTextAlign;
  readonly font: string;
}

export function uiFont(theme: PlotTheme, sizePx = 12, weight = 400): string {
  return `${weight} ${sizePx}px ${theme.font}`;
}

/** For symbols of quantities only: P, T, delta. */
export function symbolFont(theme: PlotTheme, sizePx = 13): string {
  return `italic ${sizePx}px ${theme.fontSymbol}`;
}

export function drawText(context: DrawContext, text: string, xPx: number, yPx: number, look: TextLook): void {
  context.font = look.font;
  context.fillStyle = look.colour;
  context.textAlign = look.align ?? 'left';
  context.textBaseline = 'middle';
  context.fillText(text, xPx, yPx);
}

/** Text over data: a rim of the plot surface keeps it legible. */
export function drawHaloText(
  context: DrawContext,
  theme: PlotTheme,
  text: string,
  xPx: number,
  yPx: number,
  look: TextLook,
): void {
  context.font = look.font;
  context.textAlign = look.align ?? 'left';
  context.textBaseline = 'middle';
  context.lineJoin = 'round';
  context.lineWidth = 4;
  context.setLineDash([]);
  context.strokeStyle = theme.plot;
  context.strokeText(text, xPx, yPx);
  context.fillStyle = look.colour;
  context.fillText(text, xPx, yPx);
}

/** Draws a title that may hold one subscript after an underscore, as BJD_TDB, around its middle. */
export function drawTitle(context: DrawContext, theme: PlotTheme, title: string, xPx: number, yPx: number): void {
  const font = uiFont(theme);
  const small = uiFont(theme, 9.5);
  const parts = /^([^_]*)_(\w+)(.*)$/s.exec(title)?.slice(1) ?? [title];
  const fonts = [font, small, font];
  const widths = parts.map((part, i) => {
    context.font = fonts[i]!;
    return context.measureText(part).width;
  });
  let x = xPx - widths.reduce((sum, width) => sum + width, 0) / 2;
  parts.forEach((part, i) => {
    drawText(context, part, x, i === 1 ? yPx + 3 : yPx, { colour: theme.tickText, font: fonts[i]! });
    x += widths[i]!;
  });
}

/** A title upright along y, read from below. */
export function drawUprightTitle(
  context: DrawContext,
  theme: PlotTheme,
  title: string,
  xPx: number,
  yPx: number,
): void {
  context.save();
  context.translate(xPx, yPx);
  context.rotate(-Math.PI / 2);
  drawTitle(context, theme, title, 0, 0);
  context.restore();
}
