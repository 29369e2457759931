import type { LombScargleSettings } from '../../../src/contract/lomb-scargle-contract.ts';
import { median } from '../../../src/core/robust-statistics.ts';
import type { WeightedSeries } from './weighted-series.ts';

const FEWEST_TIMES = 4;
/** Half a gigabyte of sums and transforms. */
const MOST_FREQUENCIES = 4_000_000;
/** Cadences in the shortest default period, which is at most half the span. */
const CADENCES_PER_PERIOD = 4;
const MOST_ROUNDS = 8;
/** Of a step: an end of the range that falls on the grid is not lost to rounding. */
const HAIR = 1e-9;

/** Frequencies k * step for k = first..last, per day. */
export interface FrequencyGrid {
  readonly step: number;
  readonly first: number;
  readonly last: number;
}

/** The trial frequencies of a job, or a sentence that says why there are none. */
export function planSines(series: WeightedSeries, settings: LombScargleSettings): FrequencyGrid | string {
  const steps = stepsBetween(series.time);
  return findProblem(series, steps.length + 1, settings) ?? gridOf(series.spanDays, steps, settings);
}

/** Days between times that differ, ascending times. */
function stepsBetween(time: Float64Array): Float64Array {
  const steps = new Float64Array(Math.max(0, time.length - 1));
  let n = 0;
  for (let i = 1; i < time.length; i += 1) {
    const step = time[i]! - time[i - 1]!;
    if (step > 0) {
      steps[n] = step;
      n += 1;
    }
  }
  return steps.slice(0, n);
}

function findProblem({ time }: WeightedSeries, times: number, { oversampling, rounds }: LombScargleSettings) {
  if (time.length < FEWEST_TIMES)
    return `A Lomb-Scargle periodogram needs at least ${FEWEST_TIMES} points; this series has ${time.length}.`;
  if (times === 1) return 'All points have the same time.';
  if (times < FEWEST_TIMES)
    return `A Lomb-Scargle periodogram needs at least ${FEWEST_TIMES} different times; this series has ${times}.`;
  if (!(oversampling > 0 && Number.isFinite(oversampling)))
    return `The oversampling must be a positive number, not ${oversampling}.`;
  if (!(rounds >= 1 && rounds <= MOST_ROUNDS)) return `Rounds must be 1 to ${MOST_ROUNDS}, not ${rounds}.`;
  return undefined;
}

function gridOf(spanDays: number, steps: Float64Array, settings: LombScargleSettings): FrequencyGrid | string {
  const shortest = settings.shortestPeriodDays ?? Math.min(CADENCES_PER_PERIOD * median(steps), spanDays / 2);
  const longest = settings.longestPeriodDays ?? spanDays;
  if (!(shortest > 0)) return `The shortest period must be above zero, not ${shortest} d.`;
  if (!(longest > shortest && Number.isFinite(longest)))
    return `The longest period (${short(longest)} d) must be above the shortest (${short(shortest)} d).`;
  const step = 1 / (settings.oversampling * spanDays);
  const first = Math.max(1, Math.ceil(1 / longest / step - HAIR));
  const last = Math.floor(1 / shortest / step + HAIR);
  if (last > MOST_FREQUENCIES) return tooMany(last);
  if (last < first)
    return `No trial frequency lies between periods of ${short(shortest)} and ${short(longest)} d: raise the oversampling.`;
  return { step, first, last };
}

const short = (days: number): number => Number(days.toPrecision(5));

function tooMany(count: number): string {
  const asked = count < 1e9 ? `${Math.round(count / 1e5) / 10} million` : `${count.toExponential(1)}`;
  return `These settings ask for ${asked} frequencies, and ${MOST_FREQUENCIES / 1e6} million fit in memory: raise the shortest period or lower the oversampling.`;
}
