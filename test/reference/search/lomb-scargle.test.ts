import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { sineFalseAlarm } from '../../../workers/search/sines/false-alarm.ts';
import { powerAt, powersAt, varianceOf } from '../../../workers/search/sines/lomb-scargle-power.ts';
import { weighSeries } from '../../../workers/search/sines/weighted-series.ts';

/**
 * 80 seeded points, 0.04 sin(2 pi t / 2.5 + 0.3) and noise of 0.05; values of astropy 5.2.1's LombScargle (floating
 * mean, standard normalisation, direct sums), after Zechmeister & Kürster (2009), A&A 496, 577.
 */
const rows = readFileSync(new URL('./series-ls.csv', import.meta.url), 'utf8')
  .trim()
  .split('\n')
  .filter((line) => /^[-\d]/.test(line))
  .map((line) => line.split(',').map(Number));
const column = (index: number) => Float64Array.from(rows, (row) => row[index]!);
const series = weighSeries({
  time: column(0),
  flux: column(1).map((y) => 1 + y),
  error: new Float64Array(80).fill(0.05),
});

describe('the Lomb-Scargle periodogram against astropy', () => {
  it('has the power at 0.4 per day', () => {
    expect(powerAt(series, 0.4, varianceOf(series))).toBeCloseTo(0.1739181211, 9);
  });

  it('has its peak on the grid 0.010 (0.001) 2.000 where direct least squares has it', () => {
    const power = powersAt(series, 0.001, 2000);
    const best = power.indexOf(Math.max(...power.subarray(10)));
    expect(best).toBe(397);
    expect(power[best]).toBeCloseTo(0.1792402529, 8);
  });
});

describe('false alarms of white noise', () => {
  it('are those of Baluev (2008), MNRAS 385, 1279, as astropy 5.2.1 and the formula have them', () => {
    const { time, weight } = series;
    const mean = time.reduce((sum, t, i) => sum + weight[i]! * t, 0);
    const timeVariance = time.reduce((sum, t, i) => sum + weight[i]! * (t - mean) ** 2, 0);
    const probability = sineFalseAlarm(0.1792402529, { points: 80, highestPerDay: 2, timeVariance });
    expect(probability / 0.07513132858).toBeCloseTo(1, 6);
  });

  it('are 0.024936 for Z = 0.19, f_max = 2 and t = 1..100 (formula, worked apart)', () => {
    const timeVariance = (100 * 100 - 1) / 12;
    expect(sineFalseAlarm(0.19, { points: 100, highestPerDay: 2, timeVariance })).toBeCloseTo(0.02493593559, 9);
  });

  it('are (1 - Z)^((N - 3) / 2) where only one frequency is looked at', () => {
    const one = sineFalseAlarm(0.3, { points: 80, highestPerDay: 0, timeVariance: 1 });
    expect(one / 1.087112628e-6).toBeCloseTo(1, 8);
  });
});
