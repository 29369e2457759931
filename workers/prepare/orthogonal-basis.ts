/** What is left of a column after those before it, as a part of its squared length: under it the column says nothing new. */
const LEAST_REST = 1e-9;

/** Columns made orthogonal to each other over the points with weight, each also known at the points without. */
export interface OrthogonalBasis {
  /** Takes a column in; false where it hardly differs from a sum of those before it, and is left out. */
  add(column: Float64Array): boolean;
  /** The fit of least squares of `values`, at every point. */
  fit(values: Float64Array): Float64Array;
  readonly size: number;
}

/**
 * Modified Gram-Schmidt, each column twice, so that nothing of the earlier ones is left in it to rounding.
 * Source: Golub & Van Loan (2013), Matrix Computations, section 5.2.
 *
 * @param hasWeight length n of 0 and 1
 */
export function createOrthogonalBasis(hasWeight: Uint8Array): OrthogonalBasis {
  const columns: Float64Array[] = [];
  return {
    add: (column) => {
      const own = column.slice();
      const before = weightedDot(own, own, hasWeight);
      for (let round = 0; round < 2; round += 1)
        for (const other of columns) subtract(own, other, weightedDot(own, other, hasWeight));
      const rest = weightedDot(own, own, hasWeight);
      if (!(rest > LEAST_REST * before)) return false;
      const scale = 1 / Math.sqrt(rest);
      for (let i = 0; i < own.length; i += 1) own[i] = own[i]! * scale;
      columns.push(own);
      return true;
    },
    fit: (values) => {
      const residual = values.slice();
      const fitted = new Float64Array(values.length);
      for (const column of columns) {
        const part = weightedDot(residual, column, hasWeight);
        subtract(residual, column, part);
        subtract(fitted, column, -part);
      }
      return fitted;
    },
    get size() {
      return columns.length;
    },
  };
}

function weightedDot(a: Float64Array, b: Float64Array, hasWeight: Uint8Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) if (hasWeight[i] === 1) sum += a[i]! * b[i]!;
  return sum;
}

function subtract(from: Float64Array, what: Float64Array, factor: number): void {
  for (let i = 0; i < from.length; i += 1) from[i] = from[i]! - factor * what[i]!;
}
