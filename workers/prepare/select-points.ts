import { DROP_REASONS, type DropReason, type PrepareJob } from '../../src/contract/prepare-contract.ts';
import { contains } from '../../src/core/interval.ts';
import type { LightCurve } from '../../src/core/light-curve.ts';

export const reasonCode = (reason: DropReason): number => DROP_REASONS.indexOf(reason);

/** Indices into the light curve. */
export interface Selection {
  readonly kept: Int32Array;
  readonly dropped: readonly { readonly index: number; readonly reason: DropReason }[];
  readonly missing: number;
}

/** Sorts the points of a column into kept, flagged, excluded and missing (no finite flux), in this order of test, those at times of the instrument between flagged and excluded. */
export function selectPoints(
  { time, quality }: LightCurve,
  flux: Float64Array,
  qualityMask: number,
  { excluded, instrumentSpans }: Pick<PrepareJob, 'excluded' | 'instrumentSpans'>,
): Selection {
  const kept: number[] = [];
  const dropped: { index: number; reason: DropReason }[] = [];
  let missing = 0;
  for (let index = 0; index < time.length; index += 1) {
    if (!Number.isFinite(flux[index]!)) missing += 1;
    else if ((quality[index]! & qualityMask) !== 0) dropped.push({ index, reason: 'flagged' });
    else if (instrumentSpans.some((span) => contains(span, time[index]!)))
      dropped.push({ index, reason: 'instrument' });
    else if (excluded.some((interval) => contains(interval, time[index]!))) dropped.push({ index, reason: 'excluded' });
    else kept.push(index);
  }
  return { kept: Int32Array.from(kept), dropped, missing };
}
