import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { SOLAR_DENSITY_CGS } from '../../../src/core/constants.ts';
import { measureBox } from '../../../src/core/measure-box.ts';
import { makeBoxWork, makeTrialBox, searchTrial } from '../../../workers/search/box-search.ts';
import { detectionEfficiency } from '../../../workers/search/detection-efficiency.ts';
import { frequencyCount, frequencyStepConstant, makePeriodGrid } from '../../../workers/search/period-grid.ts';

/** SR = S/N over the root of the total weight. */
const residueOf = (signalToNoise: number, totalWeight: number): number => signalToNoise / Math.sqrt(totalWeight);

describe('box definitions of Kovács, Zucker & Mazeh (2002), A&A 391, 369', () => {
  it('SR = 0.4 and depth = 1 in the hand example (eq. 5; algebra checked by hand)', () => {
    const flux = Float64Array.of(1.2, 1.2, 1.2, 1.2, 0.2, 0.2, 1.2, 1.2, 1.2, 1.2);
    const time = Float64Array.from(flux, (_, i) => i);
    const measure = measureBox(time, flux, new Float64Array(10).fill(1), {
      periodDays: 10,
      epochDays: 4.5,
      durationDays: 1.5,
    })!;
    expect(measure.depth).toBeCloseTo(1, 12);
    expect(residueOf(measure.signalToNoise, 10)).toBeCloseTo(0.4, 12);
  });

  it('SDE = 2.203263246 in the hand example (eq. 6, sd with N in the denominator)', () => {
    expect(detectionEfficiency(Float64Array.of(1, 1.2, 0.9, 1.1, 0.8, 3)).at(-1)).toBeCloseTo(2.203263246, 9);
  });
});

/** Sun, span 27 d, oversampling 3, f_min = 2/S. Constants of the paper from memory, algebra checked (df = q/(S OS)). */
describe('frequency grid of Ofir (2014), A&A 561, A138, eqs. 3-8', () => {
  const step = frequencyStepConstant(SOLAR_DENSITY_CGS, 27, 3);
  const highest = 1.661402287;
  const periods = makePeriodGrid({
    shortestPeriodDays: 1 / highest,
    longestPeriodDays: 13.5,
    spanDays: 27,
    oversampling: 3,
    densityCgs: undefined,
  });

  it('has the step constant, the number and the first frequencies of the paper', () => {
    expect(step).toBeCloseTo(0.0009338145812, 9);
    expect(frequencyCount(2 / 27, highest, step)).toBeCloseTo(2456.758759, 3);
    expect(periods).toHaveLength(2457);
    expect(1 / periods.at(-1)!).toBeCloseTo(0.07407407407, 9);
    expect(1 / periods.at(-2)!).toBeCloseTo(0.07423890043, 9);
    expect(1 / periods[0]!).toBeCloseTo(highest, 9);
  });

  it('has the local step A f^(2/3) at 10 d', () => {
    expect(step * 0.1 ** (2 / 3)).toBeCloseTo(0.0002011842528, 9);
    const near = periods.findIndex((period) => period > 10);
    const local = 1 / periods[near - 1]! - 1 / periods[near]!;
    expect(local / 0.0002011842528).toBeCloseTo(1, 2);
  });
});

/** Seeded series of 1500 points; all values computed here except where astropy is named. */
describe('the seeded series', () => {
  const rows = readFileSync(new URL('./series-bls.csv', import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1);
  const columns = rows.map((row) => row.split(',').map(Number));
  const time = Float64Array.from(columns, (row) => row[0]!);
  const flux = Float64Array.from(columns, (row) => row[1]!);
  const error = new Float64Array(flux.length).fill(0.001);
  const truth = { periodDays: 3.3, epochDays: 1.1, durationDays: 0.12 };

  it('is the published sequence', () => {
    expect(flux[0]).toBeCloseTo(0.9960426148, 9);
    expect(flux[1]).toBeCloseTo(0.9999345351, 9);
    expect(flux[1499]).toBeCloseTo(1.00105456, 8);
    expect(flux.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1499.78314, 5);
  });

  it('has these points, depth, error, SR and alpha at the true ephemeris', () => {
    const measure = measureBox(time, flux, error, truth)!;
    expect(measure.pointsInside).toBe(58);
    expect(measure.depth).toBeCloseTo(0.003937856124, 10);
    expect(measure.depthError).toBeCloseTo(0.0001339210984, 12);
    expect(residueOf(measure.signalToNoise, 1500 / 0.001 ** 2)).toBeCloseTo(0.000759215756, 12);
    expect((measure.depth / 0.001) * Math.sqrt(measure.pointsInside)).toBeCloseTo(29.98981877, 7);
  });

  it('peaks where astropy 5.2.1 does on f = 0.1 (0.0004) 1.0 per day, duration 0.12 d, oversample 20', () => {
    const work = makeBoxWork({ seriesId: '', time, flux, error });
    const best = makeTrialBox();
    const periods = Float64Array.from({ length: 2250 }, (_, i) => 1 / (0.1 + 0.0004 * i));
    const found = Array.from(periods, (period) => {
      searchTrial(work, period, Float64Array.of(0.12), { first: 0, last: 0 }, best, 20);
      return { period, ...best };
    });
    const peak = found.reduce((a, b) => (b.signalToNoise > a.signalToNoise ? b : a));
    expect(Math.abs(peak.period - 3.302509908)).toBeLessThan(0.02);
    expect(Math.abs(peak.period - 3.3)).toBeLessThan(0.02);
    expect(Math.abs(peak.depth - 0.003748951196)).toBeLessThan(4e-4);
    const sde = detectionEfficiency(Float64Array.from(found, (trial) => trial.signalToNoise));
    expect(Math.max(...sde)).toBeGreaterThan(6);
    // astropy: 8.41, depends on grid and objective.
    expect(Math.abs(Math.max(...sde) - 8.41)).toBeLessThan(1);
  });
});
