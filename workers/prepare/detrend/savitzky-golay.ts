import { solveLinear } from '../solve-linear.ts';
import type { Locate } from './sliding-trend.ts';

/**
 * Value at the window's middle of the polynomial of least squares through its points. On even and whole windows these
 * are the weights of Savitzky & Golay (1964), Anal. Chem. 36, 1627, table I; elsewhere the same polynomial in time.
 */
export function locateByPolynomial(degree: number): Locate {
  return ({ time, flux, count }) => {
    if (count <= degree) return Number.NaN;
    let widest = 0;
    for (let i = 0; i < count; i += 1) widest = Math.max(widest, Math.abs(time[i]!));
    const moments = new Float64Array(2 * degree + 1);
    const sums = new Float64Array(degree + 1);
    for (let i = 0; i < count; i += 1) {
      const x = widest > 0 ? time[i]! / widest : 0;
      let power = 1;
      for (let k = 0; k <= 2 * degree; k += 1) {
        moments[k] = moments[k]! + power;
        if (k <= degree) sums[k] = sums[k]! + power * flux[i]!;
        power *= x;
      }
    }
    const rows = Array.from({ length: degree + 1 }, (_, row) => [
      ...moments.subarray(row, row + degree + 1),
      sums[row]!,
    ]);
    return solveLinear(rows)?.[0] ?? Number.NaN;
  };
}
