import { describe, expect, it } from 'vitest';
import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { relatePeriods } from '../../workers/search/peak-relation.ts';
import { windowFrequencies } from '../../workers/search/window-frequencies.ts';
import { createLehmer } from '../demo/lehmer.mjs';
import { makeBoxSeries, searchBox } from './search-box.ts';

const SAMPLING = { points: 3000, cadenceDays: 1 / 72, sigma: 0.001 };
const SETTINGS = { shortestPeriodDays: 0.7, oversampling: 3 };
const planet = { periodDays: 4.1, epochDays: 101.3, durationDays: 0.16, depth: 0.004 };

const near = (a: number, b: number, part = 0.005) => Math.abs(a / b - 1) < part;

describe('signals of a search', () => {
  it('has harmonics under the signal that makes them, with a reason, and not beside it', async () => {
    const { peaks, holdBack } = await searchBox(makeBoxSeries(1, SAMPLING, [planet]), SETTINGS);
    expect(near(peaks[0]!.periodDays, 4.1)).toBe(true);
    const relations = peaks[0]!.relatives.map(({ relation }) => relation);
    expect(relations).toContain('2P');
    expect(relations).toContain('P/2');
    for (const relative of peaks[0]!.relatives) expect(relative.reason).toMatch(/S\/N falls from/);
    for (const other of peaks.slice(1))
      for (const factor of [0.5, 2, 3, 1 / 3]) expect(near(other.periodDays, 4.1 * factor, 0.001)).toBe(false);
    expect(holdBack).toBeUndefined();
  });

  it('keeps a second planet beside the first', async () => {
    const second = { periodDays: 8.9, epochDays: 103.9, durationDays: 0.2, depth: 0.003 };
    const { peaks } = await searchBox(makeBoxSeries(2, SAMPLING, [planet, second]), SETTINGS);
    expect(peaks.slice(0, 2).map(({ periodDays }) => Math.round(periodDays * 10) / 10)).toEqual([4.1, 8.9]);
  });

  it('holds the next round back on unlike odd and even events', async () => {
    const primary = { periodDays: 8.2, epochDays: 101.3, durationDays: 0.16, depth: 0.01 };
    const secondary = { ...primary, epochDays: 105.4, depth: 0.006 };
    const { peaks, holdBack } = await searchBox(makeBoxSeries(3, SAMPLING, [primary, secondary]), SETTINGS);
    expect(peaks.length).toBeGreaterThan(0);
    expect(holdBack).toMatch(/σ/);
  });

  it('holds the next round back on a second dip at the same period', async () => {
    const primary = { ...planet, depth: 0.02 };
    const secondary = { ...primary, epochDays: 101.3 + 4.1 * 0.37, depth: 0.003 };
    const { holdBack } = await searchBox(makeBoxSeries(4, SAMPLING, [primary, secondary]), SETTINGS);
    expect(holdBack).toMatch(/second dip at phase 0\.37|2\d{3} ppm/);
  });

  it('masks earlier signals and says so by what is found next', async () => {
    const second = { periodDays: 6.3, epochDays: 103.9, durationDays: 0.2, depth: 0.0025 };
    const series = makeBoxSeries(5, SAMPLING, [planet, second]);
    const first = await searchBox(series, SETTINGS);
    const { maskSignals } = await import('../../workers/search/mask-signals.ts');
    const masked = [first.peaks[0]!];
    const { peaks, settings } = await searchBox(maskSignals(series, masked), { ...SETTINGS, masked });
    expect(near(peaks[0]!.periodDays, 6.3)).toBe(true);
    expect(settings.round).toBe(2);
  });

  it('tells an alias of the nights from a signal of its own', async () => {
    const whole = makeBoxSeries(6, { points: 90 * 72, cadenceDays: 1 / 72, sigma: 0.001 }, [
      { periodDays: 2.71, epochDays: 101.3, durationDays: 0.16, depth: 0.008 },
    ]);
    const isNight = whole.time.map((t) => (t % 1 < 0.35 ? 1 : 0));
    const pick = (values: Float64Array) => values.filter((_, i) => isNight[i] === 1);
    const nights = { ...whole, time: pick(whole.time), flux: pick(whole.flux), error: pick(whole.error) };
    const { peaks } = await searchBox(nights, SETTINGS);
    expect(near(peaks[0]!.periodDays, 2.71, 0.01)).toBe(true);
    const aliases = [1, 2].flatMap((k) => [1 / (1 / 2.71 + k), 1 / Math.abs(1 / 2.71 - k)]);
    for (const other of peaks.slice(1))
      for (const alias of aliases) expect(near(other.periodDays, alias, 0.003)).toBe(false);
  });

  it('names ratios and aliases by the period and the spectral window', () => {
    const main = { periodDays: 2.71, epochDays: 1, durationDays: 0.16 };
    const nights = Float64Array.from({ length: 3000 }, (_, i) => Math.floor(i / 50) + (i % 50) * 0.007);
    const sampling = { spanDays: 60, windowFrequencies: windowFrequencies(nights) };
    const relationOf = (periodDays: number) => relatePeriods(main, { ...main, periodDays }, sampling)?.relation;
    expect(sampling.windowFrequencies[0]).toBeCloseTo(1, 1);
    expect(relationOf(5.42)).toBe('2P');
    expect(relationOf(2.71 / 3)).toBe('P/3');
    expect(relationOf(2.71 * 1.5)).toBe('3P/2');
    expect(relationOf(1 / (1 / 2.71 + 1))).toBe('daily alias');
    expect(relationOf(2.71 * 1.37)).toBeUndefined();
  });
});

/** Noise that is correlated over some hours, as of a first-order autoregression. */
function redSeries(seed: number, share: number): SearchSeries {
  const random = createLehmer(`red ${seed}`);
  let level = 0;
  const time = Float64Array.from({ length: 3000 }, (_, i) => 100 + i / 72);
  const flux = time.map(() => {
    level = 0.97 * level + share * 1e-3 * Math.sqrt(1 - 0.97 ** 2) * random.normal();
    return 1 + level + 1e-3 * random.normal();
  });
  return { seriesId: `red ${seed}`, time, flux, error: new Float64Array(3000).fill(1e-3) };
}

describe('correlated noise', () => {
  it('is none in white noise, and what was put in in red', async () => {
    const white = await searchBox(makeBoxSeries(11, SAMPLING, []), SETTINGS);
    for (const sigma of white.correlatedNoise.sigma) expect(sigma).toBeLessThan(2.5e-4);
    const red = await searchBox(redSeries(1, 1), SETTINGS);
    const at = red.correlatedNoise.durationsDays.findIndex((duration) => duration > 0.1);
    expect(red.correlatedNoise.sigma[at]!).toBeGreaterThan(4e-4);
    expect(red.correlatedNoise.sigma[at]!).toBeLessThan(1.4e-3);
  });

  it('lowers the S/N of what it makes, and may rank the trials', async () => {
    const series = redSeries(2, 1);
    const white = await searchBox(series, SETTINGS);
    for (const peak of white.peaks) expect(peak.correlatedSignalToNoise).toBeLessThan(peak.signalToNoise);
    const ranked = await searchBox(series, { ...SETTINGS, objective: 'correlated noise S/N' });
    const best = ranked.objective.indexOf(Math.max(...ranked.objective));
    expect(ranked.objective[best]!).toBeLessThan(ranked.signalToNoise[best]!);
    const order = ranked.peaks.map(({ correlatedSignalToNoise }) => correlatedSignalToNoise);
    expect(order).toEqual([...order].sort((a, b) => b - a));
  });
});

describe('levelled efficiency', () => {
  it('has no trend in period where the S/N has one, and keeps the signal', async () => {
    const result = await searchBox(redSeries(3, 0.6), SETTINGS);
    const third = Math.floor(result.periods.length / 3);
    const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length;
    const [short, long] = [result.levelledEfficiency.slice(0, third), result.levelledEfficiency.slice(-third)];
    expect(Math.abs(mean(short) - mean(long))).toBeLessThan(0.5);
    const found = await searchBox(makeBoxSeries(12, SAMPLING, [planet]), SETTINGS);
    expect(found.peaks[0]!.levelledEfficiency).toBeGreaterThan(6);
  });
});
