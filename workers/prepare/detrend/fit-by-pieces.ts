import { bridgeTrend } from './bridge-trend.ts';
import { piecesOf } from './pieces.ts';
import type { TrendInput } from './trend-input.ts';

/** A window with fewer points has no level of its own. */
export const LEAST_MEMBERS = 3;

/** One piece: all of its times, of which those with weight and a flux are members. */
export interface PiecePoints {
  /** Index of its first point in the series. */
  readonly first: number;
  /** Days, ascending; at each a trend is wanted. */
  readonly time: Float64Array;
  /** Ascending. */
  readonly memberTime: Float64Array;
  readonly memberFlux: Float64Array;
  /** Written to; starts as NaN, and NaN stays where a window has too few members. */
  readonly trend: Float64Array;
}

/** Fills the trend of one piece; false, or a promise of it, when cancelled. */
export type FitPiece = (piece: PiecePoints) => Promise<boolean> | boolean;

/**
 * A trend piece by piece: pieces end at splits and at gaps longer than half of what the trend looks at, so that no
 * window reaches across. What has no value of its own is interpolated from its neighbours.
 *
 * @returns length n; 1 everywhere when no piece has enough points; undefined when cancelled
 */
export async function fitByPieces(
  { time, flux, hasWeight, splits }: TrendInput,
  scaleDays: number,
  fitPiece: FitPiece,
): Promise<Float64Array | undefined> {
  const trend = new Float64Array(time.length).fill(Number.NaN);
  for (const { first, end } of piecesOf(time, splits, scaleDays / 2)) {
    const members = gather(time, flux, hasWeight, first, end);
    const piece = { first, time: time.subarray(first, end), ...members, trend: trend.subarray(first, end) };
    if (members.memberTime.length >= LEAST_MEMBERS && !(await fitPiece(piece))) return undefined;
  }
  bridgeTrend(time, trend, splits);
  return trend;
}

function gather(time: Float64Array, flux: Float64Array, hasWeight: Uint8Array, first: number, end: number) {
  const memberTime = new Float64Array(end - first);
  const memberFlux = new Float64Array(end - first);
  let count = 0;
  for (let i = first; i < end; i += 1) {
    if (hasWeight[i] !== 1 || !Number.isFinite(flux[i]!)) continue;
    memberTime[count] = time[i]!;
    memberFlux[count] = flux[i]!;
    count += 1;
  }
  return { memberTime: memberTime.subarray(0, count), memberFlux: memberFlux.subarray(0, count) };
}
