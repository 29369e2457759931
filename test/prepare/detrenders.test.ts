import { describe, expect, it } from 'vitest';
import type { Detrend } from '../../src/core/recipe.ts';
import { createCheckpoint } from '../../workers/checkpoint.ts';
import { fitTrend } from '../../workers/prepare/detrend/detrenders.ts';
import type { TrendInput } from '../../workers/prepare/detrend/trend-input.ts';
import { createLehmer } from '../demo/lehmer.mjs';

const times = (length: number, cadence: number): Float64Array => Float64Array.from({ length }, (_, i) => i * cadence);

async function trendOf(detrend: Detrend, time: Float64Array, flux: Float64Array, rest: Partial<TrendInput> = {}) {
  const hasWeight = new Uint8Array(time.length).fill(1);
  const input = { time, flux, hasWeight, splits: [], protectedEvents: [], ...rest };
  const trend = await fitTrend(
    detrend,
    input,
    createCheckpoint(() => false),
  );
  return trend!;
}

describe('Savitzky-Golay', () => {
  /** Savitzky & Golay (1964), Anal. Chem. 36, 1627, table I, quadratic and cubic smoothing. */
  it.each([
    [5, [-3, 12, 17, 12, -3], 35],
    [7, [-2, 3, 6, 7, 6, 3, -2], 21],
    [9, [-21, 14, 39, 54, 59, 54, 39, 14, -21], 231],
    [11, [-36, 9, 44, 69, 84, 89, 84, 69, 44, 9, -36], 429],
  ])('has the published weights of %i points', async (points, weights, norm) => {
    const n = 41;
    for (const degree of [2, 3])
      for (const [place, weight] of weights.entries()) {
        const flux = new Float64Array(n);
        flux[20] = 1;
        const windowDays = points - 0.5;
        const trend = await trendOf({ kind: 'savitzky-golay', windowDays, degree }, times(n, 1), flux);
        expect(trend[20 - (place - (points - 1) / 2)]).toBeCloseTo(weight / norm, 12);
      }
  });

  it('keeps a parabola, as the worked example 1, 4, 9, 16, 25 has 9 in its middle', async () => {
    const trend = await trendOf(
      { kind: 'savitzky-golay', windowDays: 4.5, degree: 2 },
      times(5, 1),
      Float64Array.of(1, 4, 9, 16, 25),
    );
    expect(trend[2]).toBeCloseTo(9, 12);
  });
});

const SLIDING: readonly Detrend[] = [
  { kind: 'biweight', windowDays: 1.5 },
  { kind: 'running median', windowDays: 1.5 },
  { kind: 'savitzky-golay', windowDays: 1.5, degree: 2 },
  { kind: 'spline', knotDays: 1.5 },
];

describe.each(SLIDING)('$kind', (detrend) => {
  const random = createLehmer(`trend ${detrend.kind}`);
  const time = times(2000, 1 / 48);
  const slow = time.map((t) => 1 + 0.01 * Math.sin((2 * Math.PI * t) / 12));
  const flux = slow.map((value) => value + 3e-4 * random.normal());

  it('follows what is slow', async () => {
    const trend = await trendOf(detrend, time, flux);
    for (let i = 40; i < 1960; i += 1) expect(Math.abs(trend[i]! - slow[i]!)).toBeLessThan(4.5e-4);
  });

  it('does not follow dips that have no weight', async () => {
    const isInside = (t: number): boolean => Math.abs(((t + 2) % 4) - 2) < 0.1;
    const dipped = flux.map((value, i) => value - (isInside(time[i]!) ? 0.02 : 0));
    const hasWeight = Uint8Array.from(time, (t) => (isInside(t) ? 0 : 1));
    const trend = await trendOf(detrend, time, dipped, { hasWeight });
    for (let i = 40; i < 1960; i += 1) expect(Math.abs(trend[i]! - slow[i]!)).toBeLessThan(8e-4);
  });

  it('does not reach across a split', async () => {
    const stepped = slow.map((_, i) => (i < 1000 ? 1 : 1.05));
    const trend = await trendOf(detrend, time, stepped, { splits: [1000] });
    for (let i = 0; i < 2000; i += 1) expect(Math.abs(trend[i]! - stepped[i]!)).toBeLessThan(1e-6);
  });

  it('is finite with hardly any points, or none with weight', async () => {
    for (const n of [1, 2, 3, 7]) {
      const trend = await trendOf(detrend, times(n, 0.02), new Float64Array(n).fill(1.2));
      expect(trend.every(Number.isFinite)).toBe(true);
    }
    const none = await trendOf(detrend, time, flux, { hasWeight: new Uint8Array(2000) });
    expect(none.every((value) => value === 1)).toBe(true);
  });
});

describe('spline', () => {
  it('leaves outliers on either side aside', async () => {
    const time = times(1000, 1 / 48);
    const random = createLehmer('outliers');
    const flux = time.map(
      (t, i) => 1 + 0.002 * Math.sin(t) + 2e-4 * random.normal() + (i % 50 === 0 ? 0.05 : i % 37 === 0 ? -0.04 : 0),
    );
    const trend = await trendOf({ kind: 'spline', knotDays: 1 }, time, flux);
    for (let i = 20; i < 980; i += 1) expect(Math.abs(trend[i]! - 1 - 0.002 * Math.sin(time[i]!))).toBeLessThan(2.5e-4);
  });
});

describe('harmonics', () => {
  const time = times(2400, 1 / 48);
  const random = createLehmer('harmonics');
  const wave = time.map((t) => 0.004 * Math.sin((2 * Math.PI * t) / 1.7) + 0.002 * Math.cos((2 * Math.PI * t) / 0.85));

  it('takes out a star’s sines', async () => {
    const flux = wave.map((value) => 1 + value + 2e-4 * random.normal());
    const trend = await trendOf({ kind: 'harmonics', count: 6 }, time, flux);
    for (let i = 0; i < 2400; i += 7) expect(Math.abs(trend[i]! - 1 - wave[i]!)).toBeLessThan(1.2e-4);
  });

  it('spares the harmonics of a protected signal', async () => {
    const ephemeris = { periodDays: 2.9, epochDays: 0.4, durationDays: 0.15 };
    const isInside = (t: number): boolean => Math.abs((t - 0.4) / 2.9 - Math.round((t - 0.4) / 2.9)) * 2.9 < 0.075;
    const flux = wave.map((value, i) => 1 + value - (isInside(time[i]!) ? 0.006 : 0) + 2e-4 * random.normal());
    const trend = await trendOf({ kind: 'harmonics', count: 12 }, time, flux, { protectedEvents: [ephemeris] });
    const depths = [...time.keys()].filter((i) => isInside(time[i]!)).map((i) => 1 - flux[i]! / trend[i]!);
    const mean = depths.reduce((sum, depth) => sum + depth, 0) / depths.length;
    expect(mean / 0.006).toBeGreaterThan(0.93);
  });
});
