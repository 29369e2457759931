import { createSlidingMedian } from '../sliding-median.ts';
import { fitByPieces, LEAST_MEMBERS, type PiecePoints } from './fit-by-pieces.ts';
import type { Detrender } from './trend-input.ts';
import { windowsAround } from './windows.ts';

/** The median of each window, cut off at the ends of a piece; of an even number of points the mean of the middle two. */
export const runningMedian: Detrender<'running median'> = {
  scaleDays: ({ windowDays }) => windowDays,
  scaleName: 'window',
  leastCadences: () => LEAST_MEMBERS,
  fit: ({ windowDays }, input) => fitByPieces(input, windowDays, (piece) => fillMedians(piece, windowDays)),
};

export function fillMedians({ time, memberTime, memberFlux, trend }: PiecePoints, windowDays: number): true {
  const { first, end } = windowsAround(memberTime, time, windowDays);
  const sliding = createSlidingMedian(memberFlux);
  for (let i = 0; i < time.length; i += 1) {
    sliding.moveTo(first[i]!, end[i]!);
    if (end[i]! - first[i]! >= LEAST_MEMBERS) trend[i] = sliding.median();
  }
  return true;
}
