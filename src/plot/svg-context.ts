import type { DrawContext, PixelBlock } from './draw-context.ts';

interface PenState {
  fillStyle: string;
  strokeStyle: string;
  lineWidth: number;
  lineJoin: CanvasLineJoin;
  globalAlpha: number;
  font: string;
  textAlign: CanvasTextAlign;
  textBaseline: CanvasTextBaseline;
  dash: readonly number[];
  transform: string;
  clipId: string | undefined;
}

const ANCHOR: Readonly<Record<CanvasTextAlign, string>> = {
  left: 'start',
  start: 'start',
  center: 'middle',
  right: 'end',
  end: 'end',
};

/** Writes what layers draw as SVG elements. Text stays text; lengths are CSS pixels. */
export class SvgContext implements DrawContext {
  private readonly elements: string[] = [];
  private readonly clips: string[] = [];
  private readonly states: PenState[] = [];
  private path = '';
  private openClipId: string | undefined;
  private state: PenState = {
    fillStyle: '#000',
    strokeStyle: '#000',
    lineWidth: 1,
    lineJoin: 'miter',
    globalAlpha: 1,
    font: '10px sans-serif',
    textAlign: 'start',
    textBaseline: 'alphabetic',
    dash: [],
    transform: '',
    clipId: undefined,
  };

  /** `idPrefix` keeps clip paths apart when several figures stand in one document. */
  constructor(private readonly idPrefix: string) {}

  get fillStyle(): string {
    return this.state.fillStyle;
  }
  set fillStyle(paint: string | CanvasGradient | CanvasPattern) {
    if (typeof paint === 'string') this.state.fillStyle = paint;
  }
  get strokeStyle(): string {
    return this.state.strokeStyle;
  }
  set strokeStyle(paint: string | CanvasGradient | CanvasPattern) {
    if (typeof paint === 'string') this.state.strokeStyle = paint;
  }
  get lineWidth(): number {
    return this.state.lineWidth;
  }
  set lineWidth(px: number) {
    this.state.lineWidth = px;
  }
  get lineJoin(): CanvasLineJoin {
    return this.state.lineJoin;
  }
  set lineJoin(join: CanvasLineJoin) {
    this.state.lineJoin = join;
  }
  get globalAlpha(): number {
    return this.state.globalAlpha;
  }
  set globalAlpha(alpha: number) {
    this.state.globalAlpha = alpha;
  }
  get font(): string {
    return this.state.font;
  }
  set font(font: string) {
    this.state.font = font;
  }
  get textAlign(): CanvasTextAlign {
    return this.state.textAlign;
  }
  set textAlign(align: CanvasTextAlign) {
    this.state.textAlign = align;
  }
  get textBaseline(): CanvasTextBaseline {
    return this.state.textBaseline;
  }
  set textBaseline(baseline: CanvasTextBaseline) {
    this.state.textBaseline = baseline;
  }

  save(): void {
    this.states.push({ ...this.state });
  }
  restore(): void {
    this.state = this.states.pop() ?? this.state;
  }
  translate(xPx: number, yPx: number): void {
    this.state.transform = `${this.state.transform}translate(${short(xPx)} ${short(yPx)})`;
  }
  rotate(radians: number): void {
    this.state.transform = `${this.state.transform}rotate(${short((radians * 180) / Math.PI)})`;
  }
  setLineDash(segmentsPx: number[]): void {
    this.state.dash = [...segmentsPx];
  }

  beginPath(): void {
    this.path = '';
  }
  closePath(): void {
    this.path += 'Z';
  }
  moveTo(xPx: number, yPx: number): void {
    this.path += `M${short(xPx)} ${short(yPx)}`;
  }
  lineTo(xPx: number, yPx: number): void {
    this.path += `${this.path === '' ? 'M' : 'L'}${short(xPx)} ${short(yPx)}`;
  }
  rect(xPx: number, yPx: number, widthPx: number, heightPx: number): void {
    this.path += `M${short(xPx)} ${short(yPx)}h${short(widthPx)}v${short(heightPx)}h${short(-widthPx)}Z`;
  }
  arc(xPx: number, yPx: number, radiusPx: number, startRadians: number, endRadians: number): void {
    const sweep = Math.min(endRadians - startRadians, 2 * Math.PI);
    // One arc command cannot end where it began, so every arc is drawn in two halves.
    const middle = startRadians + sweep / 2;
    const end = startRadians + sweep;
    const at = (a: number) => `${short(xPx + radiusPx * Math.cos(a))} ${short(yPx + radiusPx * Math.sin(a))}`;
    const half = (a: number) => `A${short(radiusPx)} ${short(radiusPx)} 0 0 1 ${at(a)}`;
    this.path += `${this.path === '' || this.path.endsWith('Z') ? 'M' : 'L'}${at(startRadians)}${half(middle)}${half(end)}`;
  }

  fill(): void {
    this.emit('path', `d="${this.path}" fill="${escapeXml(this.state.fillStyle)}"`);
  }
  stroke(): void {
    this.emit('path', `d="${this.path}" fill="none"${this.strokeAttributes()}`);
  }
  clip(): void {
    const id = `${this.idPrefix}-clip-${this.clips.length + 1}`;
    const outer = this.state.clipId === undefined ? '' : ` clip-path="url(#${this.state.clipId})"`;
    this.clips.push(`<clipPath id="${id}"${outer}><path d="${this.path}"${this.transformAttribute()}/></clipPath>`);
    this.state.clipId = id;
  }
  fillRect(xPx: number, yPx: number, widthPx: number, heightPx: number): void {
    this.emit('rect', `${box(xPx, yPx, widthPx, heightPx)} fill="${escapeXml(this.state.fillStyle)}"`);
  }
  strokeRect(xPx: number, yPx: number, widthPx: number, heightPx: number): void {
    this.emit('rect', `${box(xPx, yPx, widthPx, heightPx)} fill="none"${this.strokeAttributes()}`);
  }
  fillText(text: string, xPx: number, yPx: number): void {
    this.emitText(text, xPx, yPx, `fill="${escapeXml(this.state.fillStyle)}"`);
  }
  strokeText(text: string, xPx: number, yPx: number): void {
    this.emitText(text, xPx, yPx, `fill="none"${this.strokeAttributes()}`);
  }
  /** An estimate: a vector file has no font to measure with. Half an em is the mean advance of the text face. */
  measureText(text: string): { readonly width: number } {
    return { width: text.length * this.fontPx() * 0.5 };
  }

  /** Runs of one colour become strokes of one path, so that a density stays a vector figure. */
  drawPixels(block: PixelBlock, xPx: number, yPx: number): void {
    const byPaint = new Map<number, string>();
    const pixels = new Uint32Array(block.rgba.buffer, block.rgba.byteOffset, block.width * block.height);
    for (let row = 0; row < block.height; row += 1) collectRuns(pixels, block.width, row, byPaint);
    const transform = `transform="translate(${short(xPx)} ${short(yPx)})"`;
    for (const [pixel, d] of byPaint) this.emit('path', `d="${d}" ${transform} fill="none" ${paintOf(pixel)}`);
  }

  toSvg(widthPx: number, heightPx: number, title: string): string {
    this.switchClip(undefined);
    const size = `width="${short(widthPx)}" height="${short(heightPx)}" viewBox="0 0 ${short(widthPx)} ${short(heightPx)}"`;
    const defs = this.clips.length === 0 ? '' : `<defs>${this.clips.join('')}</defs>`;
    const head = `<svg xmlns="http://www.w3.org/2000/svg" ${size} role="img"><title>${escapeXml(title)}</title>`;
    return `${head}${defs}${this.elements.join('\n')}</svg>`;
  }

  private emit(tag: string, attributes: string): void {
    this.switchClip(this.state.clipId);
    const alpha = this.state.globalAlpha === 1 ? '' : ` opacity="${short(this.state.globalAlpha)}"`;
    this.elements.push(`<${tag} ${attributes}${alpha}${this.transformAttribute()}/>`);
  }
  private emitText(text: string, xPx: number, yPx: number, paint: string): void {
    this.switchClip(this.state.clipId);
    // Not every renderer knows dominant-baseline: the shift is 0.35 em for the middle, 0.75 em for the top.
    const shift = { middle: 0.35, top: 0.75, hanging: 0.75 }[this.state.textBaseline as string] ?? 0;
    const place = `x="${short(xPx)}" y="${short(yPx + shift * this.fontPx())}" text-anchor="${ANCHOR[this.state.textAlign]}"`;
    const font = `style="font:${escapeXml(this.state.font)}"`;
    this.elements.push(`<text ${place} ${font} ${paint}${this.transformAttribute()}>${escapeXml(text)}</text>`);
  }
  private switchClip(id: string | undefined): void {
    if (id === this.openClipId) return;
    if (this.openClipId !== undefined) this.elements.push('</g>');
    if (id !== undefined) this.elements.push(`<g clip-path="url(#${id})">`);
    this.openClipId = id;
  }
  private strokeAttributes(): string {
    const { strokeStyle, lineWidth, lineJoin, dash } = this.state;
    const dashes = dash.length === 0 ? '' : ` stroke-dasharray="${dash.join(' ')}"`;
    const join = lineJoin === 'miter' ? '' : ` stroke-linejoin="${lineJoin}"`;
    return ` stroke="${escapeXml(strokeStyle)}" stroke-width="${short(lineWidth)}"${dashes}${join}`;
  }
  private transformAttribute(): string {
    return this.state.transform === '' ? '' : ` transform="${this.state.transform}"`;
  }
  private fontPx(): number {
    return Number(/([\d.]+)px/.exec(this.state.font)?.[1] ?? 10);
  }
}

function collectRuns(pixels: Uint32Array, width: number, row: number, byPaint: Map<number, string>): void {
  const first = row * width;
  for (let start = 0; start < width; ) {
    const pixel = pixels[first + start]!;
    let end = start + 1;
    while (end < width && pixels[first + end] === pixel) end += 1;
    if (pixel >>> 24 !== 0) byPaint.set(pixel, `${byPaint.get(pixel) ?? ''}M${start} ${row + 0.5}h${end - start}`);
    start = end;
  }
}

/** A pixel as it lies in memory on a little-endian machine: alpha, blue, green, red from the top byte down. */
function paintOf(pixel: number): string {
  const colour = `rgb(${pixel & 255},${(pixel >>> 8) & 255},${(pixel >>> 16) & 255})`;
  const alpha = pixel >>> 24 === 255 ? '' : ` stroke-opacity="${short((pixel >>> 24) / 255)}"`;
  return `stroke="${colour}" stroke-width="1" shape-rendering="crispEdges"${alpha}`;
}

function box(xPx: number, yPx: number, widthPx: number, heightPx: number): string {
  return `x="${short(xPx)}" y="${short(yPx)}" width="${short(widthPx)}" height="${short(heightPx)}"`;
}

function short(value: number): string {
  return String(Math.round(value * 100) / 100);
}

function escapeXml(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;');
}
