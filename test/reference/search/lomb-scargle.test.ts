import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { sineFalseAlarm, sineLevel } from '../../../workers/search/sines/false-alarm.ts';
import { fitSines } from '../../../workers/search/sines/fit-sines.ts';
import { powerAt, powersAt } from '../../../workers/search/sines/lomb-scargle-power.ts';
import { timeScatter, type WeightedSeries, weighSeries } from '../../../workers/search/sines/weighted-series.ts';
import { makeSineSeries, type SineSpec } from './lomb-scargle-series.ts';

interface Recorded {
  readonly powers: readonly number[];
  readonly probabilities: readonly number[];
  readonly series: readonly {
    readonly spec: SineSpec;
    readonly last: readonly [number, number, number];
    readonly trials: readonly number[];
    readonly power: readonly number[];
    readonly best: { readonly trial: number; readonly power: number; readonly amplitude: number };
    readonly highest: number;
    readonly falseAlarms: readonly number[];
    readonly levels: readonly number[];
  }[];
}

const here = (name: string): string => fileURLToPath(new URL(name, import.meta.url));
const recorded: Recorded = JSON.parse(readFileSync(here('./lomb-scargle.json'), 'utf8'));
const PYTHON = '/usr/bin/python3';
const hasAstropy = spawnSync(PYTHON, ['-c', 'import astropy']).status === 0;
if (!hasAstropy) console.warn('The recorded periodograms are not recomputed: /usr/bin/python3 cannot import astropy.');

const sizeOf = (series: WeightedSeries, highestPerDay: number) => ({
  points: series.time.length,
  highestPerDay,
  timeVariance: timeScatter(series) ** 2,
});

describe('recorded periodograms', () => {
  it.runIf(hasAstropy || process.env.CI !== undefined)('are what astropy computes today', () => {
    const run = spawnSync(PYTHON, [here('./record-lomb-scargle.py'), '--check'], { encoding: 'utf8' });
    expect(`${run.error ?? ''}${run.stdout}`.trim()).toBe('no difference');
    expect(run.status).toBe(0);
  });
});

/** Against astropy 5.2.1's LombScargle, floating mean, standard normalisation, direct sums; false alarms by Baluev. */
describe.each(recorded.series)('the Lomb-Scargle periodogram of the series "$spec.name" against astropy', (known) => {
  const { step, count } = known.spec;
  const given = makeSineSeries(known.spec);
  const series = weighSeries(given);

  it('is of the same series', () => {
    const last = [given.time.at(-1)!, given.flux.at(-1)!, given.error.at(-1)!];
    for (const [index, value] of last.entries()) expect(value).toBeCloseTo(known.last[index]!, 13);
  });

  it('has the same powers to 1e-8, by the fast sums and by the plain ones', () => {
    const power = powersAt(series, step, count);
    known.trials.forEach((k, i) => {
      expect(Math.abs(power[k]! - known.power[i]!)).toBeLessThan(1e-8);
      expect(Math.abs(powerAt(series, k * step) - known.power[i]!)).toBeLessThan(1e-11);
    });
  });

  it('has the same highest trial, and a sine of the same amplitude there', () => {
    const power = powersAt(series, step, count).subarray(0, count + 1);
    const { trial, amplitude } = known.best;
    expect(power.indexOf(Math.max(...power.subarray(2)))).toBe(trial);
    expect(Math.abs(power[trial]! - known.best.power)).toBeLessThan(1e-8);
    const [sine] = fitSines(series, [trial * step])?.sines ?? [];
    expect(Math.hypot(sine!.cosine, sine!.sine) / amplitude).toBeCloseTo(1, 9);
  });

  it('has the same false-alarm probabilities and levels', () => {
    const size = sizeOf(series, known.highest);
    recorded.powers.forEach((power, i) => {
      expect(sineFalseAlarm(power, size) / known.falseAlarms[i]!).toBeCloseTo(1, 8);
    });
    recorded.probabilities.forEach((probability, i) => {
      expect(sineLevel(probability, size)).toBeCloseTo(known.levels[i]!, 8);
    });
  });
});

/** 80 seeded points, 0.04 sin(2 pi t / 2.5 + 0.3) and noise of 0.05; numbers of astropy 5.2.1 and of least squares. */
describe('the Lomb-Scargle periodogram of a noisy sine', () => {
  const rows = readFileSync(here('./series-ls.csv'), 'utf8').trim().split('\n').slice(1);
  const column = (index: number) => Float64Array.from(rows, (row) => Number(row.split(',')[index]));
  const series = weighSeries({
    time: column(0),
    flux: column(1).map((y) => 1 + y),
    error: new Float64Array(80).fill(0.05),
  });
  const { trial, power } = { trial: 397, power: 0.1792402529 };

  it('has the power at 0.4 per day', () => {
    expect(Math.abs(powerAt(series, 0.4) - 0.1739181211)).toBeLessThan(1e-9);
  });

  it('has its peak on the grid 0.010 (0.001) 2.000 where direct least squares has it', () => {
    const powers = powersAt(series, 0.001, 2000);
    expect(powers.indexOf(Math.max(...powers.subarray(10)))).toBe(trial);
    expect(Math.abs(powers[trial]! - power)).toBeLessThan(1e-9);
  });

  it('has the false-alarm probability of Baluev (2008), MNRAS 385, 1279, by astropy and by the formula', () => {
    expect(sineFalseAlarm(power, sizeOf(series, 2)) / 0.07513132858).toBeCloseTo(1, 6);
  });
});

describe('false alarms of white noise, Baluev (2008), MNRAS 385, 1279, worked apart', () => {
  it('are 0.024936 for Z = 0.19, f_max = 2 and t = 1..100', () => {
    const timeVariance = (100 * 100 - 1) / 12;
    expect(sineFalseAlarm(0.19, { points: 100, highestPerDay: 2, timeVariance })).toBeCloseTo(0.02493593559, 9);
  });

  it('are (1 - Z)^((N - 3) / 2) where only one frequency is looked at', () => {
    const one = sineFalseAlarm(0.3, { points: 80, highestPerDay: 0, timeVariance: 1 });
    expect(one / 1.087112628e-6).toBeCloseTo(1, 8);
  });
});
