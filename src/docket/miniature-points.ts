/** Positions of a miniature’s bins in a box, deepest at the bottom; missing bins are left out. */
export function miniaturePoints(
  bins: readonly number[],
  widthPx: number,
  heightPx: number,
): readonly { readonly x: number; readonly y: number }[] {
  const known = bins.filter(Number.isFinite);
  if (known.length === 0) return [];
  const low = Math.min(...known);
  const high = Math.max(...known);
  const span = high - low || 1;
  return bins.flatMap((value, index) =>
    Number.isFinite(value)
      ? [{ x: ((index + 0.5) / bins.length) * widthPx, y: 2 + ((high - value) / span) * (heightPx - 4) }]
      : [],
  );
}
