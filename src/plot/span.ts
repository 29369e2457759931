/** A numeric interval of an axis, first below last. */
export type Span = readonly [first: number, last: number];

/** A span that can carry a scale: finite, ascending, never of no width. */
export function wideSpan(first: number, last: number): Span {
  if (!Number.isFinite(first) || !Number.isFinite(last)) return [0, 1];
  const [low, high] = first <= last ? [first, last] : [last, first];
  const least = leastWidth(low, high);
  if (high - low >= least) return [low, high];
  const middle = (low + high) / 2;
  const half = Math.max(least, Math.abs(middle) * 0.01, 0.5) / 2;
  return [middle - half, middle + half];
}

/** The narrowest span around these numbers whose pixels doubles can still tell apart. */
function leastWidth(low: number, high: number): number {
  return Math.max(Math.abs(low), Math.abs(high), Number.MIN_VALUE * 1e16) * 2 ** -40;
}
