import type { Checkpoint } from '../checkpoint.ts';

const MOST_SWEEPS = 30;
/** Of the off-diagonal entries against the diagonal: rounding. */
const CONVERGED = 1e-14;

export interface PrincipalModes {
  /** Each of zero mean and unit scatter, strongest first. */
  readonly modes: readonly Float64Array[];
  /** Share of the rows' whole variance of each. */
  readonly explained: readonly number[];
  /** For each mode, the part of it that each row carries; their squares add up to 1. */
  readonly loadings: readonly Float64Array[];
}

/**
 * Principal components of rows (stars) of one length: eigenvectors of the rows' covariance by Jacobi's rotations, each
 * turned so that its loadings add up to more than 0.
 * Source: Golub & Van Loan (2013), Matrix Computations, section 8.5 (cyclic Jacobi).
 *
 * @param rows m of length n, without NaN; each is taken about its mean
 * @returns at most `count` modes, fewer where the rows have no more; undefined when cancelled
 */
export async function findPrincipalModes(
  rows: readonly Float64Array[],
  count: number,
  checkpoint: Checkpoint,
): Promise<PrincipalModes | undefined> {
  const centred = rows.map(centre);
  const covariance: Float64Array[] = [];
  for (const [i, row] of centred.entries()) {
    covariance.push(Float64Array.from(centred, (other, j) => (j < i ? covariance[j]![i]! : dot(row, other))));
    if (checkpoint.isDue() && !(await checkpoint.pause(covariance.length, 2 * rows.length))) return undefined;
  }
  const total = covariance.reduce((sum, row, i) => sum + row[i]!, 0);
  const vectors = await diagonalise(covariance, checkpoint);
  if (vectors === undefined) return undefined;
  const order = covariance.map((_, i) => i).sort((a, b) => covariance[b]![b]! - covariance[a]![a]!);
  const wanted = order.slice(0, count).filter((i) => covariance[i]![i]! > CONVERGED * total);
  const loadings = wanted.map((i) => turned(vectors.map((row) => row[i]!)));
  return {
    modes: loadings.map((loading) => combine(centred, loading)),
    explained: wanted.map((i) => covariance[i]![i]! / total),
    loadings,
  };
}

function centre(row: Float64Array): Float64Array {
  const mean = row.reduce((sum, value) => sum + value, 0) / row.length;
  return row.map((value) => value - mean);
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += a[i]! * b[i]!;
  return sum / a.length;
}

/** Makes a symmetric matrix diagonal in place. @returns its eigenvectors as columns; undefined when cancelled */
async function diagonalise(matrix: Float64Array[], checkpoint: Checkpoint): Promise<Float64Array[] | undefined> {
  const m = matrix.length;
  const vectors = matrix.map((_, i) => new Float64Array(m).fill(1, i, i + 1));
  for (let sweep = 0; sweep < MOST_SWEEPS; sweep += 1) {
    let rotations = 0;
    for (let p = 0; p < m - 1; p += 1) {
      for (let q = p + 1; q < m; q += 1) {
        const limit = CONVERGED * Math.sqrt(Math.abs(matrix[p]![p]! * matrix[q]![q]!));
        if (!(Math.abs(matrix[p]![q]!) > limit)) continue;
        rotate(matrix, vectors, p, q);
        rotations += 1;
      }
      if (checkpoint.isDue() && !(await checkpoint.pause(m, 2 * m))) return undefined;
    }
    if (rotations === 0) break;
  }
  return vectors;
}

/** Makes entry p, q zero. */
function rotate(matrix: Float64Array[], vectors: Float64Array[], p: number, q: number): void {
  const [rowP, rowQ] = [matrix[p]!, matrix[q]!];
  const slope = (rowQ[q]! - rowP[p]!) / (2 * rowP[q]!);
  const tangent = (slope >= 0 ? 1 : -1) / (Math.abs(slope) + Math.hypot(slope, 1));
  const cosine = 1 / Math.hypot(tangent, 1);
  const sine = tangent * cosine;
  for (let k = 0; k < matrix.length; k += 1) turnPair(matrix[k]!, p, q, cosine, sine);
  for (let k = 0; k < matrix.length; k += 1) {
    const [atP, atQ] = [rowP[k]!, rowQ[k]!];
    rowP[k] = cosine * atP - sine * atQ;
    rowQ[k] = sine * atP + cosine * atQ;
  }
  for (const vector of vectors) turnPair(vector, p, q, cosine, sine);
}

function turnPair(row: Float64Array, p: number, q: number, cosine: number, sine: number): void {
  const [atP, atQ] = [row[p]!, row[q]!];
  row[p] = cosine * atP - sine * atQ;
  row[q] = sine * atP + cosine * atQ;
}

function turned(loading: readonly number[]): Float64Array {
  const sum = loading.reduce((total, value) => total + value, 0);
  return Float64Array.from(loading, (value) => (sum < 0 ? -value : value));
}

function combine(rows: readonly Float64Array[], loading: Float64Array): Float64Array {
  const mode = new Float64Array(rows[0]!.length);
  for (const [r, row] of rows.entries())
    for (let i = 0; i < mode.length; i += 1) mode[i] = mode[i]! + loading[r]! * row[i]!;
  const scatter = Math.sqrt(dot(mode, mode));
  return mode.map((value) => value / scatter);
}
