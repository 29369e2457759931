/** Points first to end - 1. */
export interface Piece {
  readonly first: number;
  readonly end: number;
}

/**
 * The runs of points without a longer gap and without a split.
 *
 * @param splits indices of points that begin a piece
 */
export function piecesOf(time: Float64Array, splits: readonly number[], longestGapDays: number): Piece[] {
  const begins = new Set(splits);
  const pieces: Piece[] = [];
  let first = 0;
  for (let i = 1; i <= time.length; i += 1) {
    if (i < time.length && time[i]! - time[i - 1]! <= longestGapDays && !begins.has(i)) continue;
    pieces.push({ first, end: i });
    first = i;
  }
  return pieces;
}
