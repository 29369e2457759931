import { median, robustSigma } from '../../src/core/robust-statistics.ts';

/** Trials in one window of the running level: wide against a peak, narrow against the trend. */
const WINDOW_TRIALS = 401;
const NODES_PER_WINDOW = 2;
/** The scatter of a window is not taken under this part of the whole periodogram's. */
const LEAST_SCATTER = 0.25;

/**
 * Efficiency of each trial after the periodogram's own slow trend in period is taken out and its scatter made equal:
 * (SR - running median) / running robust scatter, both over 401 neighbouring trials. A definition of our own; the
 * signal detection efficiency of Kovács, Zucker & Mazeh (2002) has one mean and one scatter for all periods.
 *
 * @param residue SR or anything proportional to it, in the order of the trials, length n
 * @returns length n; zero everywhere when SR does not vary
 */
export function levelEfficiency(residue: Float64Array): Float64Array {
  const n = residue.length;
  const floor = LEAST_SCATTER * robustSigma(residue);
  if (!(floor > 0)) return new Float64Array(n);
  const step = Math.max(1, Math.floor(WINDOW_TRIALS / NODES_PER_WINDOW));
  const nodes = Array.from({ length: Math.ceil((n - 1) / step) + 1 }, (_, i) => Math.min(n - 1, i * step));
  const levels = nodes.map((node) => levelAround(residue, node, floor));
  return residue.map((value, trial) => {
    const at = Math.min(nodes.length - 2, Math.floor(trial / step));
    if (at < 0) return (value - levels[0]!.middle) / levels[0]!.scatter;
    const part = (trial - nodes[at]!) / (nodes[at + 1]! - nodes[at]!);
    const between = (key: 'middle' | 'scatter') => levels[at]![key] + part * (levels[at + 1]![key] - levels[at]![key]);
    return (value - between('middle')) / between('scatter');
  });
}

function levelAround(residue: Float64Array, node: number, floor: number): { middle: number; scatter: number } {
  const half = WINDOW_TRIALS >> 1;
  const start = Math.max(0, Math.min(node - half, residue.length - WINDOW_TRIALS));
  const window = residue.slice(start, start + WINDOW_TRIALS);
  return { middle: median(window), scatter: Math.max(floor, robustSigma(window)) };
}
