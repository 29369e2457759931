/**
 * Signal detection efficiency of each trial: (SR - mean SR) / sd SR over the periodogram, sd with N in the
 * denominator. SR is the depth S/N over the root of the total weight, the same factor at every period, so the S/N may
 * be handed in its place. Source: Kovács, Zucker & Mazeh (2002), A&A 391, 369, eqs. 5 and 6.
 *
 * @returns zero everywhere when SR does not vary
 */
export function detectionEfficiency(residue: Float64Array): Float64Array {
  const n = residue.length;
  let mean = 0;
  for (let i = 0; i < n; i += 1) mean += residue[i]! / n;
  let variance = 0;
  for (let i = 0; i < n; i += 1) variance += (residue[i]! - mean) ** 2 / n;
  const perSigma = variance > 0 ? 1 / Math.sqrt(variance) : 0;
  return residue.map((value) => (value - mean) * perSigma);
}
