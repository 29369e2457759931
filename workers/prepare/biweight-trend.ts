import { iterateBiweight } from '../../src/core/biweight.ts';
import type { Checkpoint } from '../checkpoint.ts';

/** Cut of the biweight in MADs, as usual for transits: Hippke et al. (2019), AJ 158, 143. */
const CUT = 5;
/** A window with fewer points has no location of its own. */
const LEAST_POINTS = 3;
/** Nodes in one window where the trend is not computed at every point. */
const NODES_PER_WINDOW = 32;
/** Up to this many window members in all, every point gets its own window. */
const MOST_MEMBERS = 4_000_000;

export interface TrendInput {
  /** Days, ascending, length n. */
  readonly time: Float64Array;
  /** Relative flux, length n. */
  readonly flux: Float64Array;
  /** Length n; points with 0 carry no weight but get a trend. */
  readonly hasWeight: Uint8Array;
  /** Full width. */
  readonly windowDays: number;
}

/**
 * Slow trend by a sliding Tukey biweight location (iterated, c = 5) in windows of time. Windows are cut off at the
 * ends of a piece, and pieces end at gaps longer than half a window. Where a window has fewer than three points with
 * weight, the trend is interpolated in time from its neighbours. Long series are computed at 32 nodes a window and
 * interpolated linearly between them.
 * Source: Hippke et al. (2019), AJ 158, 143, who compare such filters and prefer this one.
 *
 * @returns length n, in the unit of flux; 1 everywhere when no window has enough points; undefined when cancelled
 */
export async function fitBiweightTrend(input: TrendInput, checkpoint: Checkpoint): Promise<Float64Array | undefined> {
  const { time, flux, hasWeight, windowDays } = input;
  const n = time.length;
  const trend = new Float64Array(n).fill(Number.NaN);
  const members = gather(time, flux, hasWeight);
  const window = makeWindow(members, windowDays);
  for (const [first, end] of splitAtGaps(time, windowDays / 2)) {
    const nodes = nodesOf(time, first, end, windowDays);
    const values = new Float64Array(nodes.length);
    const [from, to] = [time[first]!, time[end - 1]!];
    for (let i = 0; i < nodes.length; i += 1) {
      values[i] = window(nodes[i]!, from, to);
      if (checkpoint.isDue() && !(await checkpoint.pause(first, n))) return undefined;
    }
    fillBetween(nodes, values, time.subarray(first, end), trend.subarray(first, end));
  }
  bridge(time, trend);
  return trend;
}

interface Members {
  readonly time: Float64Array;
  readonly flux: Float64Array;
}

function gather(time: Float64Array, flux: Float64Array, hasWeight: Uint8Array): Members {
  const isMember = (i: number): boolean => hasWeight[i] === 1 && Number.isFinite(flux[i]!);
  return { time: time.filter((_, i) => isMember(i)), flux: flux.filter((_, i) => isMember(i)) };
}

/** [first, end) of each run of points without a longer gap. */
function splitAtGaps(time: Float64Array, longestGap: number): [number, number][] {
  const pieces: [number, number][] = [];
  let first = 0;
  for (let i = 1; i <= time.length; i += 1) {
    if (i < time.length && time[i]! - time[i - 1]! <= longestGap) continue;
    pieces.push([first, i]);
    first = i;
  }
  return pieces;
}

/** Times at which the trend of a piece is computed: the points themselves, or a lattice where that is much cheaper. */
function nodesOf(time: Float64Array, first: number, end: number, windowDays: number): Float64Array {
  const points = end - first;
  const length = time[end - 1]! - time[first]!;
  const perWindow = length > windowDays ? (points * windowDays) / length : points;
  const count = Math.ceil((length / windowDays) * NODES_PER_WINDOW) + 1;
  if (time.length * perWindow <= MOST_MEMBERS || count >= points) return time.subarray(first, end);
  return Float64Array.from({ length: count }, (_, i) => time[first]! + (length * i) / (count - 1));
}

/** The location in the window around a time, within a piece; times must ascend from call to call. */
function makeWindow({ time, flux }: Members, windowDays: number): (at: number, from: number, to: number) => number {
  const values = new Float64Array(time.length);
  const scratch = new Float64Array(time.length);
  let first = 0;
  let end = 0;
  return (at, from, to) => {
    const start = Math.max(from, at - windowDays / 2);
    const stop = Math.min(to, at + windowDays / 2);
    while (first < time.length && time[first]! < start) first += 1;
    end = Math.max(end, first);
    while (end < time.length && time[end]! <= stop) end += 1;
    const count = end - first;
    if (count < LEAST_POINTS) return Number.NaN;
    for (let i = 0; i < count; i += 1) values[i] = flux[first + i]!;
    return iterateBiweight(values, scratch, count, CUT);
  };
}

/** Linear interpolation from the nodes that have a value; NaN where there is no pair around a time. */
function fillBetween(nodes: Float64Array, values: Float64Array, time: Float64Array, trend: Float64Array): void {
  if (nodes.length === time.length) {
    trend.set(values);
    return;
  }
  let node = 0;
  for (let i = 0; i < time.length; i += 1) {
    while (node < nodes.length - 2 && nodes[node + 1]! < time[i]!) node += 1;
    const part = (time[i]! - nodes[node]!) / (nodes[node + 1]! - nodes[node]!);
    trend[i] = values[node]! + part * (values[node + 1]! - values[node]!);
  }
}

/** Fills NaN by interpolation in time from the nearest known values, flat beyond the first and last. */
function bridge(time: Float64Array, trend: Float64Array): void {
  let known = -1;
  for (let i = 0; i <= trend.length; i += 1) {
    if (i < trend.length && Number.isNaN(trend[i]!)) continue;
    for (let gap = known + 1; gap < i; gap += 1) trend[gap] = between(time, trend, known, i, gap);
    known = i;
  }
}

function between(time: Float64Array, trend: Float64Array, before: number, after: number, at: number): number {
  if (before < 0) return trend[after] ?? 1;
  if (after >= trend.length) return trend[before]!;
  const part = (time[at]! - time[before]!) / (time[after]! - time[before]!);
  return trend[before]! + part * (trend[after]! - trend[before]!);
}
