import type { ClipSide } from '../../src/core/recipe.ts';
import { MAD_TO_SIGMA, medianInPlace } from '../../src/core/robust-statistics.ts';

const MOST_ROUNDS = 10;

/**
 * Leaves out points beyond `sigma` robust standard deviations (1.4826 MAD) of the median of those still kept, anew
 * until none is left to drop.
 *
 * @param values detrended flux, length n
 * @param kept length n, 1 where kept; set to 0 in place where clipped
 * @param spared length n, 1 where a point is never clipped
 * @returns how many were clipped
 */
export function clipBySigma(
  values: Float64Array,
  kept: Uint8Array,
  spared: Uint8Array,
  side: ClipSide,
  sigma: number,
): number {
  const scratch = new Float64Array(values.length);
  let total = 0;
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const [centre, limit] = limitsOf(values, kept, scratch, sigma);
    let clipped = 0;
    for (let i = 0; i < values.length; i += 1) {
      if (kept[i] === 0 || spared[i] === 1 || !isBeyond(values[i]! - centre, limit, side)) continue;
      kept[i] = 0;
      clipped += 1;
    }
    total += clipped;
    if (clipped === 0) break;
  }
  return total;
}

function limitsOf(
  values: Float64Array,
  kept: Uint8Array,
  scratch: Float64Array,
  sigma: number,
): [centre: number, limit: number] {
  let count = 0;
  for (let i = 0; i < values.length; i += 1) if (kept[i] === 1) scratch[count++] = values[i]!;
  const centre = medianInPlace(scratch, count);
  for (let i = 0; i < count; i += 1) scratch[i] = Math.abs(scratch[i]! - centre);
  return [centre, sigma * MAD_TO_SIGMA * medianInPlace(scratch, count)];
}

function isBeyond(deviation: number, limit: number, side: ClipSide): boolean {
  // With half the points equal the scatter is zero and says nothing.
  if (!(limit > 0)) return false;
  if (side === 'high') return deviation > limit;
  if (side === 'low') return deviation < -limit;
  return Math.abs(deviation) > limit;
}
