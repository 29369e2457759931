import type { Span } from './span.ts';

/** How many times the whole span may be magnified. */
const GREATEST_ZOOM = 1e5;

/** Moves a span inside the whole without changing its width; a wider one becomes the whole. */
export function clampSpan(span: Span, whole: Span): Span {
  const width = clampWidth(span[1] - span[0], whole);
  if (width >= whole[1] - whole[0]) return whole;
  const middle = (span[0] + span[1]) / 2;
  const first = Math.min(Math.max(middle - width / 2, whole[0]), whole[1] - width);
  return [first, first + width];
}

/** Magnifies by `factor` (over 1 zooms in) so that the value `about` keeps its place, as far as the whole allows. */
export function zoomSpan(span: Span, whole: Span, about: number, factor: number): Span {
  const width = clampWidth((span[1] - span[0]) / factor, whole);
  if (width >= whole[1] - whole[0]) return whole;
  const place = (about - span[0]) / (span[1] - span[0]);
  return clampSpan([about - place * width, about + (1 - place) * width], whole);
}

/** Moves a span by `by`, stopping at the ends of the whole. */
export function panSpan(span: Span, whole: Span, by: number): Span {
  return clampSpan([span[0] + by, span[1] + by], whole);
}

/** Spans of a logarithmic axis are zoomed and panned as their logarithms. */
export function logSpan(span: Span): Span {
  return [Math.log(span[0]), Math.log(span[1])];
}

export function expSpan(span: Span): Span {
  return [Math.exp(span[0]), Math.exp(span[1])];
}

function clampWidth(width: number, whole: Span): number {
  const widest = whole[1] - whole[0];
  const least = Math.max(widest / GREATEST_ZOOM, Math.max(Math.abs(whole[0]), Math.abs(whole[1])) * 2 ** -36);
  return Math.min(Math.max(width, least), widest);
}
