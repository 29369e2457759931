import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { type Ephemeris, phaseOf } from '../../src/core/ephemeris.ts';

/** Half-width, in durations, of what is left out around an event: its ends and a little of what a wrong epoch leaves. */
export const MASK_HALF_WIDTH = 0.75;

/** The series without the points in the events of these signals; the same object when there is nothing to mask. */
export function maskSignals(series: SearchSeries, signals: readonly Ephemeris[]): SearchSeries {
  if (signals.length === 0) return series;
  const kept = new Int32Array(series.time.length);
  let count = 0;
  for (let i = 0; i < series.time.length; i += 1) {
    if (signals.some((signal) => isInEvent(series.time[i]!, signal))) continue;
    kept[count] = i;
    count += 1;
  }
  return {
    ...series,
    time: pick(series.time, kept, count),
    flux: pick(series.flux, kept, count),
    error: pick(series.error, kept, count),
  };
}

function isInEvent(time: number, { periodDays, epochDays, durationDays }: Ephemeris): boolean {
  return Math.abs(phaseOf(time, periodDays, epochDays)) * periodDays <= MASK_HALF_WIDTH * durationDays;
}

function pick(values: Float64Array, indices: Int32Array, count: number): Float64Array {
  const picked = new Float64Array(count);
  for (let i = 0; i < count; i += 1) picked[i] = values[indices[i]!]!;
  return picked;
}
