import type { PreparedSeries } from '../contract/prepare-contract.ts';
import type { BoxSearchResult } from '../contract/search-contract.ts';
import { phaseOf } from '../core/ephemeris.ts';
import type { TargetSummary } from './results-store.ts';

const BINS = 40;
/** The small fold shows this many durations about mid-event, and never more than the whole cycle. */
const DURATIONS_SHOWN = 6;

/** What a docket row shows: the strongest peak and a fold of it in few bins. */
export function summariseTarget(series: PreparedSeries, search: BoxSearchResult): TargetSummary {
  const peak = search.peaks[0];
  if (peak === undefined) return { key: search.key, periodDays: undefined, signalToNoise: undefined, smallFold: [] };
  const { periodDays, epochDays, durationDays } = peak;
  const halfWidth = Math.min(0.5, (DURATIONS_SHOWN * durationDays) / periodDays / 2);
  const sums = new Float64Array(BINS);
  const counts = new Int32Array(BINS);
  for (let i = 0; i < series.time.length; i += 1) {
    const phase = phaseOf(series.time[i]!, periodDays, epochDays);
    const bin = Math.floor(((phase + halfWidth) / (2 * halfWidth)) * BINS);
    if (bin < 0 || bin >= BINS) continue;
    sums[bin]! += series.flux[i]! - 1;
    counts[bin]! += 1;
  }
  const smallFold = Array.from(sums, (sum, bin) => (counts[bin] === 0 ? Number.NaN : sum / counts[bin]!));
  return { key: search.key, periodDays, signalToNoise: peak.signalToNoise, smallFold };
}
