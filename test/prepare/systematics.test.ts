import { describe, expect, it } from 'vitest';
import type { CommonModes } from '../../src/contract/prepare-contract.ts';
import { robustSigma } from '../../src/core/robust-statistics.ts';
import { createOrthogonalBasis } from '../../workers/prepare/orthogonal-basis.ts';
import { regressOn } from '../../workers/prepare/regress.ts';
import { createLehmer } from '../demo/lehmer.mjs';
import { makeColumn, makeJob, makeLightCurve, prepare, sentenceOf } from './light-curve.ts';
import { awayFrom, noisy, SIGMA, times } from './noisy-series.ts';

const random = createLehmer('systematics');
const time = times(20, 1 / 48);
const airmass = time.map((t) => 1 + Math.abs((t % 1) - 0.5));
const background = time.map(() => 900 + 40 * random.normal());
const flat = time.map(() => 3);
const flux = noisy(time, 'regress').map(
  (value, i) => value + 0.004 * (airmass[i]! - 1.25) + 5e-5 * (background[i]! - 900),
);
const curveWith = (covariates: Record<string, Float64Array>, values = flux) =>
  makeLightCurve([makeColumn(values)], { time, covariates });
const covariatesBy = (per: 'series' | 'segment' | 'night', ...names: string[]) => ({ covariates: { per, names } });

describe('regression on covariates', () => {
  it('takes out what the columns explain, as part of the trend', async () => {
    const curve = curveWith({ airmass, background });
    expect((await prepare(makeJob(curve, {}))).scatter).toBeGreaterThan(4 * SIGMA);
    const series = await prepare(makeJob(curve, covariatesBy('series', 'airmass', 'background')));
    expect(series.scatter).toBeLessThan(1.05 * SIGMA);
    for (let i = 0; i < time.length; i += 1) expect(series.flux[i]).toBeCloseTo(series.raw[i]! / series.trend[i]!, 14);
  });

  it('leaves out columns that are constant, repeat others or are empty, and says so', async () => {
    const twice = airmass.map((value) => 2 * value - 1);
    const curve = curveWith({ airmass, background, flat, twice, none: time.map(() => Number.NaN) });
    const job = makeJob(curve, covariatesBy('series', 'airmass', 'background', 'flat', 'twice', 'none'));
    const { scatter, warnings } = await prepare(job);
    expect(scatter).toBeLessThan(1.05 * SIGMA);
    for (const name of ['flat', 'twice']) expect(warnings.join()).toContain(`"${name}" does not vary or repeats`);
    expect(warnings.join()).toContain('"none" has no values');
    expect(warnings.join()).not.toContain('"airmass"');
  });

  it('is not bent by outliers or by events without weight', async () => {
    const isInside = (t: number): boolean => awayFrom(t, 2, 0) < 0.08;
    const event = time.map((t) => (isInside(t) ? 1 : 0));
    const values = flux.map((value, i) => value - 0.02 * event[i]! + (i % 97 === 0 ? 0.3 : 0));
    const protectedEvents = [{ periodDays: 2, epochDays: 0, durationDays: 0.2 }];
    const recipe = covariatesBy('series', 'airmass', 'background', 'event');
    const series = await prepare(
      makeJob(curveWith({ airmass, background, event }, values), recipe, { protectedEvents }),
    );
    expect(series.scatter).toBeLessThan(1.1 * SIGMA);
    const inside = series.flux.filter((value, i) => isInside(series.time[i]!) && value < 1.1);
    expect(1 - inside.reduce((sum, value) => sum + value, 0) / inside.length).toBeCloseTo(0.02, 3);
  });

  it('has its own coefficients in each segment or night, and keeps their levels', async () => {
    const nights = time.map((_, i) => Math.floor(i / 24) + (i % 24) / 48);
    const slope = nights.map((t) => (Math.floor(t) % 2 === 0 ? 0.01 : -0.01));
    const level = nights.map((t) => 0.002 * (Math.floor(t) % 3));
    const values = noisy(nights, 'nights').map(
      (value, i) => value + slope[i]! * ((nights[i]! % 1) - 23 / 96) + level[i]!,
    );
    const segmentStarts = Int32Array.from({ length: 40 }, (_, k) => 24 * k);
    const curve = makeLightCurve([makeColumn(values)], {
      time: nights,
      covariates: { hour: nights.map((t) => t % 1) },
      segmentStarts,
    });
    const whole = await prepare(makeJob(curve, covariatesBy('series', 'hour')));
    for (const per of ['segment', 'night'] as const) {
      const series = await prepare(makeJob(curve, covariatesBy(per, 'hour')));
      const levelled = series.flux.map((value, i) => value - level[i]!);
      expect(robustSigma(levelled)).toBeLessThan(1.1 * SIGMA);
      expect(robustSigma(whole.flux.map((value, i) => value - level[i]!))).toBeGreaterThan(2 * SIGMA);
    }
  });

  it('corrects points that miss a column by the others, and leaves too few points as they are', async () => {
    const broken = airmass.map((value, i) => (i % 5 === 0 ? Number.NaN : value));
    const curve = curveWith({ airmass: broken, background });
    const series = await prepare(makeJob(curve, covariatesBy('series', 'airmass', 'background')));
    expect(series.flux.every(Number.isFinite)).toBe(true);
    expect(series.warnings.join()).toContain('192 points miss a column');
    const few = makeLightCurve([makeColumn([1, 1.1, 0.9, 1])], { covariates: { x: Float64Array.of(1, 2, 3, 4) } });
    const left = await prepare(makeJob(few, covariatesBy('night', 'x')));
    expect([...left.flux]).toEqual([...left.raw]);
    expect(left.warnings.join()).toContain('too few points to be regressed');
  });

  it('says which column is not there, and works on flux in sigma', async () => {
    expect(await sentenceOf(makeJob(curveWith({}), covariatesBy('series', 'seeing')))).toContain('"seeing"');
    const sigma = flux.map((value) => (value - 1) / SIGMA);
    const curve = makeLightCurve([makeColumn(sigma, { unit: 'sigma' })], { time, covariates: { airmass, background } });
    const series = await prepare(makeJob(curve, covariatesBy('series', 'airmass', 'background')));
    expect(series.scatter).toBeGreaterThan(0.9);
    expect(series.scatter).toBeLessThan(1.1);
  });

  it('refuses to divide by what falls to zero', async () => {
    const wild = airmass.map((value, i) => (i === 700 ? 400 : value));
    const protectedIntervals = [{ start: 699.9 / 48, end: 700.1 / 48 }];
    const steep = time.map((_, i) => 1 - 0.5 * (airmass[i]! - 1.25));
    const curve = makeLightCurve([makeColumn(steep)], { time, covariates: { wild } });
    expect(await sentenceOf(makeJob(curve, covariatesBy('series', 'wild'), { protectedIntervals }))).toMatch(
      /explain falls to .* at time 14\.58/,
    );
  });
});

describe('least squares', () => {
  it('finds the coefficients of a plane, large offsets or not', () => {
    const [a, b] = [time.map(() => random.normal()), time.map(() => 1e6 + random.normal())];
    const values = time.map((_, i) => 2 + 0.3 * a[i]! - 0.1 * (b[i]! - 1e6));
    const weight = new Uint8Array(time.length).fill(1);
    const { explained } = regressOn(values, [a, b], weight, [{ first: 0, end: time.length }]);
    const level = values.reduce((sum, value) => sum + value, 0) / time.length;
    for (let i = 0; i < time.length; i += 50) expect(level * (1 + explained[i]!)).toBeCloseTo(values[i]!, 9);
  });

  it('counts no column twice', () => {
    const basis = createOrthogonalBasis(Uint8Array.of(1, 1, 1, 0));
    expect(basis.add(Float64Array.of(1, 1, 1, 1))).toBe(true);
    expect(basis.add(Float64Array.of(0, 1, 2, 3))).toBe(true);
    expect(basis.add(Float64Array.of(5, 7, 9, 11))).toBe(false);
    expect(basis.add(Float64Array.of(0, 0, 0, 7))).toBe(false);
    expect(basis.size).toBe(2);
    // The line through 1, 3, 5 goes on to 7.
    const fitted = basis.fit(Float64Array.of(1, 3, 5, 99));
    [1, 3, 5, 7].forEach((value, i) => void expect(fitted[i]).toBeCloseTo(value, 12));
  });
});

describe('common modes in a recipe', () => {
  const shared = time.map((t) => Math.sin(t));
  const commonModes: CommonModes = { key: 'm', time, modes: [shared], explained: [1], starsUsed: 9 };
  const values = noisy(time, 'own', (t) => 0.003 * Math.sin(t) - (awayFrom(t, 3, 1) < 0.1 ? 0.01 : 0));
  const curve = makeLightCurve([makeColumn(values)], { time });
  const protectedEvents = [{ periodDays: 3, epochDays: 1, durationDays: 0.2 }];

  it('are fitted and taken out, protected points without weight', async () => {
    const job = makeJob(curve, { commonModes: 1 }, { commonModes, protectedEvents });
    const series = await prepare(job);
    expect(series.scatter).toBeLessThan(1.1 * SIGMA);
    const inside = series.flux.filter((_, i) => awayFrom(series.time[i]!, 3, 1) < 0.1);
    expect(1 - inside.reduce((sum, value) => sum + value, 0) / inside.length).toBeCloseTo(0.01, 3);
  });

  it('are needed, and their lack at some times or in number is told', async () => {
    expect(await sentenceOf(makeJob(curve, { commonModes: 1 }))).toContain('common modes');
    const half = { ...commonModes, time: time.subarray(0, 480), modes: [shared.subarray(0, 480)] };
    const series = await prepare(makeJob(curve, { commonModes: 2 }, { commonModes: half, protectedEvents }));
    expect(series.flux.every(Number.isFinite)).toBe(true);
    expect(series.warnings.join()).toMatch(/480 points lie at times without common modes/);
    expect(series.warnings.join()).toMatch(/has 1 common mode, 2 were asked for/);
  });
});

describe('times of the instrument', () => {
  it('are left out with their reason, before excluded spans are looked at', async () => {
    const instrumentSpans = [
      { start: 9, end: 9.2 },
      { start: 1, end: 1.5 },
      { start: 1.2, end: 1.3 },
    ];
    const job = makeJob(curveWith({}), {}, { instrumentSpans, excluded: [{ start: 1.4, end: 2 }] });
    const series = await prepare(job);
    const isOut = (t: number): boolean => (t >= 1 && t <= 2) || (t >= 9 && t <= 9.2);
    expect(series.time.some(isOut)).toBe(false);
    expect(series.time.length + series.dropped.time.length).toBe(time.length);
    for (const [i, t] of series.dropped.time.entries())
      expect(series.dropped.reason[i]).toBe(t > 1.5 && t <= 2 ? 2 : 4);
    const all = makeJob(curveWith({}), {}, { instrumentSpans: [{ start: -1, end: 99 }] });
    expect(await sentenceOf(all)).toMatch(/Only 0 points .* 960 lie at times of the instrument/);
  });
});
