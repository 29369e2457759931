import { iterateBiweight } from '../../../src/core/biweight.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { fitByPieces, LEAST_MEMBERS, type PiecePoints } from './fit-by-pieces.ts';
import type { Detrender, TrendInput } from './trend-input.ts';
import { windowsAround } from './windows.ts';

/** Cut of the biweight in MADs, as usual for transits: Hippke et al. (2019), AJ 158, 143. */
const CUT = 5;
/** Nodes in one window where the trend is not computed at every point. */
const NODES_PER_WINDOW = 32;
/** Up to this many window members in all, every point gets its own window. */
const MOST_MEMBERS = 4_000_000;

export const biweight: Detrender<'biweight'> = {
  scaleDays: ({ windowDays }) => windowDays,
  scaleName: 'window',
  leastCadences: () => LEAST_MEMBERS,
  fit: ({ windowDays }, input, checkpoint) => fitBiweightTrend(input, windowDays, checkpoint),
};

/**
 * Slow trend by a sliding Tukey biweight location (iterated, c = 5) in windows of time, cut off at the ends of a piece.
 * Where a window has fewer than three points with weight, the trend is interpolated in time from its neighbours. Long
 * series are computed at 32 nodes a window and interpolated linearly between them.
 * Source: Hippke et al. (2019), AJ 158, 143, who compare such filters and prefer this one.
 *
 * @param windowDays full width
 * @returns length n, in the unit of flux; 1 everywhere when no window has enough points; undefined when cancelled
 */
function fitBiweightTrend(input: TrendInput, windowDays: number, checkpoint: Checkpoint) {
  const total = input.time.length;
  const known = knownWindows(input);
  return fitByPieces(input, windowDays, async (piece) => {
    const nodes = nodesOf(piece.time, windowDays, total);
    const isAtPoints = nodes === piece.time;
    const values = await locate(piece, nodes, windowDays, isAtPoints ? known : undefined, checkpoint);
    if (values === undefined) return false;
    if (isAtPoints) piece.trend.set(values);
    else fillBetween(nodes, values, piece.time, piece.trend);
    return true;
  });
}

interface KnownWindows {
  readonly trend: Float64Array;
  /** How many points before each changed their weight, length n + 1. */
  readonly changesBefore: Int32Array;
}

/** A window without a changed point has the location that it had. */
function knownWindows({ hasWeight, before }: TrendInput): KnownWindows | undefined {
  if (before === undefined) return undefined;
  const changesBefore = new Int32Array(hasWeight.length + 1);
  for (let i = 0; i < hasWeight.length; i += 1)
    changesBefore[i + 1] = changesBefore[i]! + (hasWeight[i] === before.hasWeight[i] ? 0 : 1);
  return { trend: before.trend, changesBefore };
}

/** Times at which the trend of a piece is computed: the points themselves, or a lattice where that is much cheaper. */
function nodesOf(time: Float64Array, windowDays: number, total: number): Float64Array {
  const points = time.length;
  const length = time[points - 1]! - time[0]!;
  const perWindow = length > windowDays ? (points * windowDays) / length : points;
  const count = Math.ceil((length / windowDays) * NODES_PER_WINDOW) + 1;
  if (total * perWindow <= MOST_MEMBERS || count >= points) return time;
  return Float64Array.from({ length: count }, (_, i) => time[0]! + (length * i) / (count - 1));
}

async function locate(
  { first: start, time, memberTime, memberFlux }: PiecePoints,
  nodes: Float64Array,
  windowDays: number,
  known: KnownWindows | undefined,
  checkpoint: Checkpoint,
): Promise<Float64Array | undefined> {
  const { first, end } = windowsAround(memberTime, nodes, windowDays);
  const all = known && windowsAround(time, nodes, windowDays);
  const values = new Float64Array(memberTime.length);
  const scratch = new Float64Array(memberTime.length);
  const located = new Float64Array(nodes.length).fill(Number.NaN);
  for (let i = 0; i < nodes.length; i += 1) {
    const count = end[i]! - first[i]!;
    if (count < LEAST_MEMBERS) continue;
    if (all !== undefined && known !== undefined) {
      const { changesBefore, trend } = known;
      if (changesBefore[start + all.end[i]!] === changesBefore[start + all.first[i]!]) {
        located[i] = trend[start + i]!;
        continue;
      }
    }
    for (let k = 0; k < count; k += 1) values[k] = memberFlux[first[i]! + k]!;
    located[i] = iterateBiweight(values, scratch, count, CUT);
    if (checkpoint.isDue() && !(await checkpoint.pause(i, nodes.length))) return undefined;
  }
  return located;
}

/** Linear interpolation from the nodes that have a value; NaN where there is no pair around a time. */
function fillBetween(nodes: Float64Array, values: Float64Array, time: Float64Array, trend: Float64Array): void {
  let node = 0;
  for (let i = 0; i < time.length; i += 1) {
    while (node < nodes.length - 2 && nodes[node + 1]! < time[i]!) node += 1;
    const part = (time[i]! - nodes[node]!) / (nodes[node + 1]! - nodes[node]!);
    trend[i] = values[node]! + part * (values[node + 1]! - values[node]!);
  }
}
