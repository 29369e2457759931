export const ORDER = 4;

/** Even knots over a piece. */
export interface Knots {
  readonly start: number;
  readonly width: number;
  readonly intervals: number;
}

/**
 * Values of the four cubic B-splines at a place in an interval, 0 to 1.
 * Source: de Boor (1978), A Practical Guide to Splines, chapter X, on even knots.
 */
export function basisAt(x: number, into: Float64Array): void {
  const rest = 1 - x;
  into[0] = (rest * rest * rest) / 6;
  into[1] = (3 * x * x * x - 6 * x * x + 4) / 6;
  into[2] = (3 * rest * rest * rest - 6 * rest * rest + 4) / 6;
  into[3] = (x * x * x) / 6;
}

export const intervalOf = (place: number, intervals: number): number =>
  Math.max(0, Math.min(intervals - 1, Math.floor(place)));

/** The spline with these coefficients; `basis` is scratch of length 4. */
export function evaluateSpline(coefficients: Float64Array, knots: Knots, time: number, basis: Float64Array): number {
  const place = (time - knots.start) / knots.width;
  const interval = intervalOf(place, knots.intervals);
  basisAt(place - interval, basis);
  let sum = 0;
  for (let k = 0; k < ORDER; k += 1) sum += basis[k]! * coefficients[interval + k]!;
  return sum;
}

/** Integrals over one interval of width 1 of the products of the four second derivatives 1 - x, 3x - 2, 1 - 3x, x. */
const BENDING = [
  [1 / 3, -1 / 2, 0, 1 / 6],
  [-1 / 2, 1, -1 / 2, 0],
  [0, -1 / 2, 1, -1 / 2],
  [1 / 6, 0, -1 / 2, 1 / 3],
] as const;

/** Adds `penalty` times the integral of the squared second derivative to normal equations in rows of four. */
export function addBending(bands: Float64Array, { width, intervals }: Knots, penalty: number): void {
  const strength = penalty / width ** 3;
  for (let interval = 0; interval < intervals; interval += 1)
    for (let row = 0; row < ORDER; row += 1)
      for (let column = row; column < ORDER; column += 1) {
        const at = (interval + row) * ORDER + column - row;
        bands[at] = bands[at]! + strength * BENDING[row]![column]!;
      }
}

/**
 * Solves a symmetric system of which each row holds its diagonal and the three entries right of it (Cholesky without
 * roots). Both arguments are written over.
 *
 * @returns the solution; undefined where the rows depend on each other
 */
export function solveBands(bands: Float64Array, right: Float64Array): Float64Array | undefined {
  const count = right.length;
  for (let row = 0; row < count; row += 1) {
    const pivot = bands[row * ORDER]!;
    if (!(pivot > 0)) return undefined;
    for (let k = 1; k < ORDER && row + k < count; k += 1) {
      const factor = bands[row * ORDER + k]! / pivot;
      for (let column = k; column < ORDER; column += 1) {
        const at = (row + k) * ORDER + column - k;
        bands[at] = bands[at]! - factor * bands[row * ORDER + column]!;
      }
      right[row + k] = right[row + k]! - factor * right[row]!;
    }
  }
  for (let row = count - 1; row >= 0; row -= 1) {
    let sum = right[row]!;
    for (let k = 1; k < ORDER && row + k < count; k += 1) sum -= bands[row * ORDER + k]! * right[row + k]!;
    right[row] = sum / bands[row * ORDER]!;
  }
  return right;
}
