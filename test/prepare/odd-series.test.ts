import { describe, expect, it } from 'vitest';
import { DEFAULT_RECIPE, type Detrend } from '../../src/core/recipe.ts';
import { makeColumn, makeJob, makeLightCurve, prepare, sentenceOf } from './light-curve.ts';
import { noisy, times } from './noisy-series.ts';

const DETRENDS: readonly Detrend[] = [
  { kind: 'none' },
  { kind: 'biweight', windowDays: 1.5 },
  { kind: 'running median', windowDays: 1.5 },
  { kind: 'savitzky-golay', windowDays: 1.5, degree: 3 },
  { kind: 'spline', knotDays: 1 },
  { kind: 'harmonics', count: 4 },
];

describe.each(DETRENDS)('the default recipe with $kind', (detrend) => {
  const recipe = { ...DEFAULT_RECIPE, detrend, covariates: { names: ['x'], per: 'night' } } as const;
  const prepared = (flux: ArrayLike<number>, time: Float64Array, error?: Float64Array) => {
    const curve = makeLightCurve([makeColumn(flux, { error })], { time, covariates: { x: time.map(Math.sin) } });
    return makeJob(curve, recipe);
  };

  it('says that nothing and one point are too few', async () => {
    expect(await sentenceOf(prepared([], new Float64Array(0)))).toMatch(/Only 0 points/);
    expect(await sentenceOf(prepared([1], Float64Array.of(3)))).toMatch(/Only 1 points/);
    expect(await sentenceOf(prepared([Number.NaN, 1, 1], times(3, 1)))).toMatch(/Only 2 points .* 1 have no flux/);
  });

  it('takes three points, constant flux, equal times and far outliers', async () => {
    const three = await prepare(prepared([1, 1, 1], times(0.15, 0.05)));
    expect(three.flux.every(Number.isFinite)).toBe(true);
    const flat = await prepare(prepared(new Float64Array(500).fill(42), times(500 / 48, 1 / 48)));
    for (const value of flat.flux) expect(value).toBeCloseTo(1, 12);
    expect(flat).toMatchObject({ flares: [], drops: [], scatter: expect.closeTo(0, 12) });
    const time = times(12, 1 / 48).map((_, i) => Math.floor(i / 2) / 24);
    const flux = noisy(time, 'odd');
    flux[40] = 1e6;
    flux[41] = -1e6;
    // Plain least squares of a window has to follow what is in it; that is a sentence and no result.
    if (detrend.kind === 'savitzky-golay') {
      expect(await sentenceOf(prepared(flux, time))).toMatch(/The trend falls to .* exclude that span/);
      return;
    }
    const equal = await prepare(prepared(flux, time));
    expect([...equal.flux, ...equal.error].every(Number.isFinite)).toBe(true);
    expect(equal.scatter).toBeLessThan(6e-4);
  });

  it('takes errors that are missing, zero or huge', async () => {
    const time = times(12, 1 / 48);
    const error = time.map((_, i) => [Number.NaN, 0, 1e30, Number.POSITIVE_INFINITY][i] ?? 4e-4);
    const series = await prepare(prepared(noisy(time, 'errors'), time, error));
    expect(series.errorOrigin).toBe('given');
    expect(series.error.every((sigma) => sigma > 0 && Number.isFinite(sigma))).toBe(true);
    expect(series.pieceStarts[0]).toBe(0);
    expect(series.isAtEdge).toHaveLength(series.time.length);
  });
});
