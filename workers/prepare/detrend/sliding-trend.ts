import type { Checkpoint } from '../../checkpoint.ts';
import { bridgeTrend } from './bridge-trend.ts';
import { piecesOf } from './pieces.ts';
import type { TrendInput } from './trend-input.ts';

/** Nodes in one window where the trend is not computed at every point. */
const NODES_PER_WINDOW = 32;
/** Up to this many window members in all, every point gets its own window. */
const MOST_MEMBERS = 4_000_000;

/** The members of one window; the arrays are scratch and may be written over. */
export interface WindowMembers {
  /** Days from the window's middle. */
  readonly time: Float64Array;
  readonly flux: Float64Array;
  readonly scratch: Float64Array;
  readonly count: number;
}

/** The trend at the middle of a window; NaN where its points are too few. */
export type Locate = (members: WindowMembers) => number;

/**
 * A slow trend by a location in windows that slide in time. Windows are cut off at the ends of a piece; pieces end at
 * gaps longer than half a window and wherever the series is split. Where a window has too few points with weight, the
 * trend is interpolated in time from its neighbours. Long series are computed at 32 nodes a window and interpolated
 * linearly between them.
 *
 * @param windowDays full width
 * @returns length n, in the unit of flux; 1 everywhere when no window has enough points; undefined when cancelled
 */
export async function fitSlidingTrend(
  input: TrendInput,
  windowDays: number,
  locate: Locate,
  checkpoint: Checkpoint,
): Promise<Float64Array | undefined> {
  const { time, flux, hasWeight } = input;
  const n = time.length;
  const trend = new Float64Array(n).fill(Number.NaN);
  const members = gather(time, flux, hasWeight);
  const window = makeWindow(members, windowDays, locate);
  for (const { first, end } of piecesOf(time, input.splits, windowDays / 2)) {
    const nodes = nodesOf(time, first, end, windowDays);
    const values = new Float64Array(nodes.length);
    const [from, to] = [time[first]!, time[end - 1]!];
    for (let i = 0; i < nodes.length; i += 1) {
      values[i] = window(nodes[i]!, from, to);
      if (checkpoint.isDue() && !(await checkpoint.pause(first, n))) return undefined;
    }
    fillBetween(nodes, values, time.subarray(first, end), trend.subarray(first, end));
  }
  bridgeTrend(time, trend);
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
function makeWindow(
  { time, flux }: Members,
  windowDays: number,
  locate: Locate,
): (at: number, from: number, to: number) => number {
  const times = new Float64Array(time.length);
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
    for (let i = 0; i < count; i += 1) {
      times[i] = time[first + i]! - at;
      values[i] = flux[first + i]!;
    }
    return locate({ time: times, flux: values, scratch, count });
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
