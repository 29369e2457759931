import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { highestBetween } from '../../../workers/search/sines/highest-between.ts';
import { findHighest } from '../../../workers/search/sines/highest-power.ts';
import { expandPower } from '../../../workers/search/sines/local-power.ts';
import { powerAt, powersAt } from '../../../workers/search/sines/lomb-scargle-power.ts';
import { runSteps } from '../../../workers/search/sines/steps.ts';
import { weighSeries } from '../../../workers/search/sines/weighted-series.ts';
import { evenTimes, makeSines, nightTimes } from './sine-series.ts';

const series = weighSeries(makeSines(nightTimes(12), [[0.83, 2e-3, 500]]));

describe('power near a frequency', () => {
  it('is that of the plain sums, for near and for far reaches', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.5, max: 20, noNaN: true }),
        fc.constantFrom(0.2, 1, 3),
        fc.double({ min: -1, max: 1, noNaN: true }),
        (frequency, elements, part) => {
          const reach = elements / series.spanDays;
          const asked = frequency + part * reach;
          const near = runSteps(expandPower(series, frequency, reach));
          expect(Math.abs(near(asked) - powerAt(series, asked))).toBeLessThan(1e-9);
        },
      ),
      { numRuns: 100 },
    );
  });
});

describe('the highest place of a curve', () => {
  it('is found inside its bracket and at its edges', () => {
    const top = (at: number, low: number, middle: number, high: number) =>
      highestBetween((x) => Math.exp(-((x - at) ** 2)), { low, middle, high }, 1e-7).x;
    expect(Math.abs(top(0.3, -1, 0, 1) - 0.3)).toBeLessThan(1e-6);
    expect(Math.abs(top(-0.99, -1, 0, 1) + 0.99)).toBeLessThan(1e-6);
    expect(Math.abs(top(5, -1, -1, 1) - 1)).toBeLessThan(1e-5);
    expect(Math.abs(top(-5, -1, 1, 1) + 1)).toBeLessThan(1e-5);
  });

  it('does not depend on how coarse the trials are', () => {
    const given = makeSines(evenTimes(1500), [
      [1.913, 2e-3, 100],
      [0.711, 1.9e-3, 100],
    ]);
    const own = weighSeries(given);
    const highest = (oversampling: number) => {
      const step = 1 / (oversampling * own.spanDays);
      const last = Math.floor(12 / step);
      return runSteps(findHighest(own, powersAt(own, step, last), { step, first: oversampling, last }));
    };
    const fine = highest(20);
    for (const oversampling of [1, 2, 5]) {
      expect(highest(oversampling).frequency).toBeCloseTo(fine.frequency, 4);
      expect(highest(oversampling).power).toBeCloseTo(fine.power, 6);
    }
  });
});
