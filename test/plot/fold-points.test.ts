import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { phaseOf } from '../../src/core/ephemeris.ts';
import { binMinutesFor, binPoints, makeBins } from '../../src/plot/bin-points.ts';
import { foldHours, foldPhases } from '../../src/plot/fold-points.ts';
import { boxCurve, curveAt } from '../../src/plot/model-layer.ts';
import { seededNoise } from './seeded-noise.ts';

describe('folds', () => {
  it('agree with the phase of each time by itself', () => {
    const period = fc.double({ min: 0.1, max: 400, noNaN: true });
    const epoch = fc.double({ min: 0, max: 3000, noNaN: true });
    fc.assert(
      fc.property(
        period,
        epoch,
        fc.array(fc.double({ min: 0, max: 3000, noNaN: true }), { maxLength: 50 }),
        (P, T0, times) => {
          const time = Float64Array.from(times);
          const [hours, phases] = [new Float64Array(time.length), new Float64Array(time.length)];
          foldHours(time, P, T0, hours);
          foldPhases(time, P, T0, phases);
          time.forEach((t, i) => {
            // Half a period either way of the seam is the same place.
            const apart = Math.abs(hours[i]! / (24 * P) - phaseOf(t, P, T0));
            expect(Math.min(apart, Math.abs(1 - apart))).toBeLessThan(1e-8);
            const turn = phases[i]! - phaseOf(t, P, T0);
            expect(Math.abs(turn - Math.round(turn))).toBeLessThan(1e-8);
            expect(phases[i]!).toBeGreaterThanOrEqual(-0.25 - 1e-12);
            expect(phases[i]!).toBeLessThan(0.75);
          });
        },
      ),
    );
  });
});

describe('binPoints', () => {
  it('gives the mean and its error of each bin as the textbook formulas do', () => {
    const noise = seededNoise(5);
    const n = 2000;
    const x = Float64Array.from({ length: n }, (_, i) => (((i * 7919) % n) + 0.5) / n);
    const y = Float64Array.from({ length: n }, () => 1e6 + noise());
    const bins = makeBins(50);
    binPoints(x, y, 0, 1, 20, bins);
    expect(bins.count).toBe(20);
    for (let bin = 0; bin < 20; bin += 1) {
      const inside = [...y].filter((_, i) => Math.floor(x[i]! * 20) === bin);
      const mean = inside.reduce((sum, value) => sum + value, 0) / inside.length;
      const variance = inside.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (inside.length - 1);
      expect(bins.points[bin]).toBe(inside.length);
      expect(bins.mean[bin]).toBeCloseTo(mean, 7);
      expect(bins.error[bin]).toBeCloseTo(Math.sqrt(variance / inside.length), 7);
    }
  });
  it('passes over NaN and what lies outside, and knows no error of two points', () => {
    const bins = makeBins(4);
    binPoints(
      Float64Array.of(-1, 0.1, 0.1, 0.1, 0.6, 0.6, 9),
      Float64Array.of(5, 1, 2, Number.NaN, 3, 5, 5),
      0,
      1,
      2,
      bins,
    );
    expect([...bins.points.slice(0, 2)]).toEqual([2, 2]);
    expect([...bins.mean.slice(0, 2)]).toEqual([1.5, 4]);
    expect(bins.error[0]).toBeNaN();
  });
  it('chooses a round width that follows the duration', () => {
    expect(binMinutesFor(3.05 / 24, 8)).toBe(20);
    expect(binMinutesFor(0.5 / 24, 2)).toBe(2);
    expect(binMinutesFor(12 / 24, 30)).toBe(60);
  });
});

describe('curveAt', () => {
  it('reads a box on both levels', () => {
    const curve = boxCurve(-8, 8, 1.5, 1000);
    expect([-5, -1.4, 0, 1.4, 1.6].map((x) => curveAt(curve, x))).toEqual([0, -1000, -1000, -1000, 0]);
    expect(curveAt(curve, 20)).toBe(0);
    expect(curveAt({ x: [0, 2], y: [0, -4] }, 1)).toBe(-2);
  });
});
