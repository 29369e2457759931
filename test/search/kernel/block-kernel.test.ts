import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { BoxSearchPart, SearchSeries } from '../../../src/contract/search-contract.ts';
import { type BoxSearchSettings, DEFAULT_BOX_SEARCH } from '../../../src/core/box-search-settings.ts';
import { measureBox } from '../../../src/core/measure-box.ts';
import { makeBlockKernel } from '../../../workers/search/kernel/block-kernel.ts';
import { planBlocks } from '../../../workers/search/kernel/plan-blocks.ts';
import { planBoxSearch } from '../../../workers/search/plan-box-search.ts';
import { searchBoxPart } from '../../../workers/search/search-part.ts';
import { createLehmer } from '../../demo/lehmer.mjs';
import { expectDone, quietCheckpoint } from '../search-box.ts';

type Sampling = 'even' | 'fast' | 'nights' | 'gaps and doubles';

/** Times of each kind of sampling, with a box of 3 h every 2.7 d. */
function makeSeries(kind: Sampling, seed: number, depth: number): SearchSeries {
  const random = createLehmer(`kernel ${kind} ${seed}`);
  const times: number[] = [];
  if (kind === 'even') for (let i = 0; i < 2400; i += 1) times.push(50 + i / 96);
  if (kind === 'fast') for (let i = 0; i < 9000; i += 1) times.push(50 + i / 500);
  if (kind === 'nights')
    for (let night = 0; night < 60; night += 1)
      for (let i = 0; i < 30; i += 1) times.push(50 + night + 0.3 * random.uniform());
  if (kind === 'gaps and doubles')
    for (let i = 0; i < 1500; i += 1) {
      const at = 50 + 40 * random.uniform();
      if (at > 60 && at < 68) continue;
      times.push(at);
      if (i % 7 === 0) times.push(at);
    }
  const time = Float64Array.from(times).sort();
  const error = time.map(() => 1e-3 * (0.5 + random.uniform()));
  const isInside = (t: number) => Math.abs((t - 1.1) / 2.7 - Math.round((t - 1.1) / 2.7)) * 2.7 < 0.0625;
  const flux = time.map((t, i) => 1 + error[i]! * random.normal() - (isInside(t) ? depth : 0));
  return { seriesId: kind, time, flux, error };
}

const SETTINGS: BoxSearchSettings = { ...DEFAULT_BOX_SEARCH, shortestPeriodDays: 0.5, oversampling: 2 };

async function scan(series: SearchSeries, isPlain: boolean, settings = SETTINGS): Promise<BoxSearchPart> {
  const job = { key: '', settings, part: 0, partCount: 1 };
  return expectDone(await searchBoxPart(series, job, quietCheckpoint(), isPlain ? () => undefined : makeBlockKernel));
}

const highest = (values: Float64Array): number => values.reduce((high, value) => Math.max(high, value), 0);

describe('the compiled kernel against the plain one', () => {
  it('is there: this machine has the instructions', () => expect(makeBlockKernel()).toBeDefined());

  it.each(['even', 'fast', 'nights', 'gaps and doubles'] as const)('finds the same signal, %s', async (kind) => {
    const series = makeSeries(kind, 1, 3e-3);
    const [fast, plain] = [await scan(series, false), await scan(series, true)];
    const best = highest(plain.power);
    // Bins of an eighth of the shortest box and drifts of up to another eighth: a few parts in a hundred.
    expect(highest(fast.power)).toBeGreaterThan(0.94 * best);
    expect(highest(fast.power)).toBeLessThan(1.06 * best);
    const periodOf = ({ power }: BoxSearchPart) =>
      expectDone(planBoxSearch(series, SETTINGS)).periods[power.indexOf(highest(power))]!;
    expect(Math.abs(periodOf(fast) / periodOf(plain) - 1)).toBeLessThan(0.01);
  });

  it.each(['even', 'fast', 'nights', 'gaps and doubles'] as const)('has the same level of noise, %s', async (kind) => {
    const series = makeSeries(kind, 2, 0);
    const [fast, plain] = [await scan(series, false), await scan(series, true)];
    const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length;
    expect(mean(fast.power) / mean(plain.power)).toBeGreaterThan(0.96);
    expect(mean(fast.power) / mean(plain.power)).toBeLessThan(1.06);
  });

  it('returns boxes whose S/N the unbinned series has, smeared by no more than bins and drift allow', async () => {
    const series = makeSeries('even', 3, 3e-3);
    const { periods } = expectDone(planBoxSearch(series, SETTINGS));
    const { power, trials, epochDays, durationDays } = await scan(series, false);
    const strong = [...power.keys()].filter((i) => power[i]! > 0.8 * highest(power));
    expect(strong.length).toBeGreaterThan(0);
    for (const i of strong) {
      const ephemeris = { periodDays: periods[trials[i]!]!, epochDays: epochDays[i]!, durationDays: durationDays[i]! };
      const exact = measureBox(series.time, series.flux, series.error, ephemeris)!.signalToNoise;
      expect(exact / power[i]!).toBeGreaterThan(0.85);
      expect(exact / power[i]!).toBeLessThan(1.15);
    }
  });

  it('is finite and not negative on anything: few points, equal times, errors of any size', async () => {
    const point = fc.record({
      t: fc.double({ min: 0, max: 30, noNaN: true }),
      y: fc.double({ min: -2, max: 3, noNaN: true }),
      e: fc.constantFrom(1e-6, 1e-3, 1, 1e6),
    });
    await fc.assert(
      fc.asyncProperty(fc.array(point, { minLength: 10, maxLength: 60 }), async (points) => {
        const sorted = [...points].sort((a, b) => a.t - b.t);
        const series = {
          seriesId: '',
          time: Float64Array.from(sorted, ({ t }) => t),
          flux: Float64Array.from(sorted, ({ y }) => y),
          error: Float64Array.from(sorted, ({ e }) => e),
        };
        const job = { key: '', settings: DEFAULT_BOX_SEARCH, part: 0, partCount: 1 };
        const outcome = await searchBoxPart(series, job, quietCheckpoint());
        if (outcome.kind !== 'done') return;
        const { power, depth, epochDays } = outcome.value;
        for (const column of [power, depth, epochDays]) expect(column.every(Number.isFinite)).toBe(true);
        expect(power.every((value) => value >= 0)).toBe(true);
      }),
      { numRuns: 40 },
    );
  });
});

describe('blocks of trials', () => {
  it('hold every trial once, in order, and never jump over a change of spacing', () => {
    const { time } = makeSeries('even', 1, 0);
    const series = { seriesId: '', time, flux: time, error: time };
    const plan = expectDone(planBoxSearch(series, SETTINGS));
    const blocks = planBlocks(plan, time.at(-1)! - time[0]!, time.length);
    expect(blocks[0]!.first).toBe(0);
    expect(blocks.at(-1)!.end).toBe(plan.periods.length);
    for (let i = 1; i < blocks.length; i += 1) expect(blocks[i]!.first).toBe(blocks[i - 1]!.end);
    expect(blocks.every(({ first, end }) => end > first)).toBe(true);
  });
});
