/** A pivot under this part of the largest entry leaves nothing to divide by. */
const LEAST_PIVOT = 1e-13;

/**
 * Gauss's elimination with pivots on a small system; each row ends with its right side and is written over.
 *
 * @returns undefined where the rows depend on each other
 */
export function solveLinear(rows: number[][]): number[] | undefined {
  const n = rows.length;
  const largest = rows.reduce((most, row) => Math.max(most, ...row.slice(0, n).map(Math.abs)), 0);
  for (let column = 0; column < n; column += 1) {
    let pivot = column;
    for (let row = column + 1; row < n; row += 1)
      if (Math.abs(rows[row]![column]!) > Math.abs(rows[pivot]![column]!)) pivot = row;
    if (!(Math.abs(rows[pivot]![column]!) > LEAST_PIVOT * largest)) return undefined;
    [rows[column], rows[pivot]] = [rows[pivot]!, rows[column]!];
    for (let row = 0; row < n; row += 1) {
      if (row === column) continue;
      const factor = rows[row]![column]! / rows[column]![column]!;
      for (let k = column; k <= n; k += 1) rows[row]![k]! -= factor * rows[column]![k]!;
    }
  }
  return rows.map((row, index) => row[n]! / row[index]!);
}
