import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_LOMB_SCARGLE } from '../../../src/contract/lomb-scargle-contract.ts';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import { createCheckpoint } from '../../../workers/checkpoint.ts';
import { computeLombScargle } from '../../../workers/search/sines/lomb-scargle.ts';
import { powerAt, powersAt } from '../../../workers/search/sines/lomb-scargle-power.ts';
import { weighSeries } from '../../../workers/search/sines/weighted-series.ts';
import { createLehmer } from '../../demo/lehmer.mjs';
import { evenTimes, makeSines, nightTimes } from './sine-series.ts';

const run = (series: SearchSeries, settings: Partial<typeof DEFAULT_LOMB_SCARGLE> = {}) =>
  computeLombScargle(
    series,
    { key: 'k', settings: { ...DEFAULT_LOMB_SCARGLE, ...settings } },
    createCheckpoint(() => false),
  );

async function resultOf(series: SearchSeries, settings: Partial<typeof DEFAULT_LOMB_SCARGLE> = {}) {
  const outcome = await run(series, settings);
  if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
  return outcome.value;
}

async function sentenceOf(series: SearchSeries, settings: Partial<typeof DEFAULT_LOMB_SCARGLE> = {}) {
  const outcome = await run(series, settings);
  return outcome.kind === 'failed' ? outcome.error.sentence : outcome.kind;
}

describe('powers of all frequencies at once', () => {
  it('are the plain ones to 1e-8, on any times and errors', () => {
    const points = fc.array(
      fc.record({
        t: fc.double({ min: 0, max: 40, noNaN: true }),
        y: fc.double({ min: -1, max: 1, noNaN: true }),
        e: fc.double({ min: 0.1, max: 3, noNaN: true }),
      }),
      { minLength: 8, maxLength: 150 },
    );
    fc.assert(
      fc.property(points, (rows) => {
        const sorted = [...rows].sort((a, b) => a.t - b.t);
        const series = weighSeries({
          time: Float64Array.from(sorted, ({ t }) => t),
          flux: Float64Array.from(sorted, ({ y }) => 1 + y),
          error: Float64Array.from(sorted, ({ e }) => e),
        });
        const power = powersAt(series, 0.013, 90);
        for (const k of [2, 7, 40, 90]) expect(Math.abs(power[k]! - powerAt(series, 0.013 * k))).toBeLessThan(1e-8);
      }),
      { numRuns: 60 },
    );
  });

  it('are so at the sampling frequency and its half, where sine and cosine are alike', () => {
    const series = weighSeries(makeSines(evenTimes(1200), [[0.9, 1e-3, 100]]));
    const step = 0.02;
    const power = powersAt(series, step, 2600);
    for (const k of [1, 1199, 1200, 1201, 2399, 2400, 2401])
      expect(Math.abs(power[k]! - powerAt(series, k * step))).toBeLessThan(1e-8);
  });

  it('keep to their digits far from the zero of time', () => {
    const near = makeSines(evenTimes(800), [[0.9, 1e-3, 100]]);
    const far = { ...near, time: near.time.map((t) => t + 2 ** 21) };
    const [a, b] = [near, far].map((own) => powersAt(weighSeries(own), 0.05, 200));
    // A time of two million days has digits to 5e-10 days.
    for (let k = 1; k <= 200; k += 1) expect(Math.abs(a![k]! - b![k]!)).toBeLessThan(1e-8);
  });
});

describe('the trial frequencies', () => {
  it('reach evenly from the longest period to the shortest', async () => {
    const { frequencies, power } = await resultOf(makeSines(evenTimes(960), []), {
      shortestPeriodDays: 0.25,
      longestPeriodDays: 10,
      oversampling: 4,
    });
    const span = 959 / 48;
    expect(frequencies.length).toBe(power.length);
    expect(frequencies[0]!).toBeGreaterThanOrEqual(0.1);
    expect(frequencies[0]!).toBeLessThan(0.1 + 1 / (4 * span));
    expect(frequencies.at(-1)!).toBeLessThanOrEqual(4);
    expect(frequencies.at(-1)!).toBeGreaterThan(4 - 1 / (4 * span));
    expect(frequencies[7]! - frequencies[6]!).toBeCloseTo(1 / (4 * span), 12);
  });

  it('reach from the span to four cadences where nothing else is asked', async () => {
    const { frequencies } = await resultOf(makeSines(evenTimes(961), []));
    expect(1 / frequencies[0]!).toBeCloseTo(20, 9);
    expect(1 / frequencies.at(-1)!).toBeCloseTo(4 / 48, 9);
  });
});

describe('prewhitening', () => {
  it('finds sines one after another with amplitudes, times of maximum and their errors', async () => {
    const { peaks } = await resultOf(
      makeSines(evenTimes(1500), [
        [2.2, 2e-3, 101],
        [0.71, 1e-3, 100.3],
      ]),
    );
    expect(peaks.length).toBe(2);
    const known = [
      { period: 2.2, amplitude: 2e-3, maximum: 101 },
      { period: 0.71, amplitude: 1e-3, maximum: 100.3 },
    ];
    for (const [index, { period, amplitude, maximum }] of known.entries()) {
      const peak = peaks[index]!;
      expect(Math.abs(peak.frequencyPerDay - 1 / period)).toBeLessThan(4 * peak.frequencyErrorPerDay);
      expect(Math.abs(peak.amplitude - amplitude)).toBeLessThan(4 * peak.amplitudeError);
      expect(peak.amplitudeError).toBeCloseTo(1e-3 * Math.sqrt(2 / 1500), 5);
      const cycles = (peak.maximumDays - maximum) / period;
      expect(Math.abs(cycles - Math.round(cycles))).toBeLessThan(0.03);
      expect(Math.abs(peak.maximumDays - (100 + 1499 / 96))).toBeLessThanOrEqual(period / 2);
      expect(peak.falseAlarmProbability).toBeLessThan(1e-6);
    }
  });

  it('does not let a sine pull at the frequency of another, however little noise there is', async () => {
    const sines = [
      [2.2, 2e-3, 101],
      [2.0, 1.5e-3, 100.3],
    ] as const;
    const { peaks } = await resultOf(makeSines(evenTimes(1500), sines, 1e-6), { rounds: 2 });
    for (const [index, [period]] of sines.entries())
      expect(Math.abs(peaks[index]!.frequencyPerDay - 1 / period)).toBeLessThan(5 * peaks[index]!.frequencyErrorPerDay);
  });

  it('names harmonics and daily aliases', async () => {
    const even = await resultOf(
      makeSines(evenTimes(1500), [
        [2.2, 2e-3, 101],
        [1.1, 1e-3, 100.3],
      ]),
    );
    expect(even.peaks.map(({ relation }) => relation)).toEqual([undefined, '2 f1']);
    const nights = await resultOf(
      makeSines(nightTimes(25), [
        [1 / 3.3, 3e-3, 500],
        [1 / 4.3, 1.2e-3, 500.1],
      ]),
      { rounds: 2 },
    );
    // What the first left of the second, its alias by a day, may be highest a day further on.
    expect(nights.peaks[1]!.relation).toMatch(/^f1 [+−] [123] \/ d, an alias$/);
  });

  it('finds nothing in noise, and so often something as is said', async () => {
    let alarms = 0;
    for (let trial = 0; trial < 60; trial += 1) {
      const random = createLehmer(`noise ${trial}`);
      const time = Float64Array.from({ length: 150 }, () => 30 * random.uniform()).sort();
      const flux = time.map(() => 1 + 1e-3 * random.normal());
      const { peaks } = await resultOf(
        { seriesId: '', time, flux, error: new Float64Array(150).fill(1e-3) },
        { shortestPeriodDays: 0.5, rounds: 1 },
      );
      alarms += peaks.length;
    }
    // Six of sixty are expected at 0.1, somewhat fewer as it is an upper bound.
    expect(alarms).toBeGreaterThan(0);
    expect(alarms).toBeLessThan(15);
  });

  it('gives errors that the scatter of many noises has', async () => {
    const off: { readonly frequency: number; readonly amplitude: number }[] = [];
    for (let trial = 0; trial < 60; trial += 1) {
      const random = createLehmer(`error ${trial}`);
      const time = Float64Array.from({ length: 400 }, (_, i) => i / 20 + (i < 100 ? 0 : 60));
      const flux = time.map((t) => 1 + 1e-3 * Math.cos((2 * Math.PI * t) / 1.3) + 1e-3 * random.normal());
      const { peaks } = await resultOf(
        { seriesId: '', time, flux, error: new Float64Array(400).fill(1e-3) },
        { rounds: 1, shortestPeriodDays: 1.29, longestPeriodDays: 1.31 },
      );
      const peak = peaks[0]!;
      off.push({
        frequency: (peak.frequencyPerDay - 1 / 1.3) / peak.frequencyErrorPerDay,
        amplitude: (peak.amplitude - 1e-3) / peak.amplitudeError,
      });
    }
    const rms = (values: readonly number[]) => Math.sqrt(values.reduce((sum, x) => sum + x * x, 0) / values.length);
    for (const kind of ['frequency', 'amplitude'] as const) {
      expect(rms(off.map((own) => own[kind]))).toBeGreaterThan(0.75);
      expect(rms(off.map((own) => own[kind]))).toBeLessThan(1.3);
    }
  });

  it('stops where only rounding error is left', async () => {
    const { peaks } = await resultOf(makeSines(evenTimes(600), [[1.3, 1e-3, 100]], 0), { rounds: 8 });
    expect(peaks.length).toBe(1);
    expect(peaks[0]!.frequencyPerDay).toBeCloseTo(1 / 1.3, 9);
  });
});

describe('series at the edge', () => {
  const few = (n: number, time: (i: number) => number): SearchSeries => ({
    seriesId: '',
    time: Float64Array.from({ length: n }, (_, i) => time(i)),
    flux: Float64Array.from({ length: n }, (_, i) => 1 + (i % 3) / 1e3),
    error: new Float64Array(n).fill(1e-3),
  });

  it('are refused with a sentence where they have no periodogram', async () => {
    expect(await sentenceOf(few(0, (i) => i))).toMatch(/at least 4 points; this series has 0\.$/);
    expect(await sentenceOf(few(3, (i) => i))).toMatch(/at least 4 points; this series has 3\.$/);
    expect(await sentenceOf(few(9, () => 5))).toBe('All points have the same time.');
    expect(await sentenceOf(few(9, (i) => Math.floor(i / 3)))).toMatch(/at least 4 different times; this series has 3/);
    const blank = few(9, (i) => i);
    expect(await sentenceOf({ ...blank, flux: blank.flux.map(() => Number.NaN) })).toMatch(/this series has 0\.$/);
  });

  it('are refused where the settings cannot be', async () => {
    const series = few(2000, (i) => i / 700);
    expect(await sentenceOf(series, { shortestPeriodDays: 1e-7 })).toMatch(/ask for 142\.\d million frequencies/);
    expect(await sentenceOf(series, { shortestPeriodDays: 3, longestPeriodDays: 2 })).toMatch(/must be above/);
    expect(await sentenceOf(series, { shortestPeriodDays: 0 })).toMatch(/above zero/);
    expect(await sentenceOf(series, { oversampling: 0 })).toMatch(/oversampling/);
    expect(await sentenceOf(series, { oversampling: Number.NaN })).toMatch(/oversampling/);
    expect(await sentenceOf(series, { rounds: 9 })).toMatch(/1 to 8/);
  });

  it('of constant flux have no power and no peak', async () => {
    for (const level of [1, 1.0003, 0]) {
      const constant = few(300, (i) => i * 0.37);
      const { power, peaks } = await resultOf({ ...constant, flux: constant.flux.fill(level) });
      expect(Math.max(...power)).toBe(0);
      expect(peaks).toEqual([]);
    }
  });

  it('with times given twice, blanks and wild errors have finite powers', async () => {
    const series = makeSines(evenTimes(400), [[1.3, 3e-3, 100]]);
    const time = series.time.map((_, i) => series.time[i - (i % 2)]!);
    const flux = series.flux.map((value, i) => (i % 50 === 0 ? Number.NaN : value));
    const wild = [1e-200, 1e200, Number.NaN, 0, Number.POSITIVE_INFINITY];
    for (const value of wild) {
      const error = series.error.map((own, i) => (i === 77 ? value : own));
      const { power, levels, peaks } = await resultOf({ ...series, time, flux, error });
      expect(power.every((own) => own >= 0 && own <= 1)).toBe(true);
      expect(levels.every((own) => own.power > 0 && own.power <= 1)).toBe(true);
      // One point that weighs more than all others together leaves no sine to be seen.
      expect(peaks[0]?.periodDays.toFixed(1)).toBe(value === 1e-200 ? undefined : '1.3');
    }
  });

  it('of four points are computed', async () => {
    const { power } = await resultOf(few(4, (i) => i * i));
    expect(power.every((own) => own >= 0 && own <= 1)).toBe(true);
  });
});

describe('a long computation', () => {
  const series = makeSines(evenTimes(20_000), [[1.3, 1e-3, 100]]);
  const job = { key: 'k', settings: DEFAULT_LOMB_SCARGLE };

  it('hears a cancel', async () => {
    const checkpoint = { isDue: () => true, pause: async () => false };
    expect(await computeLombScargle(series, job, checkpoint)).toEqual({ kind: 'cancelled' });
    let pauses = 0;
    const pause = async () => {
      pauses += 1;
      return pauses < 40;
    };
    const later = { isDue: () => true, pause };
    expect(await computeLombScargle(series, job, later)).toEqual({ kind: 'cancelled' });
  });

  it('tells its progress, which never goes back and never beyond the end', async () => {
    const told: number[] = [];
    const checkpoint = {
      isDue: () => true,
      pause: async (done: number, total: number) => {
        told.push(done / total);
        return true;
      },
    };
    expect((await computeLombScargle(series, job, checkpoint)).kind).toBe('done');
    expect(told.length).toBeGreaterThan(20);
    expect(told).toEqual([...told].sort((a, b) => a - b));
    expect(told.at(-1)!).toBeLessThanOrEqual(1);
    expect(told.at(-1)!).toBeGreaterThan(0.4);
  });
});
