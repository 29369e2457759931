import type { CorrelatedNoise } from '../../src/contract/search-contract.ts';
import { median, robustSigma } from '../../src/core/robust-statistics.ts';
import type { BoxWork } from './box-search.ts';

/** A window counts when it holds at least this part of the points of a typical one. */
const LEAST_FILLED = 0.5;
/** Fewer windows say nothing of their scatter. */
const LEAST_WINDOWS = 12;

/**
 * The scatter of means over windows of each duration beyond white noise: sigma_r^2 = (beta^2 - 1) v, with v the
 * typical variance of a mean from the errors alone, and beta the robust scatter (1.4826 MAD) of means over their own
 * white error. Windows stand one beside another in time; what a signal's events hold must have no weight.
 * Source: Pont, Zucker & Queloz (2006), MNRAS 373, 231, section 2.4, with a robust variance of our own.
 *
 * @param durationsDays ascending
 * @returns for those durations that have enough windows; sigma 0 where the noise is white
 */
export function measureCorrelatedNoise(work: BoxWork, durationsDays: readonly number[]): CorrelatedNoise {
  const measured = durationsDays.flatMap((durationDays) => {
    const sigma = sigmaAt(work, durationDays);
    return sigma === undefined ? [] : [{ durationDays, sigma }];
  });
  return {
    durationsDays: measured.map(({ durationDays }) => durationDays),
    sigma: measured.map(({ sigma }) => sigma),
  };
}

function sigmaAt(work: BoxWork, durationDays: number): number | undefined {
  const { means, variances, counts } = averageWindows(work, durationDays);
  const typical = median(Float64Array.from(counts.filter((count) => count > 0)));
  const kept = [...counts.keys()].filter((window) => counts[window]! >= Math.max(1, LEAST_FILLED * typical));
  if (kept.length < LEAST_WINDOWS) return undefined;
  const beta = robustSigma(Float64Array.from(kept, (window) => means[window]! / Math.sqrt(variances[window]!)));
  const variance = median(Float64Array.from(kept, (window) => variances[window]!));
  return Math.sqrt(Math.max(0, beta * beta - 1) * variance);
}

/** Weighted mean flux, its white variance and the number of points with weight of each window from the first on. */
function averageWindows({ elapsed, weight, weighted }: BoxWork, durationDays: number) {
  const n = weight.length;
  const windows = Math.floor(elapsed[n - 1]! / durationDays) + 1;
  const means = new Float64Array(windows);
  const weights = new Float64Array(windows);
  const counts = new Int32Array(windows);
  for (let i = 0; i < n; i += 1) {
    if (weight[i] === 0) continue;
    const window = Math.floor(elapsed[i]! / durationDays);
    means[window]! += weighted[i]!;
    weights[window]! += weight[i]!;
    counts[window]! += 1;
  }
  for (let window = 0; window < windows; window += 1) if (counts[window]! > 0) means[window]! /= weights[window]!;
  return { means, variances: weights.map((own) => 1 / own), counts };
}
