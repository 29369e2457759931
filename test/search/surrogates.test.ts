import { describe, expect, it } from 'vitest';
import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { DEFAULT_BOX_SEARCH } from '../../src/core/box-search-settings.ts';
import { falseAlarmProbability } from '../../src/core/extreme-value.ts';
import { joinSurrogates, searchSurrogates } from '../../workers/search/surrogates.ts';
import { createLehmer } from '../demo/lehmer.mjs';
import { expectDone, makeBoxSeries, quietCheckpoint, searchBox } from './search-box.ts';

const SAMPLING = { points: 1500, cadenceDays: 1 / 48, sigma: 0.001 };
const settings = {
  ...DEFAULT_BOX_SEARCH,
  shortestPeriodDays: 1,
  oversampling: 2,
  objective: 'white noise S/N',
} as const;
const planet = { periodDays: 3.3, epochDays: 101.1, durationDays: 0.16, depth: 0.003 };

async function falseAlarms(series: SearchSeries, partCount = 1, surrogateCount = 60) {
  const parts = [];
  for (let part = 0; part < partCount; part += 1) {
    const job = { key: 'k', settings, surrogateCount, seed: 1, part, partCount };
    parts.push(expectDone(await searchSurrogates(series, job, quietCheckpoint())));
  }
  return joinSurrogates('k', parts);
}

describe('false alarms from surrogates of the series', () => {
  it('are next to none for a planet, and nothing odd for the best of noise', async () => {
    const withPlanet = makeBoxSeries(1, SAMPLING, [planet]);
    const strong = (await searchBox(withPlanet, settings)).peaks[0]!;
    expect(falseAlarmProbability(await falseAlarms(withPlanet), strong.signalToNoise)).toBeLessThan(1e-3);
    const noise = makeBoxSeries(2, SAMPLING, []);
    const weak = (await searchBox(noise, settings)).peaks[0]!;
    const chance = falseAlarmProbability(await falseAlarms(noise), weak.signalToNoise);
    expect(chance).toBeGreaterThan(0.01);
    expect(chance).toBeLessThanOrEqual(1);
  });

  it('know correlated noise: what white noise would never do is ordinary there', async () => {
    const random = createLehmer('red surrogates');
    let level = 0;
    const time = Float64Array.from({ length: 1500 }, (_, i) => 100 + i / 48);
    const flux = time.map(() => {
      level = 0.95 * level + 1e-3 * Math.sqrt(1 - 0.95 ** 2) * random.normal();
      return 1 + level + 5e-4 * random.normal();
    });
    const red = { seriesId: 'red', time, flux, error: new Float64Array(1500).fill(5e-4) };
    const best = (await searchBox(red, settings)).peaks[0]!;
    const white = await falseAlarms(makeBoxSeries(3, { ...SAMPLING, sigma: 5e-4 }, []));
    expect(falseAlarmProbability(white, best.signalToNoise)).toBeLessThan(1e-3);
    expect(falseAlarmProbability(await falseAlarms(red), best.signalToNoise)).toBeGreaterThan(0.01);
  });

  it('are the same in one and in three parts, and for the same seed', async () => {
    const series = makeBoxSeries(4, SAMPLING, []);
    const whole = await falseAlarms(series, 1, 12);
    const split = await falseAlarms(series, 3, 12);
    expect([...split.maxima].sort()).toEqual([...whole.maxima].sort());
    expect(split.location).toBeCloseTo(whole.location, 12);
    expect(whole.gridFraction).toBeGreaterThan(0);
    expect(whole.gridFraction).toBeLessThanOrEqual(1);
  });
});
