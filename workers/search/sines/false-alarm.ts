import { logGamma } from '../../../src/core/log-gamma.ts';

/** What a periodogram's false alarms depend on. */
export interface PeriodogramSize {
  readonly points: number;
  readonly highestPerDay: number;
  /** Weighted variance of the times, days squared. */
  readonly timeVariance: number;
}

/**
 * Probability that white noise makes so high a peak anywhere up to the highest frequency, an upper bound that is
 * sharp where it is small. Standard normalisation, floating mean.
 * Source: Baluev (2008), MNRAS 385, 1279, eqs. 5-6 and table 1.
 *
 * @param power 0 to 1
 */
export function sineFalseAlarm(power: number, { points, highestPerDay, timeVariance }: PeriodogramSize): number {
  if (points < 4) return 1;
  const rest = Math.max(0, 1 - power);
  const gamma = Math.sqrt(2 / (points - 1)) * Math.exp(logGamma((points - 1) / 2) - logGamma((points - 2) / 2));
  const width = highestPerDay * Math.sqrt(4 * Math.PI * timeVariance);
  const tau = gamma * width * rest ** ((points - 4) / 2) * Math.sqrt(((points - 1) * power) / 2);
  const single = rest ** ((points - 3) / 2);
  // 1 - (1 - single) exp(-tau), without losing small probabilities.
  return Math.min(1, -Math.expm1(Math.log1p(-Math.min(single, 1)) - tau));
}

/** The power that white noise reaches with this probability. */
export function sineLevel(probability: number, size: PeriodogramSize): number {
  let low = 0;
  let high = 1;
  for (let step = 0; step < 60; step += 1) {
    const middle = (low + high) / 2;
    if (sineFalseAlarm(middle, size) > probability) low = middle;
    else high = middle;
  }
  return high;
}
