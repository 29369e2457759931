import { describe, expect, it } from 'vitest';
import { biweightLocation, iteratedBiweightLocation } from '../../../src/core/biweight.ts';
import { MAD_TO_SIGMA, median, medianAbsoluteDeviation, robustSigma } from '../../../src/core/robust-statistics.ts';

describe('robust scale', () => {
  it('has the factor of Rousseeuw & Croux (1993): 1 / Phi^-1(3/4), as scipy gives it', () => {
    expect(MAD_TO_SIGMA).toBeCloseTo(1.4826022185056018, 12);
  });

  it('follows the worked example (computed here from the definition)', () => {
    const values = [2, 4, 4, 5, 5, 7, 9, 30];
    expect(median(values)).toBe(5);
    expect(medianAbsoluteDeviation(values)).toBe(1.5);
    expect(robustSigma(values)).toBeCloseTo(2.223903328, 9);
  });
});

/**
 * Formula: Mosteller & Tukey (1977), p. 205; Beers, Flynn & Gebhardt (1990), AJ 100, 32, eq. 5. The one-step values
 * are also what astropy 5.2.1 `biweight_location` returns; the iterated ones are computed from the formula.
 */
describe('biweight location', () => {
  const a = [1, 2, 3, 4, 5, 6, 7, 100];
  const b = [1, 1.001, 0.999, 1.002, 0.998, 1.0005, 0.9, 1.003, 0.9995];

  it.each([
    ['a', a, 6, 4.055970352],
    ['a', a, 5, 4.080792133],
    ['b', b, 6, 1.000240882],
    ['b', b, 5, 1.000185502],
  ])('one step, series %s, %s, c = %s: %s', (_, values, c, expected) => {
    expect(Math.abs(biweightLocation(values, c) - expected)).toBeLessThan(1e-9);
  });

  it.each([
    ['a', a, 6, 4],
    ['a', a, 5, 4],
    ['b', b, 6, 1.00032099],
    ['b', b, 5, 1.000286029],
  ])('iterated, series %s, %s, c = %s: %s', (_, values, c, expected) => {
    expect(Math.abs(iteratedBiweightLocation(values, c) - expected)).toBeLessThan(2e-9);
  });

  it('is the median where more than half the values are equal, and NaN of nothing', () => {
    expect(biweightLocation([3, 3, 3, 3, 90], 6)).toBe(3);
    expect(biweightLocation([], 6)).toBeNaN();
  });
});
