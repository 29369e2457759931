/** Pixels to be painted as they are, one per CSS pixel, row by row, red green blue alpha. */
export interface PixelBlock {
  readonly width: number;
  readonly height: number;
  readonly rgba: Uint8ClampedArray<ArrayBuffer>;
}

type Paint = string | CanvasGradient | CanvasPattern;

/**
 * The part of CanvasRenderingContext2D that layers use, plus `drawPixels`. A layer that keeps to it can be drawn on
 * a screen and into a vector file alike.
 */
export interface DrawContext {
  fillStyle: Paint;
  strokeStyle: Paint;
  lineWidth: number;
  lineJoin: CanvasLineJoin;
  globalAlpha: number;
  font: string;
  textAlign: CanvasTextAlign;
  textBaseline: CanvasTextBaseline;
  save(): void;
  restore(): void;
  translate(xPx: number, yPx: number): void;
  rotate(radians: number): void;
  beginPath(): void;
  closePath(): void;
  moveTo(xPx: number, yPx: number): void;
  lineTo(xPx: number, yPx: number): void;
  rect(xPx: number, yPx: number, widthPx: number, heightPx: number): void;
  arc(xPx: number, yPx: number, radiusPx: number, startRadians: number, endRadians: number): void;
  fill(): void;
  stroke(): void;
  clip(): void;
  fillRect(xPx: number, yPx: number, widthPx: number, heightPx: number): void;
  strokeRect(xPx: number, yPx: number, widthPx: number, heightPx: number): void;
  fillText(text: string, xPx: number, yPx: number): void;
  strokeText(text: string, xPx: number, yPx: number): void;
  measureText(text: string): { readonly width: number };
  setLineDash(segmentsPx: number[]): void;
  drawPixels(block: PixelBlock, xPx: number, yPx: number): void;
}
