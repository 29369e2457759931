import { canvasContext } from './canvas-context.ts';
import type { DrawContext } from './draw-context.ts';
import { SvgContext } from './svg-context.ts';

export interface FigureSize {
  readonly widthPx: number;
  readonly heightPx: number;
}

/** A plot as it stands, to be written into a file or a report. */
export interface Figure {
  toSvg(size?: FigureSize): string;
  toPng(size?: FigureSize): Promise<Blob>;
}

/** The same layers that the screen shows, as one SVG document. @param title the plot's sentence, for screen readers */
export function saveAsSvg(
  draw: (context: DrawContext) => void,
  size: FigureSize,
  title: string,
  background: string,
): string {
  figureCount += 1;
  const context = new SvgContext(`figure-${figureCount}`);
  fillGround(context, size, background);
  draw(context);
  return context.toSvg(size.widthPx, size.heightPx, title);
}

/** @param ratio device pixels to a CSS pixel; 2 prints well. Rejects where the browser cannot make a PNG of this size. */
export function saveAsPng(
  draw: (context: DrawContext) => void,
  size: FigureSize,
  background: string,
  ratio: number,
): Promise<Blob> {
  const canvas = document.createElement('canvas');
  canvas.width = Math.round(size.widthPx * ratio);
  canvas.height = Math.round(size.heightPx * ratio);
  const raw = canvas.getContext('2d');
  if (!raw) return Promise.reject(new Error('This browser gave no canvas to draw the picture on.'));
  raw.scale(ratio, ratio);
  const context = canvasContext(raw);
  fillGround(context, size, background);
  draw(context);
  return canvasBlob(canvas);
}

let figureCount = 0;

function fillGround(context: DrawContext, size: FigureSize, background: string): void {
  context.fillStyle = background;
  context.fillRect(0, 0, size.widthPx, size.heightPx);
}

function canvasBlob(canvas: HTMLCanvasElement): Promise<Blob> {
  return new Promise((resolve, reject) => {
    canvas.toBlob((blob) => {
      if (blob) resolve(blob);
      else reject(new Error(`A picture of ${canvas.width} by ${canvas.height} pixels is too large for this browser.`));
    }, 'image/png');
  });
}
