import { MAD_TO_SIGMA, medianInPlace } from '../../src/core/robust-statistics.ts';
import { solveLinear } from './solve-linear.ts';

const CLIP_SIGMA = 4;
const ROUNDS = 3;
/** Against columns that nearly repeat one another; too small to bend the others. */
const RIDGE = 1e-9;

/** Points first to end - 1 share one set of coefficients. */
export interface Group {
  readonly first: number;
  readonly end: number;
}

/**
 * Linear least squares of the flux on columns, a set of coefficients for each group, refitted without points beyond
 * 4 robust sigma. A point without one of the columns, or without weight, takes no part but is corrected by what it has.
 *
 * @param flux relative, length n; @param columns each of length n, NaN where missing; @param hasWeight length n
 * @returns what the columns explain, about their means over all groups: 0 where they explain nothing, length n
 */
export function regressOn(
  flux: Float64Array,
  columns: readonly Float64Array[],
  hasWeight: Uint8Array,
  groups: readonly Group[],
): Float64Array {
  const explained = new Float64Array(flux.length);
  const used = hasWeight.map((own, i) => (own === 1 && isWhole(flux, columns, i) ? 1 : 0));
  const scaled = columns.map((column) => standardise(column, used)).filter((column) => column !== undefined);
  if (scaled.length > 0) for (const group of groups) regressGroup(flux, scaled, used, group, explained);
  return explained;
}

function isWhole(flux: Float64Array, columns: readonly Float64Array[], i: number): boolean {
  return Number.isFinite(flux[i]!) && columns.every((column) => Number.isFinite(column[i]!));
}

function regressGroup(
  flux: Float64Array,
  columns: readonly Float64Array[],
  allUsed: Uint8Array,
  { first, end }: Group,
  explained: Float64Array,
): void {
  const used = allUsed.slice(first, end);
  const own = columns.map((column) => column.subarray(first, end));
  const scratch = new Float64Array(end - first);
  for (let round = 0; round < ROUNDS; round += 1) {
    const coefficients = solve(flux, own, used, first);
    if (coefficients === undefined) return;
    for (let i = 0; i < used.length; i += 1)
      explained[first + i] = own.reduce((sum, column, c) => sum + coefficients[c]! * column[i]!, 0);
    if (clip(flux, explained, coefficients.at(-1)!, used, first, scratch) === 0) return;
  }
}

/** Zero mean and unit scatter over the used points, 0 where missing; undefined for a column that does not vary. */
function standardise(column: Float64Array, used: Uint8Array): Float64Array | undefined {
  let [count, mean, squares] = [0, 0, 0];
  for (let i = 0; i < used.length; i += 1) {
    if (used[i] === 0) continue;
    count += 1;
    const delta = column[i]! - mean;
    mean += delta / count;
    squares += delta * (column[i]! - mean);
  }
  const scatter = Math.sqrt(squares / Math.max(1, count));
  if (!(scatter > 1e-12 * Math.abs(mean))) return undefined;
  return column.map((value) => (Number.isFinite(value) ? (value - mean) / scatter : 0));
}

/** Coefficients of the columns, then the level. */
function solve(flux: Float64Array, columns: readonly Float64Array[], used: Uint8Array, first: number) {
  const all = [...columns, new Float64Array(used.length).fill(1)];
  const size = all.length;
  const rows = all.map(() => new Array<number>(size + 1).fill(0));
  let count = 0;
  for (let i = 0; i < used.length; i += 1) {
    if (used[i] === 0) continue;
    count += 1;
    for (let row = 0; row < size; row += 1) {
      for (let column = 0; column < size; column += 1) rows[row]![column]! += all[row]![i]! * all[column]![i]!;
      rows[row]![size]! += all[row]![i]! * flux[first + i]!;
    }
  }
  if (count <= size) return undefined;
  for (let row = 0; row + 1 < size; row += 1) rows[row]![row]! += RIDGE * count;
  return solveLinear(rows);
}

function clip(
  flux: Float64Array,
  explained: Float64Array,
  level: number,
  used: Uint8Array,
  first: number,
  scratch: Float64Array,
): number {
  const off = (i: number): number => Math.abs(flux[first + i]! - level - explained[first + i]!);
  let count = 0;
  for (let i = 0; i < used.length; i += 1) if (used[i] === 1) scratch[count++] = off(i);
  const limit = CLIP_SIGMA * MAD_TO_SIGMA * medianInPlace(scratch, count);
  let clipped = 0;
  for (let i = 0; i < used.length; i += 1) {
    if (used[i] === 0 || !(limit > 0) || off(i) <= limit) continue;
    used[i] = 0;
    clipped += 1;
  }
  return clipped;
}
