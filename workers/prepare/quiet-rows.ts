import { median, pointToPointScatter } from '../../src/core/robust-statistics.ts';
import type { ModeRow } from './mode-lattice.ts';

/** A quiet star's scatter is at most so many times the median one. */
const LARGEST_SCATTER = 3;
/** It has data at this part of the lattice's times. */
const LEAST_COVERAGE = 0.6;
/** Scatter over the scatter of neighbours: above it a row varies and is not only noise. */
const VARYING = 1.5;
/** Correlation of a varying star's slow variation with that of other stars: a quarter of them must reach it. */
const LEAST_SHARED = 0.5;
/** Slow variation is that of means over so many days. */
const SLOW_DAYS = 0.25;
/** A mode of which a varying star carries this part is that star's own. */
const LARGEST_LOADING = 0.5;

/** The rows of stars with enough common times, no louder than most, and not ruled by their own variation. */
export function pickQuietRows(rows: readonly ModeRow[], stepDays: number): ModeRow[] {
  const covered = rows.filter(({ coverage }) => coverage >= LEAST_COVERAGE);
  const typical = median(covered.map(({ scatter }) => scatter));
  const calm = covered.filter(({ scatter }) => scatter <= LARGEST_SCATTER * typical);
  const block = Math.max(1, Math.round(SLOW_DAYS / stepDays));
  const slow = calm.map(({ values }) => standardise(meansOf(values, block)));
  return calm.filter((row, i) => !isVarying(row) || sharedPart(slow, i) >= LEAST_SHARED);
}

/** The rows without those that rule a mode by themselves; all of them where there is none. */
export function withoutRulers(rows: readonly ModeRow[], loadings: readonly Float64Array[]): ModeRow[] {
  return rows.filter((row, i) => !(isVarying(row) && loadings.some((loading) => loading[i]! ** 2 > LARGEST_LOADING)));
}

/** The scatter of a row is 1. */
const isVarying = ({ values }: ModeRow): boolean => VARYING * pointToPointScatter(values) < 1;

function sharedPart(slow: readonly Float64Array[], own: number): number {
  const others = slow.filter((_, i) => i !== own).map((other) => Math.abs(correlate(slow[own]!, other)));
  return others.sort((a, b) => b - a)[Math.floor(others.length / 4)] ?? 0;
}

function meansOf(values: Float64Array, block: number): Float64Array {
  const means = new Float64Array(Math.ceil(values.length / block));
  for (let k = 0; k < means.length; k += 1) {
    const part = values.subarray(k * block, (k + 1) * block);
    means[k] = part.reduce((sum, value) => sum + value, 0) / part.length;
  }
  return means;
}

function standardise(values: Float64Array): Float64Array {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const scatter = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length);
  return values.map((value) => (scatter > 0 ? (value - mean) / scatter : 0));
}

const correlate = (a: Float64Array, b: Float64Array): number =>
  a.reduce((sum, value, i) => sum + value * b[i]!, 0) / a.length;
