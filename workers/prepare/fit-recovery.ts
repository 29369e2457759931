import { MAD_TO_SIGMA, medianInPlace } from '../../src/core/robust-statistics.ts';
import { createOrthogonalBasis } from './orthogonal-basis.ts';

/** The recovery is looked at for so long, with a straight line under it. */
const LOOK_DAYS = 3;
/** Time scales tried, from the shortest to half of what is looked at, even in the logarithm. */
const TRIALS = 24;
const SHORTEST_DAYS = 0.02;
const SHORTEST_CADENCES = 2;
const CLIP_SIGMA = 4;
const LEAST_POINTS = 20;
/** An exponential must lower the sum of squares by so many of the variance of a point. */
const LEAST_GAIN = 25;
/** Its height against the fall: what is far from it is the star's variation. */
const HEIGHTS = [0.3, 1.5] as const;

export interface Recovery {
  readonly decayDays: number;
  /** What is missing right after the drop, and the level that it is missing from, in the unit of flux. */
  readonly height: number;
  readonly level: number;
}

/**
 * The exponential recovery after a sudden drop: least squares of a line less an exponential, the best of a row of time
 * scales, refitted without points beyond 4 robust sigma.
 *
 * @param time days from the drop on, ascending; @param flux relative; @param hasWeight of each point
 * @param fall of the drop, in the unit of flux
 * @returns undefined where no exponential of about the drop's depth is seen: the flux stays down, or varies
 */
export function fitRecovery(
  time: Float64Array,
  flux: Float64Array,
  hasWeight: Uint8Array,
  fall: number,
  cadenceDays: number,
): Recovery | undefined {
  const since = time.map((at) => at - time[0]!).filter((days) => days <= LOOK_DAYS);
  const used = hasWeight.slice(0, since.length);
  if (used.reduce((sum, own) => sum + own, 0) < LEAST_POINTS) return undefined;
  const near = flux.subarray(0, since.length);
  const scales = scalesTo(since.at(-1)! / 2, Math.max(SHORTEST_DAYS, SHORTEST_CADENCES * cadenceDays));
  const first = bestOf(scales, since, near, used);
  if (first === undefined) return undefined;
  clip(first.residual, used);
  const best = bestOf(scales, since, near, used)!;
  const plain = fitWith(undefined, since, near, used);
  const points = used.reduce((sum, own) => sum + own, 0);
  const isSeen = plain.squares - best.squares > (LEAST_GAIN * best.squares) / points;
  if (!isSeen || best.height < HEIGHTS[0] * fall || best.height > HEIGHTS[1] * fall) return undefined;
  return { decayDays: best.decayDays!, height: best.height, level: best.level };
}

function scalesTo(longest: number, shortest: number): number[] {
  if (!(longest > shortest)) return [];
  return Array.from({ length: TRIALS }, (_, i) => shortest * (longest / shortest) ** (i / (TRIALS - 1)));
}

interface Fit {
  readonly decayDays: number | undefined;
  readonly squares: number;
  readonly residual: Float64Array;
  /** Of the exponential, downward, and of the line, at the drop. */
  readonly height: number;
  readonly level: number;
}

function bestOf(scales: readonly number[], since: Float64Array, flux: Float64Array, used: Uint8Array) {
  return scales
    .map((decayDays) => fitWith(decayDays, since, flux, used))
    .reduce<Fit | undefined>((best, fit) => (best === undefined || fit.squares < best.squares ? fit : best), undefined);
}

function fitWith(decayDays: number | undefined, since: Float64Array, flux: Float64Array, used: Uint8Array): Fit {
  // The exponential last: the part of it that no line takes is then its own.
  const basis = createOrthogonalBasis(used);
  basis.add(new Float64Array(since.length).fill(1));
  basis.add(since);
  const line = basis.fit(flux);
  const decay = since.map((days) => (decayDays === undefined ? 0 : -Math.exp(-days / decayDays)));
  const own = basis.fit(decay);
  basis.add(decay);
  const fitted = basis.fit(flux);
  // fitted = line + height (decay - own), compared where decay and own differ most.
  let at = 0;
  for (let i = 0; i < since.length; i += 1) if (Math.abs(decay[i]! - own[i]!) > Math.abs(decay[at]! - own[at]!)) at = i;
  const height = (fitted[at]! - line[at]!) / (decay[at]! - own[at]! || 1);
  const residual = flux.map((value, i) => value - fitted[i]!);
  const squares = residual.reduce((sum, value, i) => sum + (used[i] === 1 ? value * value : 0), 0);
  return { decayDays, squares, residual, height, level: line[0]! - height * own[0]! };
}

function clip(residual: Float64Array, used: Uint8Array): void {
  const off = residual.map(Math.abs);
  const limit = CLIP_SIGMA * MAD_TO_SIGMA * medianInPlace(off.filter((_, i) => used[i] === 1));
  for (let i = 0; i < off.length; i += 1) if (limit > 0 && off[i]! > limit) used[i] = 0;
}
