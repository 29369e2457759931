import type { BoxWork, TrialBox } from '../box-search.ts';
import { type BinnedSeries, binInTime } from './bin-in-time.ts';
import type { BlockKernel } from './block-kernel.ts';
import type { TrialBlock } from './plan-blocks.ts';

/** Points are merged in time where a phase bin has this many such bins, and there is something to merge. */
const TIME_BINS_PER_BIN = 2;
/** Values of 4 bytes that the kernel keeps of a profile, and returns of a trial. */
const HEAD_VALUES = 3;
const FOUND_VALUES = 5;
/** Below this a dip is rounding error of Float32 sums. */
const LEAST_SIGNAL_TO_NOISE = 1e-3;

/** A series in the kernel's memory, ready for blocks of trials. */
export interface BlockSearch {
  /** Searches the trials of a block; `take` is called for each in turn with a box that is written over after. */
  search(block: TrialBlock, periods: Float64Array, take: (trial: number, best: TrialBox) => void): void;
}

/** Loaded once for each width at which its points are merged. */
interface Loaded {
  readonly widthDays: number;
  readonly series: BinnedSeries;
  readonly time: number;
  readonly weight: number;
  readonly weighted: number;
}

export function makeBlockSearch(kernel: BlockKernel, work: BoxWork, durations: Float64Array): BlockSearch {
  const base = kernel.allocate(0);
  const scatter = scatterOf(work);
  const leastWeight = work.leastWeight / work.totalWeight;
  const best: TrialBox = { signalToNoise: 0, depth: 0, durationDays: 0, epochDays: 0 };
  let loaded: Loaded | undefined;

  /** Weights that add up to one, and flux of unit scatter, suit Float32. */
  function load(widthDays: number): Loaded {
    if (loaded?.widthDays === widthDays) return loaded;
    kernel.release(base);
    const { elapsed, weight, weighted } = work;
    const series = binInTime(elapsed, weight, weighted, widthDays);
    const n = series.time.length;
    const time = kernel.allocate(8 * n);
    const weightAt = kernel.allocate(4 * n);
    const weightedAt = kernel.allocate(4 * n);
    const { buffer } = kernel.memory;
    new Float64Array(buffer, time, n).set(series.time);
    const weights = new Float32Array(buffer, weightAt, n);
    const sums = new Float32Array(buffer, weightedAt, n);
    for (let i = 0; i < n; i += 1) {
      weights[i] = series.weight[i]! / work.totalWeight;
      sums[i] = series.weighted[i]! / (work.totalWeight * scatter);
    }
    loaded = { widthDays, series, time, weight: weightAt, weighted: weightedAt };
    return loaded;
  }

  return {
    search(block, periods, take) {
      const { bins, first, end, firstDuration, lastDuration } = block;
      best.signalToNoise = best.depth = best.durationDays = best.epochDays = 0;
      if (lastDuration < firstDuration || !(scatter > 0)) {
        for (let trial = first; trial < end; trial += 1) take(trial, best);
        return;
      }
      const { series, time, weight, weighted } = load(mergeWidth(durations[firstDuration]!, block.binsPerBox));
      const free = kernel.allocate(0);
      const middlePeriod = periods[(first + end - 1) >> 1]!;
      const widthOf = (days: number): number => Math.max(1, Math.round((days / middlePeriod) * bins));
      const segments = cutSegments(series.time, block.segmentDays);
      const room = makeRoom(kernel, {
        trials: end - first,
        segments: segments.length - 1,
        widths: lastDuration - firstDuration + 1,
        bins,
        longest: widthOf(durations[lastDuration]!),
        cycles: block.segmentDays / middlePeriod,
      });
      const { buffer } = kernel.memory;
      writeSegments(buffer, room, segments, series.time);
      const shifts = new Float64Array(buffer, room.shifts, room.trials);
      for (let i = 0; i < room.trials; i += 1) shifts[i] = 1 / periods[first + i]! - 1 / middlePeriod;
      const widths = new Int32Array(buffer, room.widthsAt, room.widths);
      for (let d = 0; d < room.widths; d += 1) widths[d] = widthOf(durations[firstDuration + d]!);
      kernel.searchBlock(
        time,
        weight,
        weighted,
        room.heads,
        room.middles,
        room.segments,
        room.profiles,
        room.stride,
        1 / middlePeriod,
        bins,
        room.longest,
        room.widthsAt,
        room.widths,
        block.binsPerBox,
        leastWeight,
        room.places,
        room.sums,
        room.running,
        room.thin,
        room.shifts,
        room.trials,
        room.found,
      );
      const places = new Int32Array(buffer, room.found, FOUND_VALUES * room.trials);
      const values = new Float32Array(buffer, room.found, FOUND_VALUES * room.trials);
      for (let i = 0; i < room.trials; i += 1) {
        const at = FOUND_VALUES * i;
        describeBest(places[at + 1]!, places[at + 2]!, values[at + 3]!, values[at + 4]!, bins, periods[first + i]!);
        take(first + i, best);
      }
      kernel.release(free);
    },
  };

  /** @param r weight inside, of a total of one; @param s weighted flux inside, in units of the scatter */
  function describeBest(start: number, width: number, r: number, s: number, bins: number, periodDays: number): void {
    best.signalToNoise = best.depth = best.durationDays = best.epochDays = 0;
    if (width === 0) return;
    const depth = (-s * scatter) / (r * (1 - r));
    const signalToNoise = depth * Math.sqrt(r * (1 - r) * work.totalWeight);
    if (!(signalToNoise > LEAST_SIGNAL_TO_NOISE)) return;
    const middle = (start + width / 2) / bins;
    best.signalToNoise = signalToNoise;
    best.depth = depth;
    best.durationDays = (width / bins) * periodDays;
    best.epochDays = work.startDays + (middle - Math.floor(middle)) * periodDays;
  }
}

/** How much of everything a block needs. */
interface Size {
  readonly trials: number;
  readonly segments: number;
  readonly widths: number;
  readonly bins: number;
  readonly longest: number;
  /** Length of the longest segment, in cycles. */
  readonly cycles: number;
}

/** Where it is in the kernel's memory. */
type Room = Size & ReturnType<typeof layOut>;

const makeRoom = (kernel: BlockKernel, size: Size): Room => ({ ...size, ...layOut(kernel, size) });

function layOut(kernel: BlockKernel, { trials, segments, widths, bins, longest, cycles }: Size) {
  // Profiles of whole cycles stand there twice, and are read sixteen bins at a time.
  const profileBins = cycles > 0.9 ? 2 * bins + 24 : cycles * bins + 12;
  const stride = 16 * Math.ceil(profileBins / 4);
  const runningBytes = 8 * kernel.roomOf(bins, longest);
  return {
    stride,
    heads: kernel.allocate(4 * HEAD_VALUES * (segments + 1)),
    middles: kernel.allocate(8 * segments),
    profiles: kernel.allocate(2 * stride * segments),
    places: kernel.allocate(4 * segments),
    sums: kernel.allocate(8 * (2 * bins + 24)),
    running: kernel.allocate(runningBytes),
    thin: kernel.allocate(runningBytes),
    widthsAt: kernel.allocate(4 * widths),
    shifts: kernel.allocate(8 * trials),
    found: kernel.allocate(4 * FOUND_VALUES * trials),
  };
}

/** Widths come in powers of two, so that neighbouring blocks share one merged series. */
const mergeWidth = (shortestDays: number, binsPerBox: number): number =>
  2 ** Math.floor(Math.log2(shortestDays / (TIME_BINS_PER_BIN * binsPerBox)));

/** Weighted standard deviation of the mean-subtracted flux. */
function scatterOf({ weight, weighted, totalWeight }: BoxWork): number {
  let squares = 0;
  for (let i = 0; i < weight.length; i += 1) squares += weighted[i]! ** 2 / weight[i]!;
  return Math.sqrt(squares / totalWeight);
}

/** First points of spans no longer than `lengthDays`, each begun at its own first point so that gaps cost nothing. */
function cutSegments(time: Float64Array, lengthDays: number): number[] {
  const starts: number[] = [];
  for (let i = 0; i < time.length; i = firstAfter(time, time[i]! + lengthDays, i)) starts.push(i);
  starts.push(time.length);
  return starts;
}

/** First point later than `value`, from point `from` on. */
function firstAfter(time: Float64Array, value: number, from: number): number {
  let low = from + 1;
  let high = time.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (time[middle]! > value) high = middle;
    else low = middle + 1;
  }
  return low;
}

function writeSegments(buffer: ArrayBuffer, room: Room, starts: readonly number[], time: Float64Array): void {
  const heads = new Int32Array(buffer, room.heads, HEAD_VALUES * starts.length);
  const middles = new Float64Array(buffer, room.middles, room.segments);
  for (let k = 0; k < starts.length; k += 1) heads[HEAD_VALUES * k + 2] = starts[k]!;
  for (let k = 0; k < middles.length; k += 1) middles[k] = (time[starts[k]!]! + time[starts[k + 1]! - 1]!) / 2;
}
