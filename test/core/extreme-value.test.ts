import { describe, expect, it } from 'vitest';
import { falseAlarmProbability, fitExtremeValues, strengthAt } from '../../src/core/extreme-value.ts';
import { expectedFalseAlarms, falseDiscoveryRates } from '../../src/core/false-discovery.ts';
import { logGamma } from '../../src/core/log-gamma.ts';
import { createLehmer } from '../demo/lehmer.mjs';

describe('extreme values', () => {
  it('come back from maxima of Gumbel’s and of a heavy-tailed distribution', () => {
    const random = createLehmer('extremes');
    const draw = (shape: number) =>
      Float64Array.from({ length: 4000 }, () => {
        const y = -Math.log(Math.max(1e-12, random.uniform()));
        return shape === 0 ? 6 - 0.5 * Math.log(y) : 6 + (0.5 / shape) * (1 - y ** shape);
      });
    for (const shape of [0, -0.15]) {
      const fit = fitExtremeValues(draw(shape));
      expect(Math.abs(fit.location - 6)).toBeLessThan(0.06);
      expect(Math.abs(fit.scale - 0.5)).toBeLessThan(0.05);
      expect(Math.abs(fit.shape - shape)).toBeLessThan(0.06);
    }
  });

  it('have scipy’s tails: genextreme(c, loc, scale).sf (scipy 1.10.1, Debian 12)', () => {
    const at = (shape: number, x: number) =>
      falseAlarmProbability({ location: 6, scale: 0.5, shape, gridFraction: 1 }, x);
    expect(at(0, 8)).toBeCloseTo(0.018148926938333514, 9);
    expect(at(-0.1, 9)).toBeCloseTo(0.00905371308858861, 9);
  });

  it('of parts of a grid say what the whole would do', () => {
    const whole = { location: 6, scale: 0.5, shape: 0, gridFraction: 1 };
    const part = { ...whole, gridFraction: 0.1 };
    const single = falseAlarmProbability(whole, 9);
    expect(falseAlarmProbability(part, 9)).toBeCloseTo(1 - (1 - single) ** 10, 12);
    for (const maxima of [whole, part, { ...part, shape: -0.12 }])
      expect(falseAlarmProbability(maxima, strengthAt(maxima, 0.01))).toBeCloseTo(0.01, 12);
  });
});

describe('ln Gamma', () => {
  it('has the values of Abramowitz & Stegun (1972), table 6.1, and of factorials', () => {
    expect(logGamma(1.5)).toBeCloseTo(Math.log(0.886226925452758), 13);
    expect(logGamma(1.25)).toBeCloseTo(Math.log(0.9064024770554771), 13);
    expect(logGamma(0.25)).toBeCloseTo(Math.log(3.625609908221908), 13);
    expect(logGamma(11)).toBeCloseTo(Math.log(3628800), 12);
  });
});

describe('false discoveries', () => {
  it('are those of the worked example of Benjamini & Hochberg (1995), section 4 (from memory): four at 0.05', () => {
    const p = [
      0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528, 0.759, 1,
    ];
    const rates = falseDiscoveryRates(p);
    expect(rates.filter((rate) => rate <= 0.05)).toHaveLength(4);
    // Worked by hand: p(4) n / 4 and, where a later one is lower, that.
    expect(rates[3]).toBeCloseTo((0.0095 * 15) / 4, 12);
    expect(rates[4]).toBeCloseTo(0.06032, 2);
    expect(rates.at(-1)).toBe(1);
  });

  it('keep the order they are given in', () => {
    const shuffled = [0.5, 0.001, 0.04];
    const rates = falseDiscoveryRates(shuffled);
    expect(rates[1]).toBeCloseTo(0.003, 12);
    expect(rates[2]).toBeCloseTo(0.06, 12);
    expect(rates[0]).toBeCloseTo(0.5, 12);
    expect(expectedFalseAlarms(200, 0.01)).toBe(2);
  });
});
