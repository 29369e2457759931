import type { Ephemeris } from '../../src/core/ephemeris.ts';
import type { BoxMeasure } from '../../src/core/measure-box.ts';
import type { BoxWork } from './box-search.ts';

/**
 * The box of an ephemeris measured from running sums in time: two looks for each event instead of a pass over all
 * points. The same two-level least squares as `measureBox`, to rounding.
 *
 * @returns undefined when no point with weight lies inside, or none outside
 */
export function measureEvents(
  work: BoxWork,
  { periodDays, epochDays, durationDays }: Ephemeris,
): BoxMeasure | undefined {
  const { before, weight, totalWeight, startDays, elapsed } = work;
  const n = weight.length;
  const half = durationDays / 2;
  const epoch = epochDays - startDays;
  const first = Math.ceil((-half - epoch) / periodDays);
  const last = Math.floor((elapsed[n - 1]! + half - epoch) / periodDays);
  let r = 0;
  let s = 0;
  let pointsInside = 0;
  let eventCount = 0;
  for (let cycle = first; cycle <= last; cycle += 1) {
    const middle = epoch + cycle * periodDays;
    const from = firstAtOrAfter(work, middle - half);
    let end = firstAtOrAfter(work, middle + half);
    while (end < n && elapsed[end]! <= middle + half) end += 1;
    if (end <= from) continue;
    r += before[2 * end]! - before[2 * from]!;
    s += before[2 * end + 1]! - before[2 * from + 1]!;
    pointsInside += end - from;
    eventCount += 1;
  }
  if (!(r > 0) || !(totalWeight > r)) return undefined;
  const depth = (-s * totalWeight) / (r * (totalWeight - r));
  const depthError = Math.sqrt(1 / r + 1 / (totalWeight - r));
  return { depth, depthError, signalToNoise: depth / depthError, pointsInside, eventCount };
}

function firstAtOrAfter({ lookup, cellsPerDay, elapsed, weight }: BoxWork, time: number): number {
  if (time <= 0) return 0;
  const n = weight.length;
  const cell = Math.floor(time * cellsPerDay);
  if (cell >= lookup.length) return n;
  let i = lookup[cell]!;
  while (i < n && elapsed[i]! < time) i += 1;
  return i;
}

/** The same points, those near the events of these signals without weight. */
export function maskWork(work: BoxWork, signals: readonly Ephemeris[], halfWidth: number): BoxWork {
  const weight = work.weight.slice();
  const weighted = work.weighted.slice();
  for (const { periodDays, epochDays, durationDays } of signals) {
    const epoch = epochDays - work.startDays;
    const half = halfWidth * durationDays;
    const last = (work.elapsed[weight.length - 1]! + half - epoch) / periodDays;
    for (let cycle = Math.ceil((-half - epoch) / periodDays); cycle <= last; cycle += 1) {
      const middle = epoch + cycle * periodDays;
      const from = firstAtOrAfter(work, middle - half);
      let end = firstAtOrAfter(work, middle + half);
      while (end < weight.length && work.elapsed[end]! <= middle + half) end += 1;
      weight.fill(0, from, end);
      weighted.fill(0, from, end);
    }
  }
  return { ...work, ...addUp(weight, weighted), weight, weighted, sums: new Float64Array(0) };
}

function addUp(weight: Float64Array, weighted: Float64Array): Pick<BoxWork, 'before' | 'totalWeight'> {
  const before = new Float64Array(2 * (weight.length + 1));
  let r = 0;
  let s = 0;
  for (let i = 0; i < weight.length; i += 1) {
    r += weight[i]!;
    s += weighted[i]!;
    before[2 * i + 2] = r;
    before[2 * i + 3] = s;
  }
  return { before, totalWeight: r };
}
