import { describe, expect, it } from 'vitest';
import type { Detrend } from '../../src/core/recipe.ts';
import { createLehmer } from '../demo/lehmer.mjs';
import { makeColumn, makeJob, makeLightCurve, prepare, sentenceOf } from './light-curve.ts';
import { trendOf } from './trend-of.ts';

const times = (length: number, cadence: number): Float64Array => Float64Array.from({ length }, (_, i) => i * cadence);

const SLIDING: readonly Detrend[] = [
  { kind: 'biweight', windowDays: 1.5 },
  { kind: 'running median', windowDays: 1.5 },
  { kind: 'savitzky-golay', windowDays: 1.5, degree: 2 },
  { kind: 'spline', knotDays: 0.9 },
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
  const noisyWave = wave.map((value) => 1 + value + 2e-4 * random.normal());

  it('takes out a star’s sines, and not more of them than asked for', async () => {
    const trend = await trendOf({ kind: 'harmonics', count: 6 }, time, noisyWave);
    for (let i = 0; i < 2400; i += 7) expect(Math.abs(trend[i]! - 1 - wave[i]!)).toBeLessThan(1.2e-4);
    const one = await trendOf({ kind: 'harmonics', count: 1 }, time, noisyWave);
    const left = wave.map((value, i) => one[i]! - 1 - value);
    expect(Math.max(...left)).toBeGreaterThan(0.0015);
    expect(Math.max(...left)).toBeLessThan(0.0025);
  });

  it('leaves noise and constant flux as they are', async () => {
    const noise = time.map(() => 1 + 2e-4 * random.normal());
    const mean = noise.reduce((sum, value) => sum + value, 0) / noise.length;
    const trend = await trendOf({ kind: 'harmonics', count: 6 }, time, noise);
    for (let i = 0; i < 2400; i += 1) expect(Math.abs(trend[i]! - mean)).toBeLessThan(1e-12);
    const flat = await trendOf({ kind: 'harmonics', count: 6 }, time, new Float64Array(2400).fill(1.3));
    for (let i = 0; i < 2400; i += 1) expect(flat[i]).toBeCloseTo(1.3, 12);
    expect([...(await trendOf({ kind: 'harmonics', count: 6 }, times(1, 1), Float64Array.of(1)))]).toEqual([1]);
  });

  it('has a level of its own on each side of a split', async () => {
    const stepped = noisyWave.map((value, i) => value - (i < 900 ? 0 : 0.05));
    const trend = await trendOf({ kind: 'harmonics', count: 6 }, time, stepped, { splits: [900] });
    for (let i = 0; i < 2400; i += 7)
      expect(Math.abs(trend[i]! - 1 - wave[i]! + (i < 900 ? 0 : 0.05))).toBeLessThan(1.5e-4);
  });

  it('spares the harmonics of a protected signal, down to a sine at its very period', async () => {
    const ephemeris = { periodDays: 2.9, epochDays: 0.4, durationDays: 0.15 };
    const pulse = noisyWave.map((value, i) => value + 0.003 * Math.cos((2 * Math.PI * (time[i]! - 0.4)) / 2.9));
    const largestLeft = async (protectedEvents: readonly (typeof ephemeris)[]) => {
      const trend = await trendOf({ kind: 'harmonics', count: 12 }, time, pulse, { protectedEvents });
      return Math.max(...trend.map((value, i) => Math.abs(pulse[i]! - value)));
    };
    expect(await largestLeft([])).toBeLessThan(0.001);
    expect(await largestLeft([ephemeris])).toBeGreaterThan(0.002);
  });
});

describe('a window too narrow', () => {
  const time = times(400, 1 / 48);
  const curve = makeLightCurve([makeColumn(time.map((t) => 1 + 0.01 * Math.sin(t)))], { time });

  it.each([
    [{ kind: 'running median', windowDays: 0.05 }, /window of 0.05 d is shorter than 3 cadences/],
    [{ kind: 'savitzky-golay', windowDays: 0.1, degree: 4 }, /window of 0.1 d is shorter than 6 cadences/],
    [{ kind: 'spline', knotDays: 0.05 }, /knot distance of 0.05 d is shorter than 3 cadences/],
    [{ kind: 'biweight', windowDays: 0 }, /shorter than 3 cadences/],
  ] as const)('is refused: $kind', async (detrend, sentence) => {
    expect(await sentenceOf(makeJob(curve, { detrend: detrend as Detrend }))).toMatch(sentence);
  });
});

describe('a polynomial window', () => {
  it('lowers its degree where it has few points, and does not run away beyond them', async () => {
    const time = times(40, 1);
    const flux = time.map((t, i) => 1 + 0.01 * t + (i % 2 === 0 ? 0.001 : -0.001));
    const hasWeight = Uint8Array.from(time, (_, i) => (i < 12 ? 0 : 1));
    const trend = await trendOf({ kind: 'savitzky-golay', windowDays: 10, degree: 5 }, time, flux, { hasWeight });
    expect(trend.every((value) => value > 0.9 && value < 1.6)).toBe(true);
    for (let i = 0; i < 12; i += 1) expect(trend[i]).toBe(trend[12]);
  });

  it('takes equal times', async () => {
    const time = times(60, 1).map((_, i) => Math.floor(i / 3));
    const flux = time.map((t) => 1 + 0.01 * t * t);
    const trend = await trendOf({ kind: 'savitzky-golay', windowDays: 6, degree: 2 }, time, flux);
    for (let i = 0; i < 60; i += 1) expect(trend[i]).toBeCloseTo(flux[i]!, 9);
  });
});

describe('pieces', () => {
  const time = times(960, 1 / 48).map((t, i) => t + (i >= 480 ? 0.3 : 0));
  const random = createLehmer('pieces');
  const flux = time.map((t) => 1 + 0.002 * Math.sin(t) + 1e-4 * random.normal());
  const detrend = { kind: 'running median', windowDays: 1 } as const;

  it('end at gaps over half a window and at segments of the file, and their ends are told', async () => {
    const one = await prepare(makeJob(makeLightCurve([makeColumn(flux)], { time }), { detrend }));
    expect([...one.pieceStarts]).toEqual([0]);
    const segmentStarts = Int32Array.of(0, 480, 700);
    const curve = makeLightCurve([makeColumn(flux)], { time, segmentStarts });
    const three = await prepare(makeJob(curve, { detrend }));
    expect([...three.pieceStarts]).toEqual([0, 480, 700]);
    const edges = [...three.isAtEdge.keys()].filter((i) => three.isAtEdge[i] === 1);
    expect(edges).toHaveLength(3 * 48);
    expect(edges.slice(0, 24)).toEqual(Array.from({ length: 24 }, (_, i) => i));
    const gap = await prepare(
      makeJob(makeLightCurve([makeColumn(flux)], { time }), { detrend: { ...detrend, windowDays: 0.6 } }),
    );
    expect([...gap.pieceStarts]).toEqual([0, 480]);
  });

  it('count the points that are kept', async () => {
    const quality = new Int32Array(960).fill(1, 478, 482);
    const curve = makeLightCurve([makeColumn(flux)], { time, quality, segmentStarts: Int32Array.of(0, 480) });
    const series = await prepare(makeJob(curve, { detrend }));
    expect([...series.pieceStarts]).toEqual([0, 478]);
    const plain = await prepare(makeJob(curve, {}));
    expect([...plain.pieceStarts]).toEqual([0, 478]);
    expect(plain.isAtEdge.every((value) => value === 0)).toBe(true);
  });

  it('do not lend their trend to protected points beyond a split', async () => {
    const stepped = time.map((_, i) => (i < 480 ? 1 : 1.05));
    const hasWeight = Uint8Array.from(time, (_, i) => (i >= 460 && i < 500 ? 0 : 1));
    const trend = await trendOf({ kind: 'biweight', windowDays: 0.4 }, time, stepped, { hasWeight, splits: [480] });
    expect([...trend]).toEqual([...stepped]);
  });
});
