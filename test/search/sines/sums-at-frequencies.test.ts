import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { runSteps } from '../../../workers/search/sines/steps.ts';
import { planSums, sumAtFrequencies, sumDirectly } from '../../../workers/search/sines/sums-at-frequencies.ts';

/** One sum, term by term. */
function sumOne(cycles: Float64Array, values: Float64Array, k: number) {
  let [real, imaginary] = [0, 0];
  for (let j = 0; j < cycles.length; j += 1) {
    const turns = k * cycles[j]!;
    const angle = 2 * Math.PI * (turns - Math.round(turns));
    real += values[j]! * Math.cos(angle);
    imaginary += values[j]! * Math.sin(angle);
  }
  return { real, imaginary };
}

const reach = fc.constantFrom(0.1, 0.5, 3, 40);
const draws = fc.array(
  fc.tuple(fc.double({ min: -1, max: 1, noNaN: true }), fc.double({ min: -1, max: 1, noNaN: true })),
  {
    minLength: 51,
    maxLength: 200,
  },
);

function largestError(rows: readonly (readonly [number, number])[], furthest: number, count: number, isFast: boolean) {
  const cycles = Float64Array.from(rows, ([x]) => x * furthest);
  const values = Float64Array.from(rows, ([, y]) => y);
  const size = values.reduce((sum, value) => sum + Math.abs(value), 1e-300);
  const sums = runSteps(
    isFast ? sumAtFrequencies(planSums(count), cycles, values) : sumDirectly(cycles, values, count),
  );
  let worst = 0;
  for (let k = 0; k <= count; k += Math.max(1, Math.floor(count / 40))) {
    const { real, imaginary } = sumOne(cycles, values, k);
    worst = Math.max(worst, Math.abs(sums.real[k]! - real) / size, Math.abs(sums.imaginary[k]! - imaginary) / size);
  }
  return worst;
}

describe('sums of phasors at evenly spaced frequencies', () => {
  it('are the sums term by term to 2e-9, for any places and numbers of frequencies', () => {
    const counts = fc.oneof(fc.integer({ min: 1, max: 70 }), fc.constantFrom(102, 103, 204, 205, 409, 410, 1000, 3000));
    fc.assert(
      fc.property(draws, reach, counts, (rows, furthest, count) => {
        expect(largestError(rows, furthest, count, true)).toBeLessThan(2e-9);
      }),
      { numRuns: 150 },
    );
  });

  it('are so to 1e-11 where they are summed plainly', () => {
    fc.assert(
      fc.property(draws, reach, fc.constantFrom(1, 63, 64, 65, 500), (rows, furthest, count) => {
        expect(largestError(rows, furthest, count, false)).toBeLessThan(1e-11);
      }),
      { numRuns: 40 },
    );
  });

  it('use the same plan again without a trace of what was summed before', () => {
    const plan = planSums(300);
    const cycles = Float64Array.from({ length: 90 }, (_, i) => Math.sin(i));
    const values = cycles.map((_, i) => Math.cos(i * i));
    const first = runSteps(sumAtFrequencies(plan, cycles, values));
    runSteps(sumAtFrequencies(plan, values, cycles));
    expect(runSteps(sumAtFrequencies(plan, cycles, values))).toEqual(first);
  });
});
