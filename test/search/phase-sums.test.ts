import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makePhaseSums, sumByPhase } from '../../workers/search/phase-sums.ts';
import { seedRandom } from '../reference/search/seeded-series.ts';

/** The sum in each phase bin, point by point. */
function sumLiterally(time: Float64Array, values: Float64Array, period: number, bins: number): number[] {
  const sums: number[] = new Array(bins).fill(0);
  time.forEach((at, i) => {
    const cycles = (at - time[0]!) / period;
    const bin = Math.floor((cycles - Math.floor(cycles)) * bins) % bins;
    sums[bin] = sums[bin]! + values[i]!;
  });
  return sums;
}

describe('sums by phase', () => {
  // Few bins a cycle and many points take the way over edges; many bins the way over points.
  it.each([
    ['dense', 2000, 40],
    ['thin', 300, 3000],
  ])('are those of the points, and go on past the period: %s', (_, points, bins) => {
    const seed = fc.integer({ min: 1, max: 1e6 });
    const period = fc.double({ min: 0.3, max: 15, noNaN: true });
    fc.assert(
      fc.property(seed, period, fc.boolean(), (from, periodDays, hasGap) => {
        const random = seedRandom(from);
        const even = Float64Array.from({ length: points }, () => random.uniform() * 20).sort();
        const time = hasGap ? even.map((at) => (at > 7 ? at + 31 : at)) : even;
        const weight = time.map(() => 0.5 + random.uniform());
        const weighted = time.map(() => random.normal());
        const work = makePhaseSums(time, weight, weighted);
        const longest = Math.floor(bins / 4);
        sumByPhase(work, periodDays, bins, longest);
        [weight, weighted].forEach((values, offset) => {
          const expected = sumLiterally(time, values, periodDays, bins);
          let worst = 0;
          for (let bin = 0; bin < bins + longest; bin += 1) {
            const sum = work.sums[2 * (bin + 1) + offset]! - work.sums[2 * bin + offset]!;
            worst = Math.max(worst, Math.abs(sum - expected[bin % bins]!));
          }
          expect(worst).toBeLessThan(1e-8);
        });
      }),
      { numRuns: 30, seed: 7 },
    );
  });
});
