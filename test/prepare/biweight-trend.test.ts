import { describe, expect, it } from 'vitest';
import { iteratedBiweightLocation } from '../../src/core/biweight.ts';
import { seedRandom } from '../reference/search/seeded-series.ts';
import { makeColumn, makeJob, makeLightCurve, prepare, sentenceOf } from './light-curve.ts';
import { trendOf as trendBy } from './trend-of.ts';

const trendOf = (time: Float64Array, flux: Float64Array, windowDays: number, hasWeight?: Uint8Array) =>
  trendBy({ kind: 'biweight', windowDays }, time, flux, hasWeight && { hasWeight });

const times = (length: number, cadence: number): Float64Array => Float64Array.from({ length }, (_, i) => i * cadence);

describe('biweight trend', () => {
  it('is the location of the points in each window, cut off at the ends (literal, slow version)', async () => {
    const random = seedRandom(1);
    const time = times(200, 0.1).map((at) => at + 0.04 * random.uniform());
    const flux = time.map((at) => 1 + 0.01 * Math.sin(at) + 0.001 * random.normal());
    const trend = await trendOf(time, flux, 1.5);
    for (let i = 0; i < time.length; i += 1) {
      const inside = flux.filter((_, j) => Math.abs(time[j]! - time[i]!) <= 0.75);
      expect(trend[i]).toBeCloseTo(iteratedBiweightLocation(inside, 5), 9);
    }
  });

  it('is nearly the same on a lattice as at every point', async () => {
    const random = seedRandom(2);
    const [time, windowDays] = [times(14_000, 1 / 720), 1.5];
    const flux = time.map((at) => 1 + 0.01 * Math.sin(at) + 0.001 * random.normal());
    const trend = await trendOf(time, flux, windowDays);
    for (let i = 0; i < time.length; i += 997) {
      const inside = flux.filter((_, j) => Math.abs(time[j]! - time[i]!) <= windowDays / 2);
      // A window of 1080 points has a location known to 0.001 / sqrt(1080) = 3e-5.
      expect(Math.abs(trend[i]! - iteratedBiweightLocation(inside, 5))).toBeLessThan(1.5e-5);
    }
  });

  it('does not look across a gap of more than half a window', async () => {
    const time = times(200, 0.1).map((at, i) => (i < 100 ? at : at + 1));
    const flux = time.map((_, i) => (i < 100 ? 1 : 2));
    expect([...(await trendOf(time, flux, 1.5))]).toEqual([...flux]);
  });

  it('passes over protected points and bridges windows that hold nothing else', async () => {
    const time = times(400, 0.05);
    const flux = time.map((at, i) => 1 + 0.001 * at - (i >= 180 && i < 240 ? 0.5 : 0));
    const weight = Uint8Array.from(time, (_, i) => (i >= 180 && i < 240 ? 0 : 1));
    const trend = await trendOf(time, flux, 1, weight);
    for (let i = 20; i < 380; i += 1) expect(Math.abs(trend[i]! - 1 - 0.001 * time[i]!)).toBeLessThan(5e-4);
    expect((await trendOf(time, flux, 1, new Uint8Array(400))).every((value) => value === 1)).toBe(true);
  });
});

describe('a second trend of the same points', () => {
  it('takes over the windows that did not change, and is what a fresh one is', async () => {
    const random = seedRandom(4);
    const time = times(3000, 1 / 48).map((at, i) => at + (i > 1400 ? 2 : 0));
    const flux = time.map((at) => 1 + 0.01 * Math.sin(at) + 0.001 * random.normal());
    const hasWeight = Uint8Array.from(time, (_, i) => (i % 211 === 0 || (i > 700 && i < 790) ? 0 : 1));
    const detrend = { kind: 'biweight', windowDays: 1.5 } as const;
    const before = { hasWeight: new Uint8Array(3000).fill(1), trend: await trendBy(detrend, time, flux) };
    const fresh = await trendBy(detrend, time, flux, { hasWeight });
    expect(await trendBy(detrend, time, flux, { hasWeight, before })).toEqual(fresh);
    expect(fresh).not.toEqual(before.trend);
  });
});

describe('detrending in a recipe', () => {
  const random = seedRandom(3);
  const time = times(4000, 1 / 96);
  const isInside = (at: number): boolean => Math.abs(((at - 1 + 1.5) % 3) - 1.5) < 0.08;
  const flux = time.map((at) => 1 + 0.005 * Math.sin(at / 2) - (isInside(at) ? 0.01 : 0) + 2e-4 * random.normal());
  const curve = makeLightCurve([makeColumn(flux)], { time });
  const detrend = { kind: 'biweight', windowDays: 1.5 } as const;
  const ephemeris = { periodDays: 3, epochDays: 1, durationDays: 0.2 };

  it('flattens the star and keeps the depth of a transit to two parts in a hundred', async () => {
    const series = await prepare(makeJob(curve, { detrend, clip: { kind: 'sigma', side: 'high', sigma: 4 } }));
    const inside = series.flux.filter((_, i) => isInside(series.time[i]!));
    const depth = 1 - inside.reduce((sum, value) => sum + value, 0) / inside.length;
    expect(Math.abs(depth / 0.01 - 1)).toBeLessThan(0.02);
    expect(series.scatter).toBeLessThan(3e-4);
    series.flux.forEach((value, i) => void expect(value).toBeCloseTo(series.raw[i]! / series.trend[i]!, 14));
  });

  it('keeps it whole in a short window when the events are protected', async () => {
    const short = { kind: 'biweight', windowDays: 0.4 } as const;
    const series = await prepare(makeJob(curve, { detrend: short }, { protectedEvents: [ephemeris] }));
    const inside = series.flux.filter((_, i) => isInside(series.time[i]!));
    const depth = 1 - inside.reduce((sum, value) => sum + value, 0) / inside.length;
    expect(Math.abs(depth / 0.01 - 1)).toBeLessThan(0.01);
  });

  it('refuses a window shorter than three cadences, and a trend that falls to zero', async () => {
    const narrow = { kind: 'biweight', windowDays: 0.02 } as const;
    expect(await sentenceOf(makeJob(curve, { detrend: narrow }))).toMatch(/shorter than 3 cadences/);
    const lost = makeLightCurve([makeColumn(flux.map((value, i) => (i > 3000 ? -value : value)))], { time });
    expect(await sentenceOf(makeJob(lost, { detrend }))).toMatch(/trend falls to/);
  });
});
