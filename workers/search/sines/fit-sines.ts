import { type WeightedSeries, withoutMean } from './weighted-series.ts';

export interface FittedSine {
  readonly frequencyPerDay: number;
  /** Of cos and of sin, about the middle of the span. */
  readonly cosine: number;
  readonly sine: number;
}

/**
 * Fits sines of given frequencies and a mean together, by weighted linear least squares, and takes them out.
 *
 * @returns undefined where the sines cannot be told apart on these times
 */
export function fitSines(
  series: WeightedSeries,
  frequencies: readonly number[],
): { readonly sines: readonly FittedSine[]; readonly residual: Float64Array } | undefined {
  const columns = frequencies.flatMap((frequency) => [
    series.time.map((t) => Math.cos(2 * Math.PI * frequency * t)),
    series.time.map((t) => Math.sin(2 * Math.PI * frequency * t)),
  ]);
  columns.push(new Float64Array(series.time.length).fill(1));
  const solution = solve(normalEquations(columns, series));
  if (solution === undefined) return undefined;
  const model = series.time.map((_, i) => columns.reduce((sum, column, c) => sum + solution[c]! * column[i]!, 0));
  const residual = withoutMean(
    series.flux.map((value, i) => 1 + value - model[i]!),
    series.weight,
  );
  const sines = frequencies.map((frequencyPerDay, index) => ({
    frequencyPerDay,
    cosine: solution[2 * index]!,
    sine: solution[2 * index + 1]!,
  }));
  return { sines, residual };
}

function normalEquations(columns: readonly Float64Array[], { weight, flux }: WeightedSeries): number[][] {
  const dot = (a: Float64Array, b: Float64Array): number => a.reduce((sum, x, i) => sum + weight[i]! * x * b[i]!, 0);
  return columns.map((row) => [...columns.map((column) => dot(row, column)), dot(row, flux)]);
}

/** Gauss's elimination with pivots on a small system; the last column is the right side. */
function solve(rows: number[][]): number[] | undefined {
  const n = rows.length;
  for (let column = 0; column < n; column += 1) {
    let pivot = column;
    for (let row = column + 1; row < n; row += 1)
      if (Math.abs(rows[row]![column]!) > Math.abs(rows[pivot]![column]!)) pivot = row;
    if (!(Math.abs(rows[pivot]![column]!) > 1e-12)) return undefined;
    [rows[column], rows[pivot]] = [rows[pivot]!, rows[column]!];
    for (let row = 0; row < n; row += 1) {
      if (row === column) continue;
      const factor = rows[row]![column]! / rows[column]![column]!;
      for (let k = column; k <= n; k += 1) rows[row]![k]! -= factor * rows[column]![k]!;
    }
  }
  return rows.map((row, index) => row[n]! / row[index]!);
}
