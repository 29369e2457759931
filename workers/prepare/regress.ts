import { MAD_TO_SIGMA, medianInPlace } from '../../src/core/robust-statistics.ts';
import { createOrthogonalBasis } from './orthogonal-basis.ts';

const CLIP_SIGMA = 4;
const MOST_ROUNDS = 5;
/** Points with weight for each coefficient: with fewer the columns would follow the noise. */
const POINTS_PER_COLUMN = 3;

/** Points first to end - 1 share one set of coefficients. */
export interface Group {
  readonly first: number;
  readonly end: number;
}

export interface Regression {
  /** What the columns explain, 0 in the mean of a group: as a part of the group's level or, on request, absolute. */
  readonly explained: Float64Array;
  /** Groups with too few points for their columns, left as they are. */
  readonly groupsLeft: number;
  /** In how many of the regressed groups each column only repeated the level or the columns before it. */
  readonly repeats: readonly number[];
}

/**
 * Linear least squares of the flux on a level and columns, a set of coefficients for each group, refitted without
 * points beyond 4 robust sigma. A column that repeats others is left out. A point that misses a column takes no part in
 * the fit, and is corrected by the columns that it has.
 *
 * @param flux relative, length n; @param columns each of length n, NaN where missing; @param hasWeight length n
 */
export function regressOn(
  flux: Float64Array,
  columns: readonly Float64Array[],
  hasWeight: Uint8Array,
  groups: readonly Group[],
  isAbsolute = false,
): Regression {
  const explained = new Float64Array(flux.length);
  const repeats = columns.map(() => 0);
  let groupsLeft = 0;
  for (const { first, end } of groups) {
    const own = columns.map((column) => column.slice(first, end));
    const used = usedOf(flux.subarray(first, end), own, hasWeight.subarray(first, end));
    const points = used.reduce((sum, value) => sum + value, 0);
    if (points < POINTS_PER_COLUMN * (columns.length + 1)) groupsLeft += 1;
    else {
      const { fitted, isNew } = fitGroup(flux.subarray(first, end), own, used);
      for (const [c, own] of isNew.entries()) if (!own) repeats[c] = repeats[c]! + 1;
      const level = meanOf(fitted, used);
      for (let i = first; i < end; i += 1)
        explained[i] = isAbsolute ? fitted[i - first]! - level : fitted[i - first]! / level - 1;
    }
  }
  return { explained, groupsLeft, repeats };
}

function usedOf(flux: Float64Array, columns: readonly Float64Array[], hasWeight: Uint8Array): Uint8Array {
  return hasWeight.map((own, i) =>
    own === 1 && Number.isFinite(flux[i]!) && columns.every((column) => Number.isFinite(column[i]!)) ? 1 : 0,
  );
}

/** @param used written over: 0 at clipped points. @returns the fit at every point, and which columns took part */
function fitGroup(flux: Float64Array, columns: readonly Float64Array[], used: Uint8Array) {
  const all = used.slice();
  const centred = columns.map((column) => centre(column, used));
  for (let round = 1; ; round += 1) {
    const basis = createOrthogonalBasis(used);
    basis.add(new Float64Array(flux.length).fill(1));
    const isNew = centred.map((column) => basis.add(column));
    const fitted = basis.fit(flux);
    if (round === MOST_ROUNDS || !clip(flux, fitted, all, used)) return { fitted, isNew };
  }
}

/** Less its mean over the used points, so that a missing value counts as the mean and large offsets cost no digits. */
function centre(column: Float64Array, used: Uint8Array): Float64Array {
  const mean = meanOf(column, used);
  return column.map((value) => (Number.isFinite(value) ? value - mean : 0));
}

function meanOf(values: Float64Array, used: Uint8Array): number {
  let [sum, count] = [0, 0];
  for (let i = 0; i < values.length; i += 1) {
    if (used[i] === 0) continue;
    sum += values[i]!;
    count += 1;
  }
  return sum / count;
}

/** Judges all points anew. @returns whether any changed its place */
function clip(flux: Float64Array, fitted: Float64Array, all: Uint8Array, used: Uint8Array): boolean {
  const off = new Float64Array(flux.length);
  let count = 0;
  for (let i = 0; i < flux.length; i += 1) if (all[i] === 1) off[count++] = Math.abs(flux[i]! - fitted[i]!);
  const limit = CLIP_SIGMA * MAD_TO_SIGMA * medianInPlace(off, count);
  if (!(limit > 0)) return false;
  let changed = false;
  for (let i = 0; i < flux.length; i += 1) {
    const next = all[i] === 1 && Math.abs(flux[i]! - fitted[i]!) <= limit ? 1 : 0;
    if (next !== used[i]) changed = true;
    used[i] = next;
  }
  return changed;
}
