import type {
  LombScargleJob,
  LombScarglePeak,
  LombScargleResult,
  LombScargleSettings,
} from '../../../src/contract/lomb-scargle-contract.ts';
import { cancelled, done, failed, type Outcome } from '../../../src/contract/outcome.ts';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import { median } from '../../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { windowFrequencies } from '../window-frequencies.ts';
import { type PeriodogramSize, sineFalseAlarm, sineLevel } from './false-alarm.ts';
import { type FittedSine, fitSines } from './fit-sines.ts';
import { powerAt, powersAt, varianceOf } from './lomb-scargle-power.ts';
import { relateSine } from './sine-relation.ts';
import { type WeightedSeries, weighSeries } from './weighted-series.ts';

const FEWEST_POINTS = 5;
/** About a gigabyte of transforms: beyond it the settings are a slip. */
const MOST_FREQUENCIES = 2_000_000;
const LEVELS = [0.1, 0.01, 0.001];
/** A sine that noise makes as often as this is not taken out. */
const LEAST_SIGNIFICANCE = 0.1;
const GOLDEN = (Math.sqrt(5) - 1) / 2;
/** Cadences in the shortest default period. */
const CADENCES_PER_PERIOD = 4;

/** Frequencies k * step for k = first..last. */
interface FrequencyGrid {
  readonly step: number;
  readonly first: number;
  readonly last: number;
}

/**
 * Generalised Lomb-Scargle periodogram, and its strongest sines taken out one after another, all refitted together
 * each time. Source: Zechmeister & Kürster (2009), A&A 496, 577; errors of frequency and amplitude: Montgomery &
 * O'Donoghue (1999), DSSN 13, 28 (from memory), with the scatter of the residuals.
 */
export async function computeLombScargle(
  given: SearchSeries,
  { key, settings }: Pick<LombScargleJob, 'key' | 'settings'>,
  checkpoint: Checkpoint,
): Promise<Outcome<LombScargleResult>> {
  const problem = findProblem(given, settings);
  if (problem !== undefined) return failed(problem);
  const series = weighSeries(given);
  const grid = gridOf(given, settings, series.spanDays);
  if (typeof grid === 'string') return failed(grid);
  const power = powersAt(series, grid.step, grid.last);
  const size = sizeOf(series, grid.last * grid.step);
  const peaks = await prewhiten(series, power, { grid, size, rounds: settings.rounds }, checkpoint);
  if (peaks === undefined) return cancelled;
  return done({
    key,
    frequencies: Float64Array.from({ length: grid.last - grid.first + 1 }, (_, i) => (grid.first + i) * grid.step),
    power: power.slice(grid.first),
    peaks,
    levels: LEVELS.map((probability) => ({ probability, power: sineLevel(probability, size) })),
  });
}

function findProblem({ time }: SearchSeries, { oversampling, rounds }: LombScargleSettings): string | undefined {
  if (time.length < FEWEST_POINTS)
    return `A Lomb-Scargle periodogram needs at least ${FEWEST_POINTS} points; this series has ${time.length}.`;
  if (!(time.at(-1)! > time[0]!)) return 'All points have the same time.';
  if (!(oversampling > 0)) return `The oversampling must be a positive number, not ${oversampling}.`;
  return rounds >= 1 ? undefined : `At least one round is needed, not ${rounds}.`;
}

function gridOf({ time }: SearchSeries, settings: LombScargleSettings, spanDays: number): FrequencyGrid | string {
  const steps = time.subarray(1).map((value, i) => value - time[i]!);
  const cadence = median(steps.filter((value) => value > 0));
  const shortest = settings.shortestPeriodDays ?? CADENCES_PER_PERIOD * cadence;
  const longest = settings.longestPeriodDays ?? spanDays;
  if (!(shortest > 0 && shortest < longest))
    return `The shortest period (${shortest} d) is not below the longest (${longest} d).`;
  const step = 1 / (settings.oversampling * spanDays);
  const last = Math.floor(1 / shortest / step);
  if (last > MOST_FREQUENCIES)
    return `These settings ask for ${Math.round(last / 1e6)} million frequencies, more than the ${MOST_FREQUENCIES / 1e6} million that fit: raise the shortest period.`;
  return { step, first: Math.max(1, Math.ceil(1 / longest / step)), last };
}

function sizeOf({ time, weight }: WeightedSeries, highestPerDay: number): PeriodogramSize {
  const mean = time.reduce((sum, t, i) => sum + weight[i]! * t, 0);
  const timeVariance = time.reduce((sum, t, i) => sum + weight[i]! * (t - mean) ** 2, 0);
  return { points: time.length, highestPerDay, timeVariance };
}

interface Whitening {
  readonly grid: FrequencyGrid;
  readonly size: PeriodogramSize;
  readonly rounds: number;
}

async function prewhiten(
  series: WeightedSeries,
  first: Float64Array,
  { grid, size, rounds }: Whitening,
  checkpoint: Checkpoint,
): Promise<LombScarglePeak[] | undefined> {
  const sampling = { spanDays: series.spanDays, windowFrequencies: windowFrequencies(series.time) };
  const frequencies: number[] = [];
  const found: { readonly power: number; readonly probability: number }[] = [];
  let residual = series;
  let fit: ReturnType<typeof fitSines>;
  for (let round = 0; round < rounds; round += 1) {
    const power = round === 0 ? first : powersAt(residual, grid.step, grid.last);
    const best = refineFrequency(residual, power, grid);
    const probability = sineFalseAlarm(best.power, size);
    if (probability > LEAST_SIGNIFICANCE && round > 0) break;
    const next = fitSines(series, [...frequencies, best.frequency]);
    if (next === undefined) break;
    fit = next;
    frequencies.push(best.frequency);
    found.push({ power: best.power, probability });
    residual = { ...series, flux: next.residual };
    if (!(await checkpoint.pause(round + 1, rounds))) return undefined;
  }
  const scatter = Math.sqrt(varianceOf(residual));
  return (fit?.sines ?? []).map((sine, index) => ({
    ...describeSine(series, sine, scatter),
    power: found[index]!.power,
    falseAlarmProbability: found[index]!.probability,
    relation: relateSine(sine.frequencyPerDay, frequencies.slice(0, index), sampling),
  }));
}

/** The highest power between the neighbours of the highest trial, by golden section. */
function refineFrequency(
  series: WeightedSeries,
  power: Float64Array,
  { step, first, last }: FrequencyGrid,
): { frequency: number; power: number } {
  let best = first;
  for (let k = first; k <= last; k += 1) if (power[k]! > power[best]!) best = k;
  const variance = varianceOf(series);
  const at = (frequency: number): number => powerAt(series, frequency, variance);
  let low = Math.max(first - 0.5, best - 1) * step;
  let high = (best + 1) * step;
  let [left, right] = [high - GOLDEN * (high - low), low + GOLDEN * (high - low)];
  let [atLeft, atRight] = [at(left), at(right)];
  for (let round = 0; round < 24; round += 1) {
    if (atLeft > atRight) {
      [high, right, atRight] = [right, left, atLeft];
      left = high - GOLDEN * (high - low);
      atLeft = at(left);
    } else {
      [low, left, atLeft] = [left, right, atRight];
      right = low + GOLDEN * (high - low);
      atRight = at(right);
    }
  }
  return atLeft > atRight ? { frequency: left, power: atLeft } : { frequency: right, power: atRight };
}

/** @param scatter weighted standard deviation of what is left, relative flux */
function describeSine(series: WeightedSeries, { frequencyPerDay, cosine, sine }: FittedSine, scatter: number) {
  const { time, middleDays, spanDays } = series;
  const amplitude = Math.hypot(cosine, sine);
  const amplitudeError = scatter * Math.sqrt(2 / time.length);
  return {
    frequencyPerDay,
    frequencyErrorPerDay: (Math.sqrt(3) * amplitudeError) / (Math.PI * spanDays * amplitude),
    periodDays: 1 / frequencyPerDay,
    amplitude,
    amplitudeError,
    maximumDays: middleDays + Math.atan2(sine, cosine) / (2 * Math.PI * frequencyPerDay),
  };
}
