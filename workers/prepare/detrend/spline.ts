import { MAD_TO_SIGMA, medianInPlace } from '../../../src/core/robust-statistics.ts';
import { fitByPieces, LEAST_MEMBERS, type PiecePoints } from './fit-by-pieces.ts';
import { addBending, basisAt, evaluateSpline, intervalOf, type Knots, ORDER, solveBands } from './spline-basis.ts';
import type { Detrender } from './trend-input.ts';

const CLIP_SIGMA = 3;
const MOST_ROUNDS = 10;
/** B-splines in one `knotDays`: enough that the penalty alone, and not the basis, limits what is followed. */
const INTERVALS_PER_SCALE = 4;

/**
 * A penalised cubic spline: least squares with a penalty on the integral of the squared second derivative (O'Sullivan
 * 1986, Stat. Sci. 1, 502), on B-splines four to a `knotDays`, refitted without points beyond 3 robust sigma, low and
 * high, until no more change. The penalty is set so that a sine of period 2 `knotDays`, the shortest that knots
 * `knotDays` apart could carry, keeps half of its amplitude: a sine of angular frequency w keeps 1 / (1 + penalty
 * w^4 / points per day) of it (Silverman 1984, Ann. Stat. 12, 898).
 */
export const spline: Detrender<'spline'> = {
  scaleDays: ({ knotDays }) => knotDays,
  scaleName: 'knot distance',
  leastCadences: () => LEAST_MEMBERS,
  fit: ({ knotDays }, input) => fitByPieces(input, knotDays, (piece) => fillSpline(piece, knotDays)),
};

export function fillSpline(piece: PiecePoints, knotDays: number, mostRounds: number = MOST_ROUNDS): true {
  const { time, memberTime, memberFlux, trend } = piece;
  const length = time.at(-1)! - time[0]!;
  const intervals = Math.max(1, Math.ceil((length / knotDays) * INTERVALS_PER_SCALE));
  const knots = { start: time[0]!, width: length / intervals || 1, intervals };
  const penalty = penaltyOf(memberTime, knotDays);
  const used = new Uint8Array(memberTime.length).fill(1);
  let coefficients: Float64Array | undefined;
  for (let round = 0; round < mostRounds; round += 1) {
    const next = fitCoefficients(memberTime, memberFlux, used, knots, penalty);
    if (next === undefined) break;
    coefficients = next;
    if (!clip(memberTime, memberFlux, coefficients, knots, used)) break;
  }
  if (coefficients === undefined) return true;
  const basis = new Float64Array(ORDER);
  for (let i = 0; i < time.length; i += 1) {
    // Beyond its points a spline runs straight on, and away.
    if (time[i]! < memberTime[0]! || time[i]! > memberTime.at(-1)!) continue;
    trend[i] = evaluateSpline(coefficients, knots, time[i]!, basis);
  }
  return true;
}

/** In days^3, for points of weight 1; the points per day are those of the usual distance between neighbours. */
export function penaltyOf(memberTime: Float64Array, knotDays: number): number {
  const steps = new Float64Array(memberTime.length - 1);
  for (let i = 0; i < steps.length; i += 1) steps[i] = memberTime[i + 1]! - memberTime[i]!;
  const mean = (memberTime.at(-1)! - memberTime[0]!) / Math.max(1, steps.length);
  const cadenceDays = medianInPlace(steps) || mean || knotDays;
  return (knotDays / Math.PI) ** 4 / cadenceDays;
}

/** Undefined where the points do not hold the spline. */
function fitCoefficients(
  time: Float64Array,
  flux: Float64Array,
  used: Uint8Array,
  knots: Knots,
  penalty: number,
): Float64Array | undefined {
  const right = new Float64Array(knots.intervals + ORDER - 1);
  const bands = new Float64Array(right.length * ORDER);
  const basis = new Float64Array(ORDER);
  const level = flux[0]!;
  for (let i = 0; i < time.length; i += 1) {
    if (used[i] === 0) continue;
    const place = (time[i]! - knots.start) / knots.width;
    const interval = intervalOf(place, knots.intervals);
    basisAt(place - interval, basis);
    for (let row = 0; row < ORDER; row += 1) {
      right[interval + row] = right[interval + row]! + basis[row]! * (flux[i]! - level);
      for (let column = row; column < ORDER; column += 1) {
        const at = (interval + row) * ORDER + column - row;
        bands[at] = bands[at]! + basis[row]! * basis[column]!;
      }
    }
  }
  addBending(bands, knots, penalty);
  return solveBands(bands, right)?.map((value) => value + level);
}

/** Judges every member anew against the spline. @returns whether any changed its place */
function clip(
  time: Float64Array,
  flux: Float64Array,
  coefficients: Float64Array,
  knots: Knots,
  used: Uint8Array,
): boolean {
  const basis = new Float64Array(ORDER);
  const off = time.map((at, i) => Math.abs(flux[i]! - evaluateSpline(coefficients, knots, at, basis)));
  const limit = CLIP_SIGMA * MAD_TO_SIGMA * medianInPlace(off.slice());
  if (!(limit > 0)) return false;
  let changed = false;
  for (let i = 0; i < time.length; i += 1) {
    const next = off[i]! <= limit ? 1 : 0;
    if (next !== used[i]) changed = true;
    used[i] = next;
  }
  return changed;
}
