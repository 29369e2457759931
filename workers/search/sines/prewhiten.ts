import type { LombScarglePeak } from '../../../src/contract/lomb-scargle-contract.ts';
import { type PeriodogramSize, sineFalseAlarm } from './false-alarm.ts';
import { fitSinesFreely, type SineFit } from './fit-sines.ts';
import { findHighest } from './highest-power.ts';
import { type EvenFrequencies, findPowers, type SamplingMatrices } from './lomb-scargle-power.ts';
import type { FrequencyGrid } from './plan-sines.ts';
import { relateSine, type SineSampling, sampleWindow } from './sine-relation.ts';
import type { Steps } from './steps.ts';
import { timeScatter, type WeightedSeries } from './weighted-series.ts';

/** A sine that noise makes more often than this is not taken out. */
const LEAST_SIGNIFICANCE = 0.1;
/** What is left below this part of the first scatter is rounding error of the fit. */
const LEAST_SCATTER = 1e-8;

/** What every round shares. */
interface Whitening {
  readonly grid: FrequencyGrid;
  readonly frequencies: EvenFrequencies;
  readonly matrices: SamplingMatrices;
  readonly size: PeriodogramSize;
  readonly rounds: number;
}

interface Found {
  readonly power: number;
  readonly falseAlarmProbability: number;
}

/**
 * Takes the strongest sine out, round by round, with all found so far fitted anew each time, until noise alone would
 * make as strong a one in a tenth of cases.
 *
 * @param power of the first round
 */
export function* prewhiten(
  series: WeightedSeries,
  power: Float64Array,
  { grid, frequencies, matrices, size, rounds }: Whitening,
): Steps<LombScarglePeak[]> {
  const range = { lowest: grid.first * grid.step, highest: grid.last * grid.step };
  const found: Found[] = [];
  let fit: SineFit = { sines: [], residual: series.flux, variance: series.variance };
  while (found.length < rounds && fit.variance > LEAST_SCATTER ** 2 * series.variance) {
    const rest = { ...series, flux: fit.residual, variance: fit.variance };
    const powers = found.length === 0 ? power : yield* findPowers(rest, matrices, frequencies);
    const best = yield* findHighest(rest, powers, grid);
    const falseAlarmProbability = sineFalseAlarm(best.power, size);
    if (falseAlarmProbability > LEAST_SIGNIFICANCE) break;
    const known = fit.sines.map(({ frequencyPerDay }) => frequencyPerDay);
    const next = yield* fitSinesFreely(series, [...known, best.frequency], range);
    if (next === undefined) break;
    fit = next;
    found.push({ power: best.power, falseAlarmProbability });
  }
  return describePeaks(series, fit, found);
}

function describePeaks(series: WeightedSeries, fit: SineFit, found: readonly Found[]): LombScarglePeak[] {
  const sampling: SineSampling =
    found.length > 1 ? sampleWindow(series) : { spanDays: series.spanDays, windowFrequencies: [] };
  const frequencies = fit.sines.map(({ frequencyPerDay }) => frequencyPerDay);
  return found.map((own, index) => ({
    ...describeSine(series, fit, index),
    ...own,
    relation: relateSine(frequencies[index]!, frequencies.slice(0, index), sampling),
  }));
}

/**
 * Errors of amplitude and frequency where the noise is white: sigma_A = sqrt(2 / N) sigma and sigma_f = sqrt(6)
 * sigma / (pi T A sqrt(N)), with the weighted scatter of what is left. The span T of evenly spread times is sqrt(12)
 * times their scatter, which stands for it here where there are gaps.
 * Source: Montgomery & O'Donoghue (1999), Delta Scuti Star Newsletter 13, 28 (from memory).
 */
function describeSine(series: WeightedSeries, { sines, variance }: SineFit, index: number) {
  const { frequencyPerDay, cosine, sine } = sines[index]!;
  const points = series.time.length;
  const amplitude = Math.hypot(cosine, sine);
  const free = Math.max(1, points - 1 - 3 * sines.length);
  const amplitudeError = Math.sqrt((2 * variance) / free);
  return {
    frequencyPerDay,
    frequencyErrorPerDay: amplitudeError / (2 * Math.PI * amplitude * timeScatter(series)),
    periodDays: 1 / frequencyPerDay,
    amplitude,
    amplitudeError,
    maximumDays: series.middleDays + Math.atan2(sine, cosine) / (2 * Math.PI * frequencyPerDay),
  };
}
