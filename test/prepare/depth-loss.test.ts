import { describe, expect, it } from 'vitest';
import type { FluxUnit, LightCurve } from '../../src/core/light-curve.ts';
import type { Recipe } from '../../src/core/recipe.ts';
import { injectDips } from '../../workers/prepare/inject-dips.ts';
import { createPrepareService } from '../../workers/prepare/prepare-service.ts';
import { expectDone } from '../search/search-box.ts';
import { makeColumn, makeJob, makeLightCurve, prepare } from './light-curve.ts';
import { awayFrom, noisy, times } from './noisy-series.ts';

const time = times(27, 1 / 96);
const ephemeris = { periodDays: 3, epochDays: 1, durationDays: 0.2 };
const flux = noisy(time, 'loss', (t) => 0.003 * Math.sin(t) - (awayFrom(t, 3, 1) < 0.1 ? 0.004 : 0));
const curve = makeLightCurve([makeColumn(flux)], { time });

function lossOf(recipe: Partial<Recipe>, event = ephemeris, lightCurve: LightCurve = curve, depth = 0.004) {
  const { protectedEvents: _, ...job } = makeJob(lightCurve, recipe);
  return createPrepareService().measureDepthLoss({ ...job, ephemeris: event, depth });
}
const biweight = (windowDays: number) => ({ detrend: { kind: 'biweight', windowDays } }) as const;

describe('loss of depth', () => {
  it('is none without a trend, little in a wide window and large in a narrow one', async () => {
    const none = expectDone(await lossOf({}));
    expect(none.keptFraction).toBeCloseTo(1, 2);
    expect(none).toMatchObject({ key: 'k', injections: 8 });
    const wide = expectDone(await lossOf(biweight(1.5)));
    expect(wide.keptFraction).toBeGreaterThan(0.95);
    expect(wide.keptFraction).toBeLessThan(1.03);
    expect(wide.keptFractionError).toBeGreaterThan(0);
    expect(wide.keptFractionError).toBeLessThan(0.02);
    const narrow = expectDone(await lossOf(biweight(0.25)));
    expect(narrow.keptFraction).toBeLessThan(0.7);
    expect(narrow.keptFraction).toBeGreaterThan(0);
  });

  it('is what the real dips lose', async () => {
    const depthBy = async (windowDays: number) => {
      const series = await prepare(makeJob(curve, biweight(windowDays)));
      const meanOf = (isIn: boolean) => {
        const part = series.flux.filter((_, i) => awayFrom(series.time[i]!, 3, 1) < 0.1 === isIn);
        return part.reduce((sum, value) => sum + value, 0) / part.length;
      };
      return meanOf(false) - meanOf(true);
    };
    const { keptFraction } = expectDone(await lossOf(biweight(0.35)));
    expect(Math.abs((await depthBy(0.35)) / 0.004 - keptFraction)).toBeLessThan(0.08);
  });

  it('is small where the recipe protects its events, as the injected ones then are', async () => {
    const kept = expectDone(await lossOf({ ...biweight(0.35), protectCases: true }));
    expect(kept.keptFraction).toBeGreaterThan(0.97);
    expect(kept.keptFraction).toBeLessThan(1.03);
  });

  it('is measured for a single event of a period beyond the data', async () => {
    const single = { periodDays: 300, epochDays: 13, durationDays: 0.3 };
    const wide = expectDone(await lossOf(biweight(1.5), single));
    expect(wide.injections).toBe(8);
    // Five durations in a window, and one event: a tenth is lost, more than with many events of two thirds as long.
    expect(wide.keptFraction).toBeGreaterThan(0.85);
    expect(wide.keptFraction).toBeLessThan(0.97);
  });

  it('is refused where the events fill the cycle, and for no dip', async () => {
    const full = await lossOf(biweight(1.5), { periodDays: 0.5, epochDays: 0, durationDays: 0.2 });
    expect(full).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining('6 are needed') } });
    const nothing = await lossOf(biweight(1.5), ephemeris, curve, 0);
    expect(nothing).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining('above 0') } });
    const missing = await lossOf({ fluxColumn: 'x' });
    expect(missing).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining('"x"') } });
  });

  it('hears a cancel', async () => {
    const service = createPrepareService();
    const { protectedEvents: _, ...job } = makeJob(curve, biweight(1.5));
    const running = service.measureDepthLoss({ ...job, ephemeris, depth: 0.004 });
    await service.cancel('j');
    expect(await running).toEqual({ kind: 'cancelled' });
  });
});

describe('dips put in', () => {
  it.each<[FluxUnit, number[], number[]]>([
    ['relative', [1, 1, 1], [1, 0.99, 1]],
    ['electron/s', [200, 200, 200], [200, 198, 200]],
    ['ppm', [100, 100, 100], [100, 100 - 1.0001e4, 100]],
    // Pogson: a hundredth less is 2.5 log10(1 / 0.99) = 0.010912 magnitudes fainter.
    ['magnitude', [12, 12, 12], [12, 12.010912, 12]],
  ])('dim flux in %s', (unit, before, after) => {
    const column = makeColumn(before, { unit });
    const given = makeLightCurve([makeColumn([9, 9, 9], { name: 'other' }), column]);
    const event = { periodDays: 50, epochDays: 1 / 48, durationDays: 1 / 48 };
    const { fluxColumns } = injectDips(given, column, event, 0.01);
    after.forEach((value, i) => void expect(fluxColumns[1]!.flux[i]).toBeCloseTo(value, 5));
    expect([...fluxColumns[0]!.flux]).toEqual([9, 9, 9]);
    expect([...column.flux]).toEqual(before);
  });

  it('keep their number in sigma', () => {
    const column = makeColumn([0, 0, 0], { unit: 'sigma' });
    const event = { periodDays: 50, epochDays: 1 / 48, durationDays: 1 / 48 };
    expect([...injectDips(makeLightCurve([column]), column, event, 3).fluxColumns[0]!.flux]).toEqual([0, -3, 0]);
  });
});

describe('a window too short for a known event', () => {
  it('is worth a sentence, for protected events and intervals alike', async () => {
    const events = { protectedEvents: [{ periodDays: 3.1, epochDays: 1, durationDays: 0.19 }] };
    const { warnings } = await prepare(makeJob(curve, biweight(0.4), events));
    expect(warnings.join()).toContain('The window of 0.4 d is 2.1 durations of the event at 3.1 d');
    const single = { protectedIntervals: [{ start: 12, end: 12.5 }] };
    const spline = await prepare(makeJob(curve, { detrend: { kind: 'spline', knotDays: 1 } }, single));
    expect(spline.warnings.join()).toContain('The knot distance of 1 d is 2.0 durations of the event at time 12.25 d');
    expect((await prepare(makeJob(curve, biweight(1.5), events))).warnings.join()).not.toContain('durations');
    expect((await prepare(makeJob(curve, {}, single))).warnings.join()).not.toContain('durations');
  });
});
