import type { PreparedSeries } from '../contract/prepare-contract.ts';
import type { BoxPeak, BoxSearchResult } from '../contract/search-contract.ts';
import { rankedSignalToNoise } from '../core/box-search-settings.ts';
import { phaseOf } from '../core/ephemeris.ts';
import type { TargetSummary } from './results-store.ts';

const FOLD_BINS = 40;
const STRIP_SPANS = 64;
/** The small fold shows this many durations about mid-event, and never more than the whole cycle. */
const DURATIONS_SHOWN = 6;

/** What a docket row shows: the strongest peak, a fold of it in few bins, and the series in few spans. */
export function summariseTarget(series: PreparedSeries, search: BoxSearchResult): TargetSummary {
  const peak = search.peaks[0];
  return {
    key: search.key,
    periodDays: peak?.periodDays,
    signalToNoise: peak?.signalToNoise,
    sde: peak?.sde,
    eventCount: peak?.eventCount,
    depth: peak?.boxDepth,
    objective: peak && rankedSignalToNoise(peak, search.settings.objective),
    falseAlarmProbability: undefined,
    failure: undefined,
    smallStrip: shrinkStrip(series),
    smallFold: peak === undefined ? [] : shrinkFold(series, peak),
  };
}

/** Of a target that could not be searched, so that the docket says so. */
export function failedSummary(key: string, failure: string): TargetSummary {
  const none = undefined;
  return {
    key,
    failure,
    periodDays: none,
    signalToNoise: none,
    sde: none,
    eventCount: none,
    depth: none,
    objective: none,
    falseAlarmProbability: none,
    smallStrip: [],
    smallFold: [],
  };
}

function shrinkFold({ time, flux }: PreparedSeries, { periodDays, epochDays, durationDays }: BoxPeak): number[] {
  const halfWidth = Math.min(0.5, (DURATIONS_SHOWN * durationDays) / periodDays / 2);
  const sums = new Float64Array(FOLD_BINS);
  const counts = new Int32Array(FOLD_BINS);
  for (let i = 0; i < time.length; i += 1) {
    const phase = phaseOf(time[i]!, periodDays, epochDays);
    const bin = Math.floor(((phase + halfWidth) / (2 * halfWidth)) * FOLD_BINS);
    if (bin < 0 || bin >= FOLD_BINS) continue;
    sums[bin]! += flux[i]! - 1;
    counts[bin]! += 1;
  }
  return Array.from(sums, (sum, bin) => (counts[bin] === 0 ? Number.NaN : sum / counts[bin]!));
}

/** The lowest flux of each span, so that a short dip is not averaged away. */
function shrinkStrip({ time, flux, spanDays }: PreparedSeries): number[] {
  const lowest = new Array<number>(STRIP_SPANS).fill(Number.NaN);
  for (let i = 0; i < time.length; i += 1) {
    const span = Math.min(STRIP_SPANS - 1, Math.floor(((time[i]! - time[0]!) / spanDays) * STRIP_SPANS));
    const value = flux[i]! - 1;
    if (!(lowest[span]! <= value)) lowest[span] = value;
  }
  return lowest;
}
