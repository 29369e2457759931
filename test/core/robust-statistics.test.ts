import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { biweightLocation } from '../../src/core/biweight.ts';
import { median, pointToPointScatter, robustSigma, selectInPlace } from '../../src/core/robust-statistics.ts';
import { seedRandom } from '../reference/search/seeded-series.ts';

const numbers = fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 60 });

describe('order statistics', () => {
  it('select what sorting finds', () => {
    fc.assert(
      fc.property(numbers, fc.nat(), (values, pick) => {
        const k = pick % values.length;
        const sorted = Float64Array.from(values).sort();
        expect(selectInPlace(Float64Array.from(values), k, values.length)).toBe(sorted[k]);
      }),
      { seed: 1 },
    );
  });

  it('leave the input of a median as it was, and ties alone', () => {
    const values = [3, 1, 2, 2];
    expect(median(values)).toBe(2);
    expect(values).toEqual([3, 1, 2, 2]);
    expect(median([1, 4])).toBe(2.5);
    expect(median([])).toBeNaN();
  });
});

describe('robust scale and location', () => {
  it('move with a shift and a factor', () => {
    fc.assert(
      fc.property(numbers, fc.integer({ min: -1000, max: 1000 }), (values, shift) => {
        const moved = values.map((value) => 2 * value + shift);
        expect(robustSigma(moved)).toBeCloseTo(2 * robustSigma(values), 4);
        expect(biweightLocation(moved, 6)).toBeCloseTo(2 * biweightLocation(values, 6) + shift, 4);
      }),
      { seed: 2 },
    );
  });

  it('recover the noise of normal deviates, and ignore a slow trend between neighbours', () => {
    const random = seedRandom(4);
    const noise = Array.from({ length: 4000 }, () => 0.3 * random.normal());
    expect(robustSigma(noise)).toBeCloseTo(0.3, 1);
    const wave = noise.map((value, i) => value + 5 * Math.sin(i / 500));
    expect(Math.abs(pointToPointScatter(wave) - 0.3)).toBeLessThan(0.02);
    expect(robustSigma(wave)).toBeGreaterThan(2);
  });
});
