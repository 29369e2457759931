import { describe, expect, it } from 'vitest';
import type { LightCurve } from '../../src/core/light-curve.ts';
import { findDrops } from '../../workers/prepare/find-drops.ts';
import { findFlares } from '../../workers/prepare/find-flares.ts';
import { createPrepareService } from '../../workers/prepare/prepare-service.ts';
import { createLehmer } from '../demo/lehmer.mjs';
import { expectDone } from '../search/search-box.ts';
import { makeColumn, makeJob, makeLightCurve, prepare, sentenceOf } from './light-curve.ts';

const SIGMA = 4e-4;
const times = (days: number, cadenceDays: number): Float64Array =>
  Float64Array.from({ length: Math.round(days / cadenceDays) }, (_, i) => i * cadenceDays);
const CADENCES = [
  ['2 min', 2 / 1440],
  ['30 min', 1 / 48],
] as const;

function noisy(time: Float64Array, seed: string, shape: (t: number) => number): Float64Array {
  const random = createLehmer(seed);
  return time.map((t) => 1 + shape(t) + SIGMA * random.normal());
}

const flare = (t: number, at: number, height: number, decay: number): number =>
  t < at - 0.01 ? 0 : t < at ? (height * (t - at + 0.01)) / 0.01 : height * Math.exp(-(t - at) / decay);
const unprotected = (time: Float64Array) => new Uint8Array(time.length);

describe('flares', () => {
  it.each(CADENCES)('are found with their tails at %s', (_, cadence) => {
    const time = times(10, cadence);
    const flux = noisy(time, 'flare', (t) => flare(t, 3.3, 0.02, 0.06) + flare(t, 7.1, 0.012, 0.08));
    const flares = findFlares(time, flux, unprotected(time));
    expect(flares).toHaveLength(2);
    expect(flares[0]!.start).toBeLessThan(3.3);
    expect(flares[0]!.end).toBeGreaterThan(3.3 + 0.06 * Math.log(0.02 / (3 * SIGMA)));
    expect(flares[0]!.end).toBeLessThan(3.9);
  });

  it.each(CADENCES)('are not pulsations, rotation, eclipses or noise at %s', (_, cadence) => {
    const time = times(10, cadence);
    for (const period of [0.12, 0.3, 0.6, 1])
      for (const amplitude of [0.002, 0.02]) {
        if (period < 6 * cadence) continue;
        const flux = noisy(time, `sine ${period}`, (t) => amplitude * Math.sin((2 * Math.PI * t) / period));
        expect(findFlares(time, flux, unprotected(time))).toEqual([]);
      }
    const eclipses = noisy(time, 'eclipse', (t) => -0.3 * Math.max(0, 1 - Math.abs(((t + 0.7) % 1.4) - 0.7) / 0.15));
    expect(findFlares(time, eclipses, unprotected(time))).toEqual([]);
    expect(
      findFlares(
        time,
        noisy(time, 'noise', () => 0),
        unprotected(time),
      ),
    ).toEqual([]);
  });

  it('are left out of the series with their reason, and never out of protected events', async () => {
    const time = times(10, 2 / 1440);
    const curve = makeLightCurve([makeColumn(noisy(time, 'flare', (t) => flare(t, 3.3, 0.02, 0.06)))], { time });
    const series = await prepare(makeJob(curve, { maskFlares: true }));
    expect(series.flares).toHaveLength(1);
    expect(series.time.length).toBeLessThan(time.length - 50);
    expect(series.dropped.reason.every((reason) => reason === 3)).toBe(true);
    const protectedIntervals = [{ start: 3, end: 4 }];
    expect((await prepare(makeJob(curve, { maskFlares: true }, { protectedIntervals }))).flares).toEqual([]);
  });
});

const drop = (t: number, at: number, depth: number): number => (t < at ? 0 : -depth * Math.exp(-(t - at) / 2));

describe('sudden drops', () => {
  it.each(CADENCES)('with slow recovery are found at %s, and split the series', async (_, cadence) => {
    const time = times(14, cadence);
    const flux = noisy(time, 'drop', (t) => drop(t, 5.5, 0.006));
    const found = findDrops(time, flux);
    expect(found).toHaveLength(1);
    expect(Math.abs(time[found[0]!]! - 5.5)).toBeLessThan(1.5 * cadence);
    const curve = makeLightCurve([makeColumn(flux)], { time });
    const series = await prepare(
      makeJob(curve, { splitAtDrops: true, detrend: { kind: 'biweight', windowDays: 1.5 } }),
    );
    expect(series.drops).toHaveLength(1);
    expect(series.pieceStarts).toHaveLength(2);
    expect(series.scatter).toBeLessThan(1.3 * SIGMA);
    expect(series.isAtEdge[series.pieceStarts[1]!]).toBe(1);
  });

  it.each(CADENCES)('are not dips of any length, deep eclipses, variation or noise at %s', (_, cadence) => {
    const time = times(14, cadence);
    for (const hours of [1, 3, 6, 12])
      for (const depth of [0.004, 0.05]) {
        const flux = noisy(time, `dip ${hours}`, (t) => (Math.abs(t - 6.2) < hours / 48 ? -depth : 0));
        expect(findDrops(time, flux)).toEqual([]);
      }
    const deep = noisy(time, 'deep', (t) => -0.4 * Math.max(0, 1 - Math.abs(((t + 1) % 2.1) - 1.05) / 0.2));
    expect(findDrops(time, deep)).toEqual([]);
    const wave = noisy(time, 'wave', (t) => 0.02 * Math.sin((2 * Math.PI * t) / 3));
    expect(findDrops(time, wave)).toEqual([]);
    expect(
      findDrops(
        time,
        noisy(time, 'still', () => 0),
      ),
    ).toEqual([]);
  });
});

describe('regression on covariates', () => {
  const time = times(20, 1 / 48);
  const random = createLehmer('covariates');
  const airmass = time.map((t) => 1 + Math.abs((t % 1) - 0.5));
  const jitter = time.map(() => random.normal());
  const flux = noisy(time, 'regress', () => 0).map(
    (value, i) => value + 0.004 * (airmass[i]! - 1.25) + 0.002 * jitter[i]!,
  );
  const curve = makeLightCurve([makeColumn(flux)], { time, covariates: { airmass, jitter, flat: time.map(() => 3) } });

  it('takes out what the columns explain', async () => {
    const covariates = { names: ['airmass', 'jitter', 'flat'], per: 'series' } as const;
    expect((await prepare(makeJob(curve, {}))).scatter).toBeGreaterThan(4 * SIGMA);
    expect((await prepare(makeJob(curve, { covariates }))).scatter).toBeLessThan(1.1 * SIGMA);
  });

  it('does so night by night, without points that miss a column, and says which column is not there', async () => {
    const gappy = { ...airmass, 5: Number.NaN };
    const nights = Float64Array.from(time, (t, i) => Math.floor(i / 24) + (i % 24) / 48 + 0 * t);
    const broken = makeLightCurve([makeColumn(flux)], {
      time: nights,
      covariates: { airmass: Float64Array.from(airmass, (value, i) => (i === 5 ? gappy[5] : value)), jitter },
    });
    const covariates = { names: ['airmass', 'jitter'], per: 'night' } as const;
    const series = await prepare(makeJob(broken, { covariates }));
    expect(series.flux.every(Number.isFinite)).toBe(true);
    expect(series.scatter).toBeLessThan(1.2 * SIGMA);
    const absent = { names: ['seeing'], per: 'series' } as const;
    expect(await sentenceOf(makeJob(curve, { covariates: absent }))).toContain('"seeing"');
  });

  it('does not bend to events without weight', async () => {
    const isInside = (t: number): boolean => Math.abs(((t + 1) % 2) - 1) < 0.08;
    const dipped = makeLightCurve([makeColumn(flux.map((value, i) => value - (isInside(time[i]!) ? 0.02 : 0)))], {
      time,
      covariates: { event: time.map((t) => (isInside(t) ? 1 : 0)), jitter },
    });
    const covariates = { names: ['event', 'jitter'], per: 'series' } as const;
    const ephemeris = { periodDays: 2, epochDays: 0, durationDays: 0.2 };
    const series = await prepare(makeJob(dipped, { covariates }, { protectedEvents: [ephemeris] }));
    const inside = series.flux.filter((_, i) => isInside(series.time[i]!));
    expect(1 - inside.reduce((sum, value) => sum + value, 0) / inside.length).toBeGreaterThan(0.018);
  });
});

describe('common modes', () => {
  const time = times(12, 1 / 48);
  const shared = time.map((t) => 0.003 * Math.sin(t) + (t > 6 ? 0.002 * Math.exp(-(t - 6)) : 0));
  const star = (number: number, gain: number) => ({
    time,
    flux: noisy(time, `star ${number}`, () => 0).map((value, i) => value + gain * shared[i]!),
    masked: [],
  });
  const stars = Array.from({ length: 12 }, (_, i) => star(i, 0.5 + 0.1 * i));
  const service = createPrepareService();
  const find = (given: typeof stars, modeCount = 2) =>
    service.findCommonModes({ jobId: '', key: 'm', stars: given, modeCount });

  it('are what the stars share, and leave the rest', async () => {
    const modes = expectDone(await find(stars));
    expect(modes.starsUsed).toBe(12);
    expect(modes.explained[0]!).toBeGreaterThan(0.5);
    const curve = makeLightCurve([makeColumn(star(50, 1).flux)], { time });
    expect((await prepare(makeJob(curve, { commonModes: 1 }, { commonModes: modes }))).scatter).toBeLessThan(
      1.15 * SIGMA,
    );
    expect((await prepare(makeJob(curve, {}))).scatter).toBeGreaterThan(2.5 * SIGMA);
  });

  it('have the shape that the stars were given', async () => {
    const modes = expectDone(await find(stars, 1));
    const correlation = correlate(
      modes.modes[0]!,
      shared.map((value) => value - mean(shared)),
    );
    expect(Math.abs(correlation)).toBeGreaterThan(0.97);
  });

  it('need eight quiet stars', async () => {
    expect(await find(stars.slice(0, 5))).toMatchObject({
      kind: 'failed',
      error: { sentence: expect.stringContaining('8 quiet stars') },
    });
    const curve = makeLightCurve([makeColumn(star(50, 1).flux)], { time });
    expect(await sentenceOf(makeJob(curve, { commonModes: 1 }))).toContain('common modes');
  });
});

const mean = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0) / values.length;

function correlate(a: Float64Array, b: Float64Array): number {
  const dot = (x: Float64Array, y: Float64Array) => x.reduce((sum, value, i) => sum + value * y[i]!, 0);
  return dot(a, b) / Math.sqrt(dot(a, a) * dot(b, b));
}

describe('times of the instrument', () => {
  it('are left out with their reason', async () => {
    const time = times(3, 1 / 48);
    const curve = makeLightCurve([makeColumn(noisy(time, 'dump', () => 0))], { time });
    const series = await prepare(makeJob(curve, {}, { instrumentSpans: [{ start: 1, end: 1.5 }] }));
    expect(series.time.some((t) => t >= 1 && t <= 1.5)).toBe(false);
    expect(series.dropped.reason.every((reason) => reason === 4)).toBe(true);
  });
});

describe('loss of depth', () => {
  const time = times(27, 1 / 96);
  const isInside = (t: number): boolean => Math.abs(((t - 1 + 1.5) % 3) - 1.5) < 0.1;
  const curve: LightCurve = makeLightCurve(
    [makeColumn(noisy(time, 'loss', (t) => 0.003 * Math.sin(t) - (isInside(t) ? 0.004 : 0)))],
    { time },
  );
  const ephemeris = { periodDays: 3, epochDays: 1, durationDays: 0.2 };
  const lossOf = async (windowDays: number) => {
    const { protectedEvents, ...job } = makeJob(curve, { detrend: { kind: 'biweight', windowDays } });
    expect(protectedEvents).toEqual([]);
    return expectDone(await createPrepareService().measureDepthLoss({ ...job, ephemeris, depth: 0.004 }));
  };

  it('is little in a wide window and large in a narrow one', async () => {
    const wide = await lossOf(1.5);
    expect(wide.keptFraction).toBeGreaterThan(0.95);
    expect(wide.keptFraction).toBeLessThan(1.05);
    expect(wide.injections).toBeGreaterThan(5);
    expect((await lossOf(0.25)).keptFraction).toBeLessThan(0.7);
  });
});

describe('a window too short for a protected event', () => {
  it('is worth a warning', async () => {
    const time = times(9, 1 / 48);
    const curve = makeLightCurve([makeColumn(noisy(time, 'short', () => 0))], { time });
    const protectedEvents = [{ periodDays: 3, epochDays: 1, durationDays: 0.3 }];
    const { warnings } = await prepare(
      makeJob(curve, { detrend: { kind: 'biweight', windowDays: 0.6 } }, { protectedEvents }),
    );
    expect(warnings.join(' ')).toContain('2.0 durations of the event at 3 d');
  });
});
