import { bisectLeft, bisectRight } from 'd3';
import type { Span } from './span.ts';

/** Indices of the samples inside a span, `from` included, `to` not. @param x ascending */
export function visibleRange(x: Float64Array, span: Span): { readonly from: number; readonly to: number } {
  return { from: bisectLeft(x, span[0]), to: bisectRight(x, span[1]) };
}

/** Index of the value nearest to `target`, undefined in an empty array. @param x ascending */
export function nearestIndex(x: Float64Array, target: number): number | undefined {
  if (x.length === 0) return undefined;
  const after = Math.min(bisectLeft(x, target), x.length - 1);
  const before = Math.max(0, after - 1);
  return Math.abs(x[before]! - target) <= Math.abs(x[after]! - target) ? before : after;
}
