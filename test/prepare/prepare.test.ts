import { describe, expect, it } from 'vitest';
import { createPrepareService } from '../../workers/prepare/prepare-service.ts';
import { seedRandom } from '../reference/search/seeded-series.ts';
import { makeColumn, makeJob, makeLightCurve, prepare, sentenceOf } from './light-curve.ts';

const random = seedRandom(99);
const noise = (length: number, sigma: number, mean = 1): number[] =>
  Array.from({ length }, () => mean + sigma * random.normal());

describe('choice of points and column', () => {
  it('takes the most processed column, or the named one', async () => {
    const columns = [
      makeColumn([5, 5, 5, 5], { name: 'sap', meaning: 'raw' }),
      makeColumn([2, 2, 2, 2], { name: 'small', meaning: 'aperture' }),
      makeColumn([3, 3, 3, 3], { name: 'clean', meaning: 'corrected' }),
    ];
    const curve = makeLightCurve(columns);
    expect((await prepare(makeJob(curve, {}))).fluxColumn).toBe('clean');
    expect((await prepare(makeJob(curve, { fluxColumn: 'sap' }))).fluxColumn).toBe('sap');
    expect(await sentenceOf(makeJob(curve, { fluxColumn: 'x' }))).toMatch(/"x".*has "sap", "small", "clean"/);
  });

  it('counts the missing, drops flagged and excluded points and keeps their flux apart', async () => {
    const curve = makeLightCurve([makeColumn([2, Number.NaN, 4, 2, 6, 2, 2])], {
      quality: Int32Array.of(0, 4, 1, 2, 0, 0, 0),
    });
    const series = await prepare(makeJob(curve, { qualityMask: 1 }, { excluded: [{ start: 4 / 48, end: 4.5 / 48 }] }));
    expect(series.missing).toBe(1);
    expect([...series.sourceIndex]).toEqual([0, 3, 5, 6]);
    expect([...series.raw]).toEqual([1, 1, 1, 1]);
    expect([...series.dropped.raw]).toEqual([2, 3]);
    expect([...series.dropped.reason]).toEqual([0, 2]);
    expect([...series.dropped.time]).toEqual([2 / 48, 4 / 48]);
    const strict = await prepare(makeJob(curve, { qualityMask: -1 }));
    expect([...strict.sourceIndex]).toEqual([0, 4, 5, 6]);
  });

  it('says what is left when too little is', async () => {
    const curve = makeLightCurve([makeColumn([1, 1, Number.NaN, 1])], { quality: Int32Array.of(1, 0, 0, 1) });
    expect(await sentenceOf(makeJob(curve, {}))).toMatch(/Only 1 points.*1 have no flux, 2 are flagged/);
  });
});

describe('normalising', () => {
  it('turns magnitudes and their errors into flux by Pogson (1856)', async () => {
    // One magnitude is a factor of 10^0.4 = 2.511886 (definition).
    const column = makeColumn([12, 11, 12, 13, 12], { unit: 'magnitude', error: new Float64Array(5).fill(0.01) });
    const series = await prepare(makeJob(makeLightCurve([column]), {}));
    expect(series.raw[1]).toBeCloseTo(2.511886, 6);
    expect(series.raw[3]).toBeCloseTo(1 / 2.511886, 6);
    expect(series.error[0]).toBeCloseTo(0.01 * 0.921034, 6);
    expect(series.error[1]).toBeCloseTo(0.01 * 0.921034 * 2.511886, 6);
  });

  it('turns ppm into relative flux, and divides electrons by their median', async () => {
    const ppm = makeColumn([0, 100, -100, 0, -4000], { unit: 'ppm', error: new Float64Array(5).fill(80) });
    const series = await prepare(makeJob(makeLightCurve([ppm]), {}));
    expect(series.flux[4]).toBeCloseTo(0.996, 12);
    expect(series.error[4]).toBeCloseTo(8e-5, 12);
    const electrons = makeColumn([200, 202, 198, 200], { unit: 'electron/s', error: Float64Array.of(1, 1, 1, 1) });
    const bright = await prepare(makeJob(makeLightCurve([electrons]), {}));
    expect(bright.flux[1]).toBeCloseTo(1.01, 12);
    expect(bright.error[1]).toBeCloseTo(0.005, 12);
  });

  it('keeps depths in sigma where the flux is in sigma, trend or not', async () => {
    const flux = noise(400, 1, 0).map((value, i) => value + 3 * Math.sin(i / 60) - (i === 200 ? 12 : 0));
    const detrend = { kind: 'biweight', windowDays: 1 } as const;
    const series = await prepare(makeJob(makeLightCurve([makeColumn(flux, { unit: 'sigma' })]), { detrend }));
    expect(series.scatter).toBeGreaterThan(0.8);
    expect(series.scatter).toBeLessThan(1.2);
    expect(series.flux[200]! - 1).toBeLessThan(-9);
    expect(series.warnings.join()).toMatch(/depths are in sigma/);
  });

  it.each([0, -3])('refuses to divide by a median of %s', async (value) => {
    const curve = makeLightCurve([makeColumn([value, value, value, value])]);
    expect(await sentenceOf(makeJob(curve, {}))).toMatch(/must be positive/);
  });
});

describe('errors', () => {
  it('are estimated where the file has none, and say so', async () => {
    const series = await prepare(makeJob(makeLightCurve([makeColumn(noise(3000, 0.002))]), {}));
    expect(series.errorOrigin).toBe('estimated');
    expect(Math.abs(series.error[7]! / 0.002 - 1)).toBeLessThan(0.1);
    expect(series.warnings.join()).toMatch(/has no errors: .* ppm was estimated/);
  });

  it('take the median where a few are unusable, and are estimated where most are', async () => {
    const flux = noise(500, 0.002);
    const few = flux.map((_, i) => [0.002, Number.NaN, 0][i] ?? 0.002);
    const some = await prepare(makeJob(makeLightCurve([makeColumn(flux, { error: Float64Array.from(few) })]), {}));
    expect(some.errorOrigin).toBe('given');
    expect(some.error[2]! / some.error[0]!).toBeCloseTo(1, 9);
    expect(some.warnings.join()).toMatch(/2 points .* no usable error/);
    const none = await prepare(makeJob(makeLightCurve([makeColumn(flux, { error: new Float64Array(500) })]), {}));
    expect(none.errorOrigin).toBe('estimated');
  });

  it('are doubted when the scatter says otherwise, and positive for flux that does not vary', async () => {
    const error = new Float64Array(500).fill(0.0002);
    const low = await prepare(makeJob(makeLightCurve([makeColumn(noise(500, 0.002), { error })]), {}));
    expect(low.warnings.join()).toMatch(/times smaller than the scatter/);
    const flat = await prepare(makeJob(makeLightCurve([makeColumn(new Array(50).fill(7))]), {}));
    expect(flat.error.every((sigma) => sigma > 0)).toBe(true);
  });
});

describe('clipping', () => {
  const flux = noise(1000, 0.001);
  flux[100] = 1.02;
  flux[200] = 0.98;
  const curve = makeLightCurve([makeColumn(flux)]);

  it.each([
    ['high', [100]],
    ['low', [200]],
    ['both', [100, 200]],
  ] as const)('drops outliers on the %s side and keeps them to be drawn', async (side, expected) => {
    const series = await prepare(makeJob(curve, { clip: { kind: 'sigma', side, sigma: 5 } }));
    expect([...series.dropped.time].map((time) => Math.round(time * 48))).toEqual(expected);
    expect([...series.dropped.reason].every((reason) => reason === 1)).toBe(true);
    expect(series.dropped.raw[0]).toBeCloseTo(flux[expected[0]]!, 3);
    expect(series.flux).toHaveLength(1000 - expected.length);
  });

  it('spares points in protected events', async () => {
    const clip = { kind: 'sigma', side: 'both', sigma: 5 } as const;
    const spared = { protectedIntervals: [{ start: 199.5 / 48, end: 200.5 / 48 }] };
    expect([...(await prepare(makeJob(curve, { clip }, spared))).dropped.time]).toEqual([100 / 48]);
  });
});

describe('the preparing service', () => {
  it('hears a cancel in the middle of a trend', async () => {
    const service = createPrepareService();
    const curve = makeLightCurve([makeColumn(noise(60_000, 0.001))]);
    const job = makeJob(curve, { detrend: { kind: 'biweight', windowDays: 40 } });
    const running = service.prepare(job);
    await service.cancel('j');
    expect(await running).toEqual({ kind: 'cancelled' });
  });

  it('echoes the key', async () => {
    const outcome = await createPrepareService().prepare(makeJob(makeLightCurve([makeColumn([1, 1, 1])]), {}));
    expect(outcome).toMatchObject({ kind: 'done', value: { key: 'k' } });
  });
});
