import { MAD_TO_SIGMA, medianInPlace } from '../../../src/core/robust-statistics.ts';
import { bridgeTrend } from './bridge-trend.ts';
import { type Piece, piecesOf } from './pieces.ts';
import type { TrendInput } from './trend-input.ts';

const CLIP_SIGMA = 3;
const MOST_ROUNDS = 6;
/** Of second differences, against the points of one knot interval: bridges empty intervals, bends nothing else. */
const PENALTY = 1e-4;
const ORDER = 4;

/**
 * A cubic spline of least squares with knots every `knotDays` and a light penalty on its second differences (P-spline,
 * Eilers & Marx 1996, Stat. Sci. 11, 89), refitted without points beyond 3 robust sigma on either side until none is
 * left to drop. Features much shorter than the distance of knots are not followed. Pieces end at splits and at gaps
 * longer than the distance of knots.
 *
 * @returns length n, in the unit of flux; 1 everywhere where no piece has points
 */
export function fitSplineTrend(input: TrendInput, knotDays: number): Float64Array {
  const { time, splits } = input;
  const trend = new Float64Array(time.length).fill(Number.NaN);
  for (const piece of piecesOf(time, splits, knotDays)) fitPiece(input, piece, knotDays, trend);
  bridgeTrend(time, trend);
  return trend;
}

function fitPiece({ time, flux, hasWeight }: TrendInput, { first, end }: Piece, knotDays: number, trend: Float64Array) {
  const used = hasWeight.slice(first, end);
  const start = time[first]!;
  const intervals = Math.max(1, Math.round((time[end - 1]! - start) / knotDays));
  const width = (time[end - 1]! - start) / intervals || 1;
  const scratch = new Float64Array(end - first);
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const coefficients = fitCoefficients(time, flux, used, { first, end }, { start, width, intervals });
    if (coefficients === undefined) return;
    for (let i = first; i < end; i += 1) trend[i] = evaluate(coefficients, (time[i]! - start) / width, intervals);
    if (clip(flux, trend, used, first, scratch) === 0) return;
  }
}

interface Knots {
  readonly start: number;
  readonly width: number;
  readonly intervals: number;
}

/** Values of the four cubic B-splines at a place in an interval, 0 to 1. de Boor (1978), A Practical Guide to Splines. */
function basisAt(x: number, into: Float64Array): void {
  const rest = 1 - x;
  into[0] = (rest * rest * rest) / 6;
  into[1] = (3 * x * x * x - 6 * x * x + 4) / 6;
  into[2] = (3 * rest * rest * rest - 6 * rest * rest + 4) / 6;
  into[3] = (x * x * x) / 6;
}

const intervalOf = (place: number, intervals: number): number =>
  Math.max(0, Math.min(intervals - 1, Math.floor(place)));

function evaluate(coefficients: Float64Array, place: number, intervals: number): number {
  const interval = intervalOf(place, intervals);
  const basis = new Float64Array(ORDER);
  basisAt(place - interval, basis);
  let sum = 0;
  for (let k = 0; k < ORDER; k += 1) sum += basis[k]! * coefficients[interval + k]!;
  return sum;
}

/** Normal equations in bands of four, with the penalty; undefined where there are no points. */
function fitCoefficients(
  time: Float64Array,
  flux: Float64Array,
  used: Uint8Array,
  { first, end }: Piece,
  { start, width, intervals }: Knots,
): Float64Array | undefined {
  const count = intervals + ORDER - 1;
  const bands = new Float64Array(count * ORDER);
  const right = new Float64Array(count);
  const basis = new Float64Array(ORDER);
  let points = 0;
  for (let i = first; i < end; i += 1) {
    if (used[i - first] === 0) continue;
    points += 1;
    const place = (time[i]! - start) / width;
    const interval = intervalOf(place, intervals);
    basisAt(place - interval, basis);
    for (let row = 0; row < ORDER; row += 1) {
      right[interval + row]! += basis[row]! * flux[i]!;
      for (let column = row; column < ORDER; column += 1)
        bands[(interval + row) * ORDER + column - row]! += basis[row]! * basis[column]!;
    }
  }
  if (points < ORDER) return undefined;
  addPenalty(bands, count, (PENALTY * points) / intervals);
  return solveBands(bands, right, count);
}

function addPenalty(bands: Float64Array, count: number, strength: number): void {
  const difference = [1, -2, 1];
  for (let i = 0; i + 2 < count; i += 1)
    for (let row = 0; row < 3; row += 1)
      for (let column = row; column < 3; column += 1)
        bands[(i + row) * ORDER + column - row]! += strength * difference[row]! * difference[column]!;
}

/** Cholesky's factors of a symmetric matrix of which each row holds its diagonal and the three entries right of it. */
function solveBands(bands: Float64Array, right: Float64Array, count: number): Float64Array | undefined {
  for (let row = 0; row < count; row += 1) {
    const pivot = bands[row * ORDER]!;
    if (!(pivot > 0)) return undefined;
    for (let k = 1; k < ORDER && row + k < count; k += 1) {
      const factor = bands[row * ORDER + k]! / pivot;
      for (let column = k; column < ORDER; column += 1)
        bands[(row + k) * ORDER + column - k]! -= factor * bands[row * ORDER + column]!;
      right[row + k]! -= factor * right[row]!;
    }
  }
  for (let row = count - 1; row >= 0; row -= 1) {
    let sum = right[row]!;
    for (let k = 1; k < ORDER && row + k < count; k += 1) sum -= bands[row * ORDER + k]! * right[row + k]!;
    right[row] = sum / bands[row * ORDER]!;
  }
  return right;
}

function clip(flux: Float64Array, trend: Float64Array, used: Uint8Array, first: number, scratch: Float64Array): number {
  let count = 0;
  for (let i = 0; i < used.length; i += 1)
    if (used[i] === 1) scratch[count++] = Math.abs(flux[first + i]! - trend[first + i]!);
  const limit = CLIP_SIGMA * MAD_TO_SIGMA * medianInPlace(scratch, count);
  let clipped = 0;
  for (let i = 0; i < used.length; i += 1) {
    if (used[i] === 0 || !(limit > 0) || Math.abs(flux[first + i]! - trend[first + i]!) <= limit) continue;
    used[i] = 0;
    clipped += 1;
  }
  return clipped;
}
