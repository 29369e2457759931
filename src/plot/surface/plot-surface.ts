import { canvasContext } from '../canvas-context.ts';
import type { DrawContext } from '../draw-context.ts';
import { cancelPaint, requestPaint } from './frame-loop.ts';

export interface SurfaceSize {
  readonly widthPx: number;
  readonly heightPx: number;
}

export interface SurfacePainter {
  base(context: DrawContext, size: SurfaceSize): void;
  overlay(context: DrawContext, size: SurfaceSize): void;
  /** The page's colours or faces changed: whatever was read from them is stale. */
  lookChanged(): void;
}

export interface PlotSurface {
  readonly size: () => SurfaceSize;
  invalidate(layer: 'base' | 'overlay'): void;
  dispose(): void;
}

/** Two stacked canvases that follow the size of their host and the device's pixel ratio. */
export function makeSurface(host: HTMLElement, painter: SurfacePainter): PlotSurface {
  const base = addCanvas(host);
  const overlay = addCanvas(host);
  const stale = { base: true, overlay: true, size: true };
  let size: SurfaceSize = { widthPx: host.clientWidth, heightPx: host.clientHeight };

  const paint = (): void => {
    if (size.widthPx < 1 || size.heightPx < 1) return;
    if (stale.size) for (const layer of [base, overlay]) fitCanvas(layer.canvas, size);
    if (stale.size || stale.base) paintLayer(base, (context) => painter.base(context, size));
    paintLayer(overlay, (context) => painter.overlay(context, size));
    Object.assign(stale, { base: false, overlay: false, size: false });
  };
  const resized = (): void => {
    size = { widthPx: host.clientWidth, heightPx: host.clientHeight };
    stale.size = true;
    requestPaint(paint);
  };
  const restyled = (): void => {
    painter.lookChanged();
    stale.base = true;
    requestPaint(paint);
  };
  const stop = watchHost(host, resized, restyled);
  requestPaint(paint);
  return {
    size: () => size,
    invalidate: (layer) => {
      stale[layer] = true;
      requestPaint(paint);
    },
    dispose: () => {
      stop();
      cancelPaint(paint);
      base.canvas.remove();
      overlay.canvas.remove();
    },
  };
}

interface Layer {
  readonly canvas: HTMLCanvasElement;
  readonly raw: CanvasRenderingContext2D | null;
  readonly context: DrawContext | undefined;
}

function addCanvas(host: HTMLElement): Layer {
  const canvas = document.createElement('canvas');
  host.append(canvas);
  const raw = canvas.getContext('2d');
  return { canvas, raw, context: raw ? canvasContext(raw) : undefined };
}

function fitCanvas(canvas: HTMLCanvasElement, size: SurfaceSize): void {
  canvas.width = Math.round(size.widthPx * devicePixelRatio);
  canvas.height = Math.round(size.heightPx * devicePixelRatio);
}

function paintLayer(layer: Layer, draw: (context: DrawContext) => void): void {
  const { raw, context, canvas } = layer;
  if (!raw || !context) return;
  raw.setTransform(1, 0, 0, 1, 0, 0);
  raw.clearRect(0, 0, canvas.width, canvas.height);
  raw.setTransform(devicePixelRatio, 0, 0, devicePixelRatio, 0, 0);
  draw(context);
}

/** Calls back on a new size or pixel ratio, and on a new theme or late fonts. @returns what ends the watch */
function watchHost(host: HTMLElement, resized: () => void, restyled: () => void): () => void {
  const sizes = new ResizeObserver(resized);
  sizes.observe(host);
  const looks = new MutationObserver(restyled);
  looks.observe(document.documentElement, { attributeFilter: ['data-theme', 'class', 'style'] });
  document.fonts.addEventListener('loadingdone', restyled);
  const stopRatio = watchPixelRatio(resized);
  return () => {
    sizes.disconnect();
    looks.disconnect();
    document.fonts.removeEventListener('loadingdone', restyled);
    stopRatio();
  };
}

/** A resolution query fires once only, when its ratio is left, so each change makes the next query. */
function watchPixelRatio(changed: () => void): () => void {
  let query = matchMedia(`(resolution: ${devicePixelRatio}dppx)`);
  const onChange = (): void => {
    query.removeEventListener('change', onChange);
    query = matchMedia(`(resolution: ${devicePixelRatio}dppx)`);
    query.addEventListener('change', onChange);
    changed();
  };
  query.addEventListener('change', onChange);
  return () => query.removeEventListener('change', onChange);
}
