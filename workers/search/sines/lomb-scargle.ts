import type { LombScargleJob, LombScargleResult } from '../../../src/contract/lomb-scargle-contract.ts';
import { cancelled, done, failed, type Outcome } from '../../../src/contract/outcome.ts';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { type PeriodogramSize, sineLevel } from './false-alarm.ts';
import { findPowers, sampleFrequencies } from './lomb-scargle-power.ts';
import { type FrequencyGrid, planSines } from './plan-sines.ts';
import { prewhiten } from './prewhiten.ts';
import { paceSteps, type Steps } from './steps.ts';
import { planSums, sumAtFrequencies, unitsOfSums } from './sums-at-frequencies.ts';
import { timeScatter, type WeightedSeries, weighSeries } from './weighted-series.ts';

const LEVELS = [0.1, 0.01, 0.001];

/**
 * Generalised Lomb-Scargle periodogram, and its strongest sines taken out one after another, all fitted together each
 * time. Times in days, ascending. Points without a finite time, flux or error are left out.
 * Source: Zechmeister & Kürster (2009), A&A 496, 577; false alarms: Baluev (2008), MNRAS 385, 1279.
 */
export async function computeLombScargle(
  given: SearchSeries,
  { key, settings }: Pick<LombScargleJob, 'key' | 'settings'>,
  checkpoint: Checkpoint,
): Promise<Outcome<LombScargleResult>> {
  const series = weighSeries(given);
  const grid = planSines(series, settings);
  if (typeof grid === 'string') return failed(grid);
  // Two sums for the sampling, one for each round.
  const total = (2 + settings.rounds) * unitsOfSums(grid.last);
  const result = await paceSteps(searchSines(series, grid, settings.rounds), checkpoint, total);
  return result === undefined ? cancelled : done({ key, ...result });
}

function* searchSines(
  series: WeightedSeries,
  grid: FrequencyGrid,
  rounds: number,
): Steps<Omit<LombScargleResult, 'key'>> {
  const frequencies = { ...grid, plan: planSums(grid.last), sum: sumAtFrequencies };
  yield 0;
  const matrices = yield* sampleFrequencies(series, frequencies);
  const power = yield* findPowers(series, matrices, frequencies);
  const size: PeriodogramSize = {
    points: series.time.length,
    highestPerDay: grid.last * grid.step,
    timeVariance: timeScatter(series) ** 2,
  };
  const peaks = yield* prewhiten(series, power, { grid, frequencies, matrices, size, rounds });
  const levels = LEVELS.map((probability) => ({ probability, power: sineLevel(probability, size) }));
  return { frequencies: frequenciesOf(grid), power: power.slice(grid.first), peaks, levels };
}

function frequenciesOf({ step, first, last }: FrequencyGrid): Float64Array {
  const frequencies = new Float64Array(last - first + 1);
  for (let i = 0; i < frequencies.length; i += 1) frequencies[i] = (first + i) * step;
  return frequencies;
}
