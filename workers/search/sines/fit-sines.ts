import { solveSymmetric } from './solve-symmetric.ts';
import { runSteps, type Steps } from './steps.ts';
import { varianceOf, type WeightedSeries } from './weighted-series.ts';

/** Points between two looks at the clock. */
const POINTS_PER_LOOK = 4096;
const MOST_POLISHING = 4;
/** Frequencies that move by less than this part of 1 / span have come to rest. */
const AT_REST = 1e-5;
/** A frequency that would move further than this part of 1 / span is another peak. */
const FURTHEST = 0.5;

export interface FittedSine {
  readonly frequencyPerDay: number;
  /** Of cos and of sin, about the middle of the span. */
  readonly cosine: number;
  readonly sine: number;
}

export interface SineFit {
  readonly sines: readonly FittedSine[];
  readonly residual: Float64Array;
  /** Weighted mean of residual^2. */
  readonly variance: number;
}

interface FrequencyRange {
  readonly lowest: number;
  readonly highest: number;
}

/**
 * Fits sines of given frequencies and a mean together by weighted linear least squares.
 *
 * @returns undefined where the sines cannot be told apart on these times
 */
export function fitSines(series: WeightedSeries, frequencies: readonly number[]): SineFit | undefined {
  return runSteps(fitAmplitudes(series, frequencies));
}

/**
 * The same, and then all frequencies moved to the least squares nearby (Gauss & Newton), so that none is pulled by a
 * sine that was found after it.
 */
export function* fitSinesFreely(
  series: WeightedSeries,
  frequencies: readonly number[],
  range: FrequencyRange,
): Steps<SineFit | undefined> {
  let fit = yield* fitAmplitudes(series, frequencies);
  for (let round = 0; round < MOST_POLISHING && fit !== undefined; round += 1) {
    const moved = yield* moveFrequencies(series, fit, range);
    if (moved === undefined) return fit;
    const next: SineFit | undefined = yield* fitAmplitudes(series, moved.frequencies);
    if (next === undefined || !(next.variance < fit.variance)) return fit;
    fit = next;
    if (moved.furthest < AT_REST) return fit;
  }
  return fit;
}

function* fitAmplitudes(series: WeightedSeries, frequencies: readonly number[]): Steps<SineFit | undefined> {
  const flat = frequencies.map((frequencyPerDay) => ({ frequencyPerDay, cosine: 0, sine: 0 }));
  const solution = yield* solveSines(series, series.flux, flat, false);
  if (solution === undefined) return undefined;
  const sines = flat.map(({ frequencyPerDay }, index) => ({
    frequencyPerDay,
    cosine: solution[1 + 2 * index]!,
    sine: solution[2 + 2 * index]!,
  }));
  const residual = yield* takeOut(series, sines, solution[0]!);
  return { sines, residual, variance: varianceOf(residual, series.weight) };
}

/** Undefined where a frequency would leave its peak, or the range. */
function* moveFrequencies(
  series: WeightedSeries,
  fit: SineFit,
  { lowest, highest }: FrequencyRange,
): Steps<{ readonly frequencies: readonly number[]; readonly furthest: number } | undefined> {
  const solution = yield* solveSines(series, fit.residual, fit.sines, true);
  if (solution === undefined) return undefined;
  let furthest = 0;
  const frequencies: number[] = [];
  for (const [index, { frequencyPerDay }] of fit.sines.entries()) {
    const move = solution[1 + 2 * fit.sines.length + index]!;
    const frequency = frequencyPerDay + move / series.spanDays;
    furthest = Math.max(furthest, Math.abs(move));
    if (!(Math.abs(move) < FURTHEST) || !(frequency >= lowest && frequency <= highest)) return undefined;
    frequencies.push(frequency);
  }
  return { frequencies, furthest };
}

/** Coefficients of 1, of each cosine and sine, and, if asked for, of each frequency's move in units of 1 / span. */
function* solveSines(
  { time, weight, spanDays }: WeightedSeries,
  values: Float64Array,
  sines: readonly FittedSine[],
  withMoves: boolean,
): Steps<Float64Array | undefined> {
  const n = 1 + (withMoves ? 3 : 2) * sines.length;
  const [matrix, right, row] = [new Float64Array(n * n), new Float64Array(n), new Float64Array(n)];
  for (let start = 0; start < time.length; start += POINTS_PER_LOOK) {
    const end = Math.min(time.length, start + POINTS_PER_LOOK);
    for (let i = start; i < end; i += 1) {
      fillRow(row, time[i]!, sines, withMoves ? spanDays : 0);
      addRow(matrix, right, row, weight[i]!, values[i]!);
    }
    yield 0;
  }
  // Columns of sizes far apart lose digits.
  const sizes = right.map((_, k) => Math.sqrt(matrix[n * k + k]!) || 1);
  for (let k = 0; k < n * n; k += 1) matrix[k] = matrix[k]! / (sizes[Math.floor(k / n)]! * sizes[k % n]!);
  const scaled = right.map((value, k) => value / sizes[k]!);
  return solveSymmetric(matrix, scaled) ? scaled.map((value, k) => value / sizes[k]!) : undefined;
}

function fillRow(row: Float64Array, time: number, sines: readonly FittedSine[], spanDays: number): void {
  const count = sines.length;
  row[0] = 1;
  for (let k = 0; k < count; k += 1) {
    const { frequencyPerDay, cosine, sine } = sines[k]!;
    const angle = 2 * Math.PI * frequencyPerDay * time;
    const x = Math.cos(angle);
    const y = Math.sin(angle);
    row[1 + 2 * k] = x;
    row[2 + 2 * k] = y;
    if (spanDays > 0) row[1 + 2 * count + k] = ((2 * Math.PI * time) / spanDays) * (sine * x - cosine * y);
  }
}

function addRow(matrix: Float64Array, right: Float64Array, row: Float64Array, weight: number, value: number): void {
  const n = row.length;
  for (let k = 0; k < n; k += 1) {
    const own = weight * row[k]!;
    right[k] = right[k]! + own * value;
    for (let l = 0; l <= k; l += 1) matrix[n * k + l] = matrix[n * k + l]! + own * row[l]!;
  }
}

function* takeOut({ time, flux }: WeightedSeries, sines: readonly FittedSine[], mean: number): Steps<Float64Array> {
  const residual = new Float64Array(time.length);
  for (let start = 0; start < time.length; start += POINTS_PER_LOOK) {
    const end = Math.min(time.length, start + POINTS_PER_LOOK);
    for (let i = start; i < end; i += 1) residual[i] = flux[i]! - mean - modelAt(sines, time[i]!);
    yield 0;
  }
  return residual;
}

function modelAt(sines: readonly FittedSine[], time: number): number {
  let sum = 0;
  for (let k = 0; k < sines.length; k += 1) {
    const { frequencyPerDay, cosine, sine } = sines[k]!;
    const angle = 2 * Math.PI * frequencyPerDay * time;
    sum += cosine * Math.cos(angle) + sine * Math.sin(angle);
  }
  return sum;
}
