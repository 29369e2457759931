/** A numeric interval of an axis, first below last. */
export type Span = readonly [first: number, last: number];

/** Beyond these sizes the arithmetic of a scale would overflow: smaller is taken for zero, greater for no number. */
const LEAST_SIZE = 1e-200;
const GREATEST_SIZE = 1e300;

/** A span that can carry a scale: finite, ascending, never of no width; 0 to 1 where an end is no usable number. */
export function wideSpan(first: number, last: number): Span {
  if (!(Math.abs(first) < GREATEST_SIZE && Math.abs(last) < GREATEST_SIZE)) return [0, 1];
  const [low, high] = first <= last ? [first, last] : [last, first];
  const least = leastWidth(low, high);
  if (high - low >= least) return [low, high];
  const middle = (low + high) / 2;
  const half = Math.max(least, Math.abs(middle) * 0.01, 0.5) / 2;
  return [middle - half, middle + half];
}

/** The narrowest span around these numbers whose pixels doubles can still tell apart. */
function leastWidth(low: number, high: number): number {
  return Math.max(Math.abs(low), Math.abs(high), LEAST_SIZE) * 2 ** -40;
}
