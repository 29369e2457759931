import { fitByPieces, LEAST_MEMBERS, type PiecePoints } from './fit-by-pieces.ts';
import { createPolynomialFit, type PolynomialFit } from './polynomial-fit.ts';
import type { Detrender } from './trend-input.ts';
import { type Windows, windowsAround } from './windows.ts';

/**
 * The value at each time of the polynomial of least squares through the window around it. On even and complete windows
 * these are the weights of Savitzky & Golay (1964), Anal. Chem. 36, 1627, table I; elsewhere the same polynomial in
 * time, with weights 0 and 1. Windows are cut off at the ends of a piece. A window of m points has at most degree
 * m - 2; where all of them lie on one side of a time, the trend there is interpolated from its neighbours.
 */
export const savitzkyGolay: Detrender<'savitzky-golay'> = {
  scaleDays: ({ windowDays }) => windowDays,
  scaleName: 'window',
  leastCadences: ({ degree }) => Math.max(LEAST_MEMBERS, degree + 2),
  fit: ({ windowDays, degree }, input) =>
    fitByPieces(input, windowDays, (piece) => fillPolynomials(piece, windowDays, degree)),
};

/**
 * The windows of one stretch no longer than a window share running sums of powers about the stretch's middle, so that
 * the cost does not grow with the width and the powers stay small.
 */
function fillPolynomials(piece: PiecePoints, windowDays: number, degree: number): true {
  const { time, memberTime, memberFlux } = piece;
  const windows = windowsAround(memberTime, time, windowDays);
  const fit = createPolynomialFit(degree);
  for (let start = 0; start < time.length; ) {
    let stop = start + 1;
    while (stop < time.length && time[stop]! - time[start]! <= windowDays) stop += 1;
    const middle = (time[start]! + time[stop - 1]!) / 2;
    const from = windows.first[start]!;
    fit.gather(memberTime, memberFlux, { first: from, end: windows.end[stop - 1]! }, middle, windowDays / 2);
    fillStretch(piece, windows, { start, stop }, fit);
    start = stop;
  }
  return true;
}

function fillStretch(
  { time, memberTime, trend }: PiecePoints,
  { first, end }: Windows,
  { start, stop }: { readonly start: number; readonly stop: number },
  fit: PolynomialFit,
): void {
  for (let i = start; i < stop; i += 1) {
    const [from, to] = [first[i]!, end[i]!];
    if (to - from < LEAST_MEMBERS) continue;
    // A polynomial runs away beyond its points.
    if (memberTime[from]! > time[i]! || memberTime[to - 1]! < time[i]!) continue;
    trend[i] = fit.valueAt(from, to, time[i]!);
  }
}
