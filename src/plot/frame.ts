import { linearScale, logScale, type Scale } from './scale.ts';
import type { Span } from './span.ts';

export interface Margins {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** Width for tick labels left of every time and phase axis, so that stacked panes share their left edge. */
export const GUTTER_PX = 66;
export const RIGHT_PX = 12;

/** Where a plot stands and how its values become CSS pixels. Immutable: a new size or zoom is a new frame. */
export interface Frame {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Edges of the plot area. */
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  readonly x: Scale;
  readonly y: Scale;
}

export interface FrameSpec {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly margins: Margins;
  readonly xDomain: Span;
  readonly yDomain: Span;
  readonly xKind?: 'linear' | 'log' | undefined;
}

export function makeFrame(spec: FrameSpec): Frame {
  const { widthPx, heightPx, margins, xDomain, yDomain } = spec;
  const left = margins.left;
  const right = Math.max(left + 1, widthPx - margins.right);
  const top = margins.top;
  const bottom = Math.max(top + 1, heightPx - margins.bottom);
  const x = spec.xKind === 'log' ? logScale(xDomain, [left, right]) : linearScale(xDomain, [left, right]);
  return { widthPx, heightPx, left, right, top, bottom, x, y: linearScale(yDomain, [bottom, top]) };
}

export function insidePlot(frame: Frame, xPx: number, yPx: number): boolean {
  return xPx >= frame.left && xPx <= frame.right && yPx >= frame.top && yPx <= frame.bottom;
}
