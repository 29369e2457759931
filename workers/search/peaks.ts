import type { BoxPeak, SearchSeries } from '../../src/contract/search-contract.ts';
import { type Ephemeris, phaseOf } from '../../src/core/ephemeris.ts';
import { measureBox } from '../../src/core/measure-box.ts';
import { isSameSignal } from '../../src/core/same-signal.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { estimateTimingErrors } from './box-errors.ts';
import { makeBoxWork } from './box-search.ts';
import { refineBox } from './refine-box.ts';

const MOST_PEAKS = 5;
/** Candidates held against the peaks already found; a strong signal has hundreds of shoulders and harmonics. */
const MOST_CANDIDATES = 1500;
/** A candidate that loses more than this part of its S/N without the points of stronger peaks is their echo. */
const LEAST_OWN_SIGNAL = 0.5;
/** Half-width, in durations, of what is taken out around an event. */
const MASK_HALF_WIDTH = 0.75;

/** The joined periodogram, ascending in period. */
export interface Periodogram {
  readonly periods: Float64Array;
  readonly signalToNoise: Float64Array;
  readonly durationDays: Float64Array;
  readonly epochDays: Float64Array;
  readonly sde: Float64Array;
}

/**
 * The five strongest separate peaks, refined, strongest first. Two are the same signal when they drift apart by less
 * than half a duration over the span, or when the weaker lives on the stronger one's events (shoulders, harmonics and
 * other commensurate periods): without those points it falls below half of its S/N.
 *
 * @returns undefined when cancelled
 */
export async function findPeaks(
  series: SearchSeries,
  periodogram: Periodogram,
  checkpoint: Checkpoint,
): Promise<BoxPeak[] | undefined> {
  const work = makeBoxWork(series);
  const peaks: BoxPeak[] = [];
  const spanDays = series.time.at(-1)! - series.time[0]!;
  let rest = series;
  const candidates = localMaxima(periodogram.signalToNoise).slice(0, MOST_CANDIDATES);
  for (const [rank, trial] of candidates.entries()) {
    if (checkpoint.isDue() && !(await checkpoint.pause(rank, candidates.length))) return undefined;
    const candidate = ephemerisAt(periodogram, trial);
    if (peaks.some((peak) => isSameSignal(peak, candidate, spanDays))) continue;
    if (peaks.length > 0 && !standsAlone(rest, candidate, periodogram.signalToNoise[trial]!)) continue;
    const refined = refineBox(series, work, candidate, reachOf(periodogram.periods, trial));
    if (peaks.some((peak) => isSameSignal(peak, refined, spanDays))) continue;
    const peak = describePeak(series, refined, periodogram.sde[trial]!);
    if (peak === undefined) continue;
    peaks.push(peak);
    if (peaks.length === MOST_PEAKS) break;
    rest = withoutEvents(rest, peak);
  }
  return peaks.sort((a, b) => b.signalToNoise - a.signalToNoise);
}

/** Trials that no neighbour exceeds, strongest first. */
function localMaxima(power: Float64Array): number[] {
  const found: number[] = [];
  for (let i = 0; i < power.length; i += 1) {
    const value = power[i]!;
    if (value > 0 && value >= (power[i - 1] ?? 0) && value > (power[i + 1] ?? 0)) found.push(i);
  }
  return found.sort((a, b) => power[b]! - power[a]!);
}

function ephemerisAt({ periods, epochDays, durationDays }: Periodogram, trial: number): Ephemeris {
  return { periodDays: periods[trial]!, epochDays: epochDays[trial]!, durationDays: durationDays[trial]! };
}

function reachOf(periods: Float64Array, trial: number): { from: number; to: number } {
  const own = periods[trial]!;
  return { from: periods[trial - 1] ?? own, to: periods[trial + 1] ?? own };
}

function standsAlone({ time, flux, error }: SearchSeries, candidate: Ephemeris, signalToNoise: number): boolean {
  const own = measureBox(time, flux, error, candidate);
  return own !== undefined && own.signalToNoise >= LEAST_OWN_SIGNAL * signalToNoise;
}

function withoutEvents(series: SearchSeries, { periodDays, epochDays, durationDays }: Ephemeris): SearchSeries {
  const reach = (MASK_HALF_WIDTH * durationDays) / periodDays;
  const keep = series.time.map((time) => (Math.abs(phaseOf(time, periodDays, epochDays)) > reach ? 1 : 0));
  const pick = (values: Float64Array): Float64Array => values.filter((_, i) => keep[i] === 1);
  return { ...series, time: pick(series.time), flux: pick(series.flux), error: pick(series.error) };
}

function describePeak(series: SearchSeries, ephemeris: Ephemeris, sde: number): BoxPeak | undefined {
  const measure = measureBox(series.time, series.flux, series.error, ephemeris);
  if (measure === undefined || !(measure.signalToNoise > 0)) return undefined;
  return {
    ...ephemeris,
    ...estimateTimingErrors(series, ephemeris, measure.signalToNoise),
    boxDepth: measure.depth,
    boxDepthError: measure.depthError,
    signalToNoise: measure.signalToNoise,
    sde,
    eventCount: measure.eventCount,
    pointsInEvents: measure.pointsInside,
  };
}
