/**
 * Adjusted p-values: the smallest false-discovery rate at which each would be among the discoveries.
 * Source: Benjamini & Hochberg (1995), J. R. Stat. Soc. B 57, 289, section 3.1.
 *
 * @param probabilities length n, any order @returns length n, in the same order, at most 1
 */
export function falseDiscoveryRates(probabilities: readonly number[]): number[] {
  const n = probabilities.length;
  const order = [...probabilities.keys()].sort((a, b) => probabilities[b]! - probabilities[a]!);
  const rates = new Array<number>(n);
  let least = 1;
  for (const [place, index] of order.entries()) {
    least = Math.min(least, (probabilities[index]! * n) / (n - place));
    rates[index] = least;
  }
  return rates;
}

/** How many of n noise-only searches reach a false-alarm probability as low as this, on average. */
export const expectedFalseAlarms = (searched: number, probability: number): number => searched * probability;
