import { DROP_REASONS, type DropReason, type PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { Interval } from '../../src/core/interval.ts';
import type { LightCurve } from '../../src/core/light-curve.ts';

export const reasonCode = (reason: DropReason): number => DROP_REASONS.indexOf(reason);

/** A point that is left out. */
export interface Dropped {
  readonly index: number;
  readonly reason: DropReason;
}

/** Indices into the light curve. */
export interface Selection {
  readonly kept: Int32Array;
  readonly dropped: readonly Dropped[];
  readonly missing: number;
}

/**
 * Sorts the points of a column into missing (no finite flux), flagged, at times of the instrument, excluded, and kept,
 * in this order of test.
 */
export function selectPoints(
  { time, quality }: LightCurve,
  flux: Float64Array,
  qualityMask: number,
  { excluded, instrumentSpans }: Pick<PrepareJob, 'excluded' | 'instrumentSpans'>,
): Selection {
  const isInstrument = within(instrumentSpans);
  const isExcluded = within(excluded);
  const kept: number[] = [];
  const dropped: Dropped[] = [];
  let missing = 0;
  for (let index = 0; index < time.length; index += 1) {
    if (!Number.isFinite(flux[index]!)) missing += 1;
    else if ((quality[index]! & qualityMask) !== 0) dropped.push({ index, reason: 'flagged' });
    else if (isInstrument(time[index]!)) dropped.push({ index, reason: 'instrument' });
    else if (isExcluded(time[index]!)) dropped.push({ index, reason: 'excluded' });
    else kept.push(index);
  }
  return { kept: Int32Array.from(kept), dropped, missing };
}

/** Whether a time lies in one of the spans, ends included; times must ascend from call to call. */
function within(spans: readonly Interval[]): (time: number) => boolean {
  const sorted = [...spans].sort((a, b) => a.start - b.start);
  let next = 0;
  let end = Number.NEGATIVE_INFINITY;
  return (time) => {
    for (; next < sorted.length && sorted[next]!.start <= time; next += 1) end = Math.max(end, sorted[next]!.end);
    return time <= end;
  };
}
