import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_LOMB_SCARGLE } from '../../src/contract/lomb-scargle-contract.ts';
import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { createCheckpoint } from '../../workers/checkpoint.ts';
import { computeLombScargle } from '../../workers/search/sines/lomb-scargle.ts';
import { powerAt, powersAt, varianceOf } from '../../workers/search/sines/lomb-scargle-power.ts';
import { weighSeries } from '../../workers/search/sines/weighted-series.ts';
import { createLehmer } from '../demo/lehmer.mjs';

const run = (series: SearchSeries, settings = DEFAULT_LOMB_SCARGLE) =>
  computeLombScargle(
    series,
    { key: 'k', settings },
    createCheckpoint(() => false),
  );

/** Sines as [period, semi-amplitude, time of maximum] in white noise. */
function seriesOf(
  sines: readonly (readonly [number, number, number])[],
  noise = 1e-3,
  n = 1500,
  gap = false,
): SearchSeries {
  const random = createLehmer(`sines ${sines.length} ${n}`);
  const time = Float64Array.from({ length: n }, (_, i) => 100 + (i / 48) * (gap && i > n / 2 ? 1.7 : 1));
  const flux = time.map((t) =>
    sines.reduce((sum, [p, a, t0]) => sum + a * Math.cos((2 * Math.PI * (t - t0)) / p), 1 + noise * random.normal()),
  );
  return { seriesId: 's', time, flux, error: new Float64Array(n).fill(noise) };
}

describe('powers of all frequencies at once', () => {
  it('are the direct sums to 1e-8, on any times and errors', () => {
    const points = fc.array(
      fc.record({
        t: fc.integer({ min: 0, max: 400_000 }).map((t) => t / 10_000),
        y: fc.double({ min: -1, max: 1, noNaN: true }),
        e: fc.double({ min: 0.1, max: 3, noNaN: true }),
      }),
      { minLength: 40, maxLength: 90 },
    );
    fc.assert(
      fc.property(points, (rows) => {
        const sorted = [...rows].sort((a, b) => a.t - b.t);
        const series = weighSeries({
          time: Float64Array.from(sorted, ({ t }) => t),
          flux: Float64Array.from(sorted, ({ y }) => 1 + y),
          error: Float64Array.from(sorted, ({ e }) => e),
        });
        const variance = varianceOf(series);
        const power = powersAt(series, 0.013, 90);
        // Where the determinant has few digits, direct sums have as few.
        for (const k of [1, 7, 40, 90])
          expect(Math.abs(power[k]! - powerAt(series, 0.013 * k, variance))).toBeLessThan(1e-6);
      }),
      { numRuns: 60, seed: 9 },
    );
    const even = weighSeries(seriesOf([[2.2, 1e-3, 101]]));
    const variance = varianceOf(even);
    const power = powersAt(even, 0.01, 1000);
    for (let k = 1; k <= 1000; k += 37)
      expect(Math.abs(power[k]! - powerAt(even, 0.01 * k, variance))).toBeLessThan(1e-8);
  });
});

describe('prewhitening', () => {
  it('finds sines one after another with amplitudes, times of maximum and their errors', async () => {
    const outcome = await run(
      seriesOf([
        [2.2, 2e-3, 101],
        [0.71, 1e-3, 100.3],
      ]),
    );
    const peaks = outcome.kind === 'done' ? outcome.value.peaks : [];
    expect(peaks.length).toBeLessThanOrEqual(3);
    const [first, second] = peaks;
    expect(Math.abs(first!.frequencyPerDay - 1 / 2.2)).toBeLessThan(4 * first!.frequencyErrorPerDay);
    expect(Math.abs(first!.amplitude - 2e-3)).toBeLessThan(4 * first!.amplitudeError);
    const cycles = (first!.maximumDays - 101) / 2.2;
    expect(Math.abs(cycles - Math.round(cycles))).toBeLessThan(0.02);
    expect(Math.abs(second!.frequencyPerDay - 1 / 0.71)).toBeLessThan(4 * second!.frequencyErrorPerDay);
    expect(first!.falseAlarmProbability).toBeLessThan(1e-6);
  });

  it('names harmonics', async () => {
    const outcome = await run(
      seriesOf([
        [2.2, 2e-3, 101],
        [1.1, 1e-3, 100.3],
      ]),
    );
    expect(outcome.kind === 'done' && outcome.value.peaks[1]!.relation).toBe('2 f1');
  });

  it('gives errors that the scatter of many noises has', async () => {
    const off: number[] = [];
    for (let trial = 0; trial < 40; trial += 1) {
      const random = createLehmer(`error ${trial}`);
      const time = Float64Array.from({ length: 400 }, (_, i) => i / 20);
      const flux = time.map((t) => 1 + 1e-3 * Math.cos((2 * Math.PI * t) / 1.3) + 1e-3 * random.normal());
      const outcome = await run({ seriesId: '', time, flux, error: new Float64Array(400).fill(1e-3) });
      const peak = outcome.kind === 'done' ? outcome.value.peaks[0]! : undefined;
      off.push((peak!.frequencyPerDay - 1 / 1.3) / peak!.frequencyErrorPerDay);
    }
    const rms = Math.sqrt(off.reduce((sum, value) => sum + value * value, 0) / off.length);
    expect(rms).toBeGreaterThan(0.6);
    expect(rms).toBeLessThan(1.6);
  });
});

describe('series that have no periodogram', () => {
  const few = (n: number, time: (i: number) => number): SearchSeries => ({
    seriesId: '',
    time: Float64Array.from({ length: n }, (_, i) => time(i)),
    flux: new Float64Array(n).fill(1),
    error: new Float64Array(n).fill(1e-3),
  });

  it('are refused with a sentence', async () => {
    expect(await run(few(3, (i) => i))).toMatchObject({
      kind: 'failed',
      error: { sentence: expect.stringContaining('3') },
    });
    expect(await run(few(9, () => 5))).toMatchObject({
      kind: 'failed',
      error: { sentence: 'All points have the same time.' },
    });
    expect(
      await run(
        few(2000, (i) => i / 700),
        { ...DEFAULT_LOMB_SCARGLE, shortestPeriodDays: 1e-7 },
      ),
    ).toMatchObject({
      kind: 'failed',
      error: { sentence: expect.stringContaining('million') },
    });
  });

  it('of constant flux have no power', async () => {
    const outcome = await run(few(50, (i) => i * 0.37));
    expect(outcome.kind === 'done' && Math.max(...outcome.value.power)).toBe(0);
  });
});
