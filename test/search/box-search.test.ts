import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_BOX_SEARCH } from '../../src/core/box-search-settings.ts';
import { measureBox } from '../../src/core/measure-box.ts';
import { makeBoxWork, makeTrialBox, searchTrial } from '../../workers/search/box-search.ts';
import { planBoxSearch } from '../../workers/search/plan-box-search.ts';
import { makeBoxSeries, searchBox } from './search-box.ts';

const SAMPLING = { points: 1200, cadenceDays: 1 / 48, sigma: 0.001 };
const SETTINGS = { shortestPeriodDays: 1, oversampling: 2 };
const signal = { periodDays: 3.3, epochDays: 101.1, durationDays: 0.16, depth: 0.003 };

describe('box search', () => {
  it('finds an injected box of S/N above 12 at any period and phase', async () => {
    const period = fc.double({ min: 1.2, max: 9, noNaN: true });
    const phase = fc.double({ min: 0, max: 1, noNaN: true });
    await fc.assert(
      fc.asyncProperty(period, phase, fc.integer({ min: 1, max: 1e6 }), async (periodDays, cycles, seed) => {
        const injected = { ...signal, periodDays, epochDays: 100 + cycles * periodDays, depth: 0.006 };
        const series = makeBoxSeries(seed, SAMPLING, [injected]);
        const truth = measureBox(series.time, series.flux, series.error, injected);
        // A period that puts all but one event between the points cannot be told.
        fc.pre(truth !== undefined && truth.signalToNoise > 12 && truth.eventCount >= 2);
        const peak = (await searchBox(series, SETTINGS)).peaks[0]!;
        expect(Math.abs(peak.periodDays - periodDays)).toBeLessThan(0.1 * periodDays * (0.16 / periodDays));
        expect(peak.signalToNoise).toBeGreaterThanOrEqual(0.997 * truth!.signalToNoise);
        expect(Math.abs((peak.boxDepth - 0.006) / peak.boxDepthError)).toBeLessThan(5);
      }),
      { numRuns: 25, seed: 20 },
    );
  });

  it('is blind to a shift of time and to a common factor of flux and error', async () => {
    const series = makeBoxSeries(5, SAMPLING, [signal]);
    const plain = await searchBox(series, SETTINGS);
    // A power of two keeps the differences of time exact.
    const shifted = await searchBox({ ...series, time: series.time.map((at) => at + 1024) }, SETTINGS);
    const scaled = await searchBox(
      { ...series, flux: series.flux.map((value) => 3 * value), error: series.error.map((sigma) => 3 * sigma) },
      SETTINGS,
    );
    for (const other of [shifted, scaled]) {
      other.signalToNoise.forEach((value, i) => void expect(value).toBeCloseTo(plain.signalToNoise[i]!, 6));
      // Where in its plateau of equal boxes a period lands is rounding's choice.
      const drift = other.peaks[0]!.periodDays - plain.peaks[0]!.periodDays;
      expect(Math.abs(drift)).toBeLessThan(0.5 * plain.peaks[0]!.periodErrorDays);
      expect(other.peaks[0]!.signalToNoise).toBeCloseTo(plain.peaks[0]!.signalToNoise, 6);
    }
    const epochShift = shifted.peaks[0]!.epochDays - plain.peaks[0]!.epochDays;
    expect(Math.abs(epochShift - 1024)).toBeLessThan(0.5 * plain.peaks[0]!.epochErrorDays);
    expect(scaled.peaks[0]!.boxDepth).toBeCloseTo(3 * plain.peaks[0]!.boxDepth, 9);
  });

  it('gives the same result in one, two and three parts', async () => {
    const series = makeBoxSeries(6, SAMPLING, [signal]);
    const whole = await searchBox(series, SETTINGS, 1);
    expect(await searchBox(series, SETTINGS, 2)).toEqual(whole);
    expect(await searchBox(series, SETTINGS, 3)).toEqual(whole);
  });

  it('finds an event across phase 0, which is the first time stamp', () => {
    const series = makeBoxSeries(7, SAMPLING, [{ ...signal, epochDays: 100 }]);
    const best = makeTrialBox();
    searchTrial(makeBoxWork(series), 3.3, Float64Array.of(0.16), { first: 0, last: 0 }, best);
    const fromStart = Math.min(best.epochDays - 100, 103.3 - best.epochDays);
    expect(fromStart).toBeLessThan(0.03);
    expect(best.depth).toBeCloseTo(0.003, 3);
  });

  it('finds nothing in flux that does not vary, and nothing in rises', async () => {
    const series = makeBoxSeries(8, SAMPLING, []);
    const flat = await searchBox({ ...series, flux: new Float64Array(series.flux.length).fill(1.5) }, SETTINGS);
    expect(flat.peaks).toEqual([]);
    expect(flat.signalToNoise.every((value) => value === 0)).toBe(true);
    const rises = makeBoxSeries(8, { ...SAMPLING, sigma: 1e-5 }, [{ ...signal, depth: -0.01 }]);
    for (const peak of (await searchBox(rises, SETTINGS)).peaks) expect(peak.boxDepth).toBeLessThan(0.001);
  });

  it('bridges a gap of most of the span', async () => {
    const series = makeBoxSeries(9, { ...SAMPLING, points: 2400 }, [{ ...signal, depth: 0.006 }]);
    const keep = series.time.map((at) => (at < 108 || at > 142 ? 1 : 0));
    const pick = (values: Float64Array) => values.filter((_, i) => keep[i] === 1);
    const gappy = { ...series, time: pick(series.time), flux: pick(series.flux), error: pick(series.error) };
    const { peaks } = await searchBox(gappy, SETTINGS);
    expect(Math.abs(peaks[0]!.periodDays - 3.3)).toBeLessThan(0.01);
  });
});

describe('box search of awkward series', () => {
  const time = fc.array(fc.double({ min: 0, max: 40, noNaN: true }), { minLength: 10, maxLength: 40 });

  it('gives finite numbers or a sentence, whatever the times: few points, gaps, equal times', async () => {
    await fc.assert(
      fc.asyncProperty(time, fc.integer({ min: 0, max: 9 }), async (values, copies) => {
        const sorted = Float64Array.from([...values, ...new Array<number>(copies).fill(values[0]!)]).sort();
        const flux = sorted.map((at) => 1 + 0.01 * Math.sin(77 * at));
        const series = { seriesId: '', time: sorted, flux, error: flux.map(() => 0.01) };
        const settings = { ...DEFAULT_BOX_SEARCH, oversampling: 0.5 };
        const planned = planBoxSearch(series, settings);
        if (planned.kind === 'failed') {
          expect(planned.error.sentence).toMatch(/\.$/);
          return;
        }
        const { peaks, signalToNoise, epochDays } = await searchBox(series, settings);
        expect([...signalToNoise, ...epochDays].every(Number.isFinite)).toBe(true);
        for (const { relatives, ...peak } of peaks)
          for (const one of [peak, ...relatives])
            for (const value of Object.values(one))
              expect(typeof value === 'string' || Number.isFinite(value)).toBe(true);
      }),
      { numRuns: 40, seed: 5 },
    );
  });
});

describe('peaks', () => {
  const second = { periodDays: 5.17, epochDays: 102.4, durationDays: 0.2, depth: 0.003 };
  const sampling = { points: 2400, cadenceDays: 1 / 48, sigma: 0.0006 };

  it('lists two signals apart, without the shoulders and harmonics of the stronger', async () => {
    const series = makeBoxSeries(11, sampling, [{ ...signal, depth: 0.006 }, second]);
    const { peaks, sde, signalToNoise } = await searchBox(series, SETTINGS);
    expect(peaks.length).toBeLessThanOrEqual(5);
    expect(Math.abs(peaks[0]!.periodDays - 3.3)).toBeLessThan(0.005);
    expect(Math.abs(peaks[1]!.periodDays - 5.17)).toBeLessThan(0.01);
    for (const other of peaks.slice(2)) expect(other.signalToNoise).toBeLessThan(10);
    expect(peaks[0]!.sde).toBe(Math.max(...sde));
    expect(peaks[0]!.signalToNoise).toBeGreaterThanOrEqual(Math.max(...signalToNoise));
  });

  it('counts events with points and the points in them', async () => {
    const series = makeBoxSeries(12, sampling, [{ ...signal, depth: 0.006 }]);
    const peak = (await searchBox(series, SETTINGS)).peaks[0]!;
    const measure = measureBox(series.time, series.flux, series.error, peak)!;
    expect(peak.eventCount).toBe(15);
    expect(peak.pointsInEvents).toBe(measure.pointsInside);
    expect(peak.signalToNoise).toBeCloseTo(measure.signalToNoise, 9);
    expect(peak.boxDepthError).toBeCloseTo(measure.depthError, 12);
  });
});
