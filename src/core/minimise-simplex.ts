/** Reflection, expansion, contraction and shrinkage of Nelder & Mead (1965). */
const [REFLECT, EXPAND, CONTRACT, SHRINK] = [1, 2, 0.5, 0.5];

interface Corner {
  readonly at: Float64Array;
  readonly value: number;
}

/**
 * A local minimum of a function of a few numbers, without its derivatives. Where the function is infinite is out of
 * bounds.
 *
 * @param start length m; @param steps length m, the size of the first simplex along each number
 * @param tolerance the spread of the simplex's values at which it stops; at the latest after 200 m steps
 * Source: Nelder & Mead (1965), Computer J. 7, 308.
 */
export function minimiseSimplex(
  evaluate: (at: Float64Array) => number,
  start: ArrayLike<number>,
  steps: ArrayLike<number>,
  tolerance: number,
): Corner {
  const first = Float64Array.from(start);
  const corner = (at: Float64Array): Corner => ({ at, value: evaluate(at) });
  const corners = [corner(first)];
  for (let i = 0; i < first.length; i += 1)
    corners.push(corner(first.map((value, j) => (i === j ? value + steps[i]! : value))));
  for (let round = 0; round < 200 * first.length; round += 1) {
    corners.sort((a, b) => a.value - b.value);
    if (corners.at(-1)!.value - corners[0]!.value <= tolerance) break;
    moveWorst(corners, corner);
  }
  return corners.sort((a, b) => a.value - b.value)[0]!;
}

/** @param corners best first */
function moveWorst(corners: Corner[], corner: (at: Float64Array) => Corner): void {
  const worst = corners.at(-1)!;
  const centre = centreOf(corners.slice(0, -1));
  const along = (factor: number): Corner =>
    corner(centre.map((middle, j) => middle + factor * (middle - worst.at[j]!)));
  const reflected = along(REFLECT);
  if (reflected.value < corners[0]!.value) {
    const expanded = along(EXPAND);
    corners[corners.length - 1] = expanded.value < reflected.value ? expanded : reflected;
    return;
  }
  if (reflected.value < corners.at(-2)!.value) {
    corners[corners.length - 1] = reflected;
    return;
  }
  const contracted = along(reflected.value < worst.value ? CONTRACT : -CONTRACT);
  if (contracted.value < Math.min(reflected.value, worst.value)) corners[corners.length - 1] = contracted;
  else shrink(corners, corner);
}

function centreOf(corners: readonly Corner[]): Float64Array {
  return corners[0]!.at.map((_, j) => corners.reduce((sum, { at }) => sum + at[j]! / corners.length, 0));
}

function shrink(corners: Corner[], corner: (at: Float64Array) => Corner): void {
  const best = corners[0]!.at;
  for (let i = 1; i < corners.length; i += 1)
    corners[i] = corner(corners[i]!.at.map((value, j) => best[j]! + SHRINK * (value - best[j]!)));
}
