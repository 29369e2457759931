import { formatNumber } from '../core/number-format.ts';

/** Below it an extreme-value fit is an extrapolation far beyond its surrogates. */
const LEAST_PROBABILITY = 1e-4;

/** A false-alarm probability as the surrogates can bear it. */
export function chanceWords(probability: number): string {
  if (!Number.isFinite(probability)) return 'not known';
  if (probability < LEAST_PROBABILITY) return 'under 0.01 %';
  const percent = probability * 100;
  return `${formatNumber(percent, percent < 1 ? 2 : percent < 10 ? 1 : 0)} %`;
}
