import type { ModeStar } from '../../src/contract/prepare-contract.ts';
import { phaseOf } from '../../src/core/ephemeris.ts';
import { median, robustSigma } from '../../src/core/robust-statistics.ts';

/** A longer lattice is made coarser. */
const MOST_CELLS = 100_000;
/** A cell counts where this part of the stars has data. */
const LEAST_STARS_PART = 0.5;
/** Events are masked over this many durations on each side of their middle: tails and timing included. */
const MASK_DURATIONS = 0.75;
/** What stands out by more is that star's own affair. */
const CLIP_SIGMA = 5;
/** Shorter gaps and masked events are interpolated; longer ones take the star's median. */
const LONGEST_BRIDGE_DAYS = 1;

/** Times at which the docket's stars are held against each other. */
export interface ModeLattice {
  /** Days, ascending; not even where the stars had no data. */
  readonly time: Float64Array;
  readonly startDays: number;
  readonly stepDays: number;
  /** For each cell from the start, its place in `time`, or -1. */
  readonly placeOf: Int32Array;
}

/** One star on the lattice. */
export interface ModeRow {
  /** Median 0 and robust scatter 1, without NaN. */
  readonly values: Float64Array;
  /** Robust scatter before it was made 1, relative flux. */
  readonly scatter: number;
  /** Part of the lattice's times at which the star has data. */
  readonly coverage: number;
}

const cadenceOf = ({ time }: ModeStar): number => median(time.subarray(1).map((value, i) => value - time[i]!));

/** A lattice of the stars' median cadence, of the times that at least half of them have. */
export function latticeOf(stars: readonly ModeStar[]): ModeLattice {
  const startDays = stars.reduce((least, { time }) => Math.min(least, time[0]!), Number.POSITIVE_INFINITY);
  const endDays = stars.reduce((most, { time }) => Math.max(most, time.at(-1)!), Number.NEGATIVE_INFINITY);
  const typical = median(stars.map(cadenceOf)) || 1;
  // Of gaps that are long against the rest nothing is kept, so the longest star and not the span sets the count.
  const longest = stars.reduce((most, { time }) => Math.max(most, time.length), 0);
  let stepDays = typical * Math.ceil(longest / MOST_CELLS);
  stepDays *= Math.ceil((endDays - startDays) / stepDays / (100 * MOST_CELLS)) || 1;
  const placeOf = new Int32Array(Math.floor((endDays - startDays) / stepDays + 0.5) + 1);
  for (const { time } of stars) {
    let last = -1;
    for (let i = 0; i < time.length; i += 1) {
      const cell = cellOf(time[i]!, startDays, stepDays);
      if (cell !== last) placeOf[cell] = placeOf[cell]! + 1;
      last = cell;
    }
  }
  const kept = Int32Array.from(placeOf.keys()).filter((cell) => placeOf[cell]! >= LEAST_STARS_PART * stars.length);
  placeOf.fill(-1);
  for (let place = 0; place < kept.length; place += 1) placeOf[kept[place]!] = place;
  return { time: Float64Array.from(kept, (cell) => startDays + cell * stepDays), startDays, stepDays, placeOf };
}

const cellOf = (time: number, startDays: number, stepDays: number): number => Math.round((time - startDays) / stepDays);

/** A star's flux averaged in each cell, its own events masked; undefined where it has no scatter. */
export function rowOf({ time, flux, masked }: ModeStar, lattice: ModeLattice): ModeRow | undefined {
  const { startDays, stepDays, placeOf } = lattice;
  const sums = new Float64Array(lattice.time.length);
  const counts = new Int32Array(sums.length);
  const isMasked = (at: number): boolean =>
    masked.some(
      ({ periodDays, epochDays, durationDays }) =>
        Math.abs(phaseOf(at, periodDays, epochDays)) * periodDays < MASK_DURATIONS * durationDays,
    );
  for (let i = 0; i < time.length; i += 1) {
    const place = placeOf[cellOf(time[i]!, startDays, stepDays)] ?? -1;
    if (place < 0 || !Number.isFinite(flux[i]!) || isMasked(time[i]!)) continue;
    sums[place] = sums[place]! + flux[i]!;
    counts[place] = counts[place]! + 1;
  }
  const means = sums.map((sum, place) => sum / counts[place]!);
  const known = means.filter(Number.isFinite);
  const scatter = robustSigma(known);
  if (!(scatter > 0)) return undefined;
  const centre = median(known);
  const values = means.map((value) => Math.max(-CLIP_SIGMA, Math.min(CLIP_SIGMA, (value - centre) / scatter)));
  bridge(lattice.time, values);
  return { values, scatter, coverage: known.length / values.length };
}

/** Fills NaN in place. */
function bridge(time: Float64Array, values: Float64Array): void {
  let known = -1;
  for (let i = 0; i <= values.length; i += 1) {
    if (i < values.length && Number.isNaN(values[i]!)) continue;
    const isShort = known >= 0 && i < values.length && time[i]! - time[known]! <= LONGEST_BRIDGE_DAYS;
    for (let gap = known + 1; gap < i; gap += 1) {
      const part = isShort ? (time[gap]! - time[known]!) / (time[i]! - time[known]!) : 0;
      values[gap] = isShort ? values[known]! + part * (values[i]! - values[known]!) : 0;
    }
    known = i;
  }
}
