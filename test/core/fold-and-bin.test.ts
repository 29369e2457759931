import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { binFold, binFoldInto, makeBinnedFold } from '../../src/core/bin.ts';
import { phaseOf } from '../../src/core/ephemeris.ts';
import { foldAtPeriod } from '../../src/core/fold.ts';

describe('fold', () => {
  it('gives the phase of each time, from the event, in [-0.5, 0.5)', () => {
    const time = fc.double({ min: -5000, max: 5000, noNaN: true });
    fc.assert(
      fc.property(
        fc.array(time, { maxLength: 20 }),
        fc.double({ min: 0.1, max: 400, noNaN: true }),
        (times, period) => {
          const phases = foldAtPeriod(Float64Array.from(times), period, 3.7);
          phases.forEach((phase, i) => {
            expect(phase).toBeGreaterThanOrEqual(-0.5);
            expect(phase).toBeLessThanOrEqual(0.5);
            const apart = Math.abs(phase - phaseOf(times[i]!, period, 3.7));
            expect(Math.min(apart, 1 - apart)).toBeLessThan(1e-9);
          });
        },
      ),
      { seed: 3 },
    );
  });

  it('writes into the array that it is given', () => {
    const out = new Float64Array(2);
    expect(foldAtPeriod(Float64Array.of(1, 2), 4, 1, out)).toBe(out);
    expect([...out]).toEqual([0, 0.25]);
  });
});

describe('bins of a fold', () => {
  const x = Float64Array.of(0.1, 0.2, 0.3, 1.5, 3.2, Number.NaN, 0.4);
  const flux = Float64Array.of(1, 2, 3, 7, 9, 5, Number.NaN);
  const error = Float64Array.of(1, 1, 0.5, 2, 1, 1, 1);

  it('hold weighted means, and errors from their own scatter (by hand: weights 1, 1, 4)', () => {
    const bins = binFold(x, flux, error, { start: 0, end: 3 }, 3);
    expect([...bins.count]).toEqual([3, 1, 0]);
    expect([...bins.centre]).toEqual([0.5, 1.5, 2.5]);
    expect(bins.mean[0]).toBeCloseTo(15 / 6, 12);
    // sum w (y - mean)^2 = 2.25 + 0.25 + 4 * 0.25 = 3.5; over (n - 1) sum w = 12.
    expect(bins.error[0]).toBeCloseTo(Math.sqrt(3.5 / 12), 12);
    expect(bins.mean[1]).toBe(7);
    expect(bins.error[1]).toBeNaN();
    expect(bins.mean[2]).toBeNaN();
  });

  it('are cleared before they are filled again', () => {
    const bins = makeBinnedFold(3);
    const weights = new Float64Array(3);
    for (let round = 0; round < 2; round += 1) binFoldInto(x, flux, error, { start: 0, end: 3 }, bins, weights);
    expect(bins).toEqual(binFold(x, flux, error, { start: 0, end: 3 }, 3));
  });
});
