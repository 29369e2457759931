const GOLDEN = (3 - Math.sqrt(5)) / 2;
const MOST_STEPS = 60;

interface Place {
  readonly x: number;
  readonly value: number;
}

/**
 * The maximum of a smooth function inside a bracket, by parabolas and golden sections.
 * Source: Brent (1973), Algorithms for Minimization without Derivatives, chapter 5.
 *
 * @param middle inside the bracket, the highest place known
 * @param tolerance of x
 */
export function highestBetween(
  valueAt: (x: number) => number,
  { low, middle, high }: { readonly low: number; readonly middle: number; readonly high: number },
  tolerance: number,
): Place {
  const look = (x: number): Place => ({ x, value: valueAt(x) });
  let [left, right] = [low, high];
  let best = look(middle);
  let [second, third] = [best, best];
  let move = 0;
  let earlier = 0;
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const centre = (left + right) / 2;
    if (Math.abs(best.x - centre) <= 2 * tolerance - (right - left) / 2) break;
    const parabola = vertexMove(best, second, third);
    const isInside = best.x + parabola > left + tolerance && best.x + parabola < right - tolerance;
    const isShrinking = Math.abs(parabola) < Math.abs(earlier) / 2;
    const across = best.x < centre ? right - best.x : left - best.x;
    [earlier, move] = isInside && isShrinking ? [move, parabola] : [across, GOLDEN * across];
    const next = look(best.x + (Math.abs(move) >= tolerance ? move : Math.sign(move) * tolerance));
    if (next.value >= best.value) {
      if (next.x >= best.x) left = best.x;
      else right = best.x;
      [best, second, third] = [next, best, second];
      continue;
    }
    if (next.x < best.x) left = next.x;
    else right = next.x;
    if (next.value >= second.value || second === best) [second, third] = [next, second];
    else if (next.value >= third.value || third === best || third === second) third = next;
  }
  return best;
}

/** From the first place to the vertex of the parabola through three; NaN when they are not three. */
function vertexMove(a: Place, b: Place, c: Place): number {
  const r = (a.x - b.x) * (a.value - c.value);
  const q = (a.x - c.x) * (a.value - b.value);
  return -((a.x - c.x) * q - (a.x - b.x) * r) / (2 * (q - r));
}
