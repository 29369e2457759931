import { describe, expect, it } from 'vitest';
import { makeBoxSeries, searchBox } from './search-box.ts';

/** Another place between the points for each seed: at high S/N that is what is left to chance. */
const truthOf = (seed: number) => ({
  periodDays: 3.3017 + 0.00037 * seed,
  epochDays: 101.1037 + 0.00411 * seed,
  durationDays: 0.1613 + 0.00023 * seed,
});

/** Root mean square of (found - true) / error over simulated series: 1 for perfect errors. */
async function pulls(depth: number, seeds: number): Promise<{ epoch: number; period: number }> {
  let epoch = 0;
  let period = 0;
  for (let seed = 1; seed <= seeds; seed += 1) {
    const sampling = { points: 4000, cadenceDays: 1 / 150, sigma: 0.001 };
    const truth = truthOf(seed);
    const series = makeBoxSeries(seed * 977, sampling, [{ ...truth, depth }]);
    const peak = (await searchBox(series, { shortestPeriodDays: 3.2, longestPeriodDays: 3.4 })).peaks[0]!;
    const cycles = Math.round((peak.epochDays - truth.epochDays) / truth.periodDays);
    epoch += ((peak.epochDays - truth.epochDays - cycles * truth.periodDays) / peak.epochErrorDays) ** 2 / seeds;
    period += ((peak.periodDays - truth.periodDays) / peak.periodErrorDays) ** 2 / seeds;
  }
  return { epoch: Math.sqrt(epoch), period: Math.sqrt(period) };
}

/** Against scatter simulated here: the boxes have sharp edges, so the term for a sloped ingress is to spare. */
describe('errors of epoch and period', () => {
  it.each([
    ['weak', 0.0009],
    ['strong', 0.004],
  ])('are within a factor of 1.8 of the scatter of %s boxes', async (_, depth) => {
    const { epoch, period } = await pulls(depth, 30);
    for (const pull of [epoch, period]) {
      expect(pull).toBeGreaterThan(1 / 1.8);
      expect(pull).toBeLessThan(1.8);
    }
  });
});
