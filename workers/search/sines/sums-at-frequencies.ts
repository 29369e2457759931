import { makeKaiserBessel, type SpreadingKernel } from './kaiser-bessel.ts';
import { planRealTransform, type RealTransform, readModes, transformReal, unitsOfTransform } from './real-transform.ts';
import type { Steps } from './steps.ts';

/** Asked of the window. One point alone may come out ten times worse; of many, the errors mostly cancel. */
const ACCURACY = 1e-10;
/** The grid has at least so many points a mode, counted on both sides of zero; a power of two gives up to twice it. */
const LEAST_OVERSAMPLING = 1.25;
const SMALLEST_GRID = 64;
/** With fewer points the plain sums are quicker. */
const MOST_DIRECT_POINTS = 50;
/** Points between two looks at the clock. */
const POINTS_PER_LOOK = 1 << 17;
/** Phasors are turned on from frequency to frequency so often before they are computed afresh. */
const TURNS = 64;

/** Real and imaginary parts of sum c_j exp(2 pi i k x_j) for k = 0..count. */
export interface FrequencySums {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** What sums at the same number of frequencies share. */
export interface SumsPlan {
  readonly count: number;
  readonly kernel: SpreadingKernel;
  /** One over the kernel's transform at k = 0..count. */
  readonly correction: Float64Array;
  readonly transform: RealTransform;
  readonly grid: Float64Array;
}

/** @param count highest k */
export function planSums(count: number): SumsPlan {
  const size = sizeOf(count);
  const kernel = makeKaiserBessel(size / (2 * count), ACCURACY);
  const correction = new Float64Array(count + 1);
  for (let k = 0; k <= count; k += 1) correction[k] = 1 / kernel.transformAt(k / size);
  return { count, kernel, correction, transform: planRealTransform(size), grid: new Float64Array(size) };
}

const sizeOf = (count: number): number =>
  Math.max(SMALLEST_GRID, 2 ** Math.ceil(Math.log2(LEAST_OVERSAMPLING * 2 * count)));

/** What one call of `sumAtFrequencies` yields in all, at most. */
export const unitsOfSums = (count: number): number => unitsOfTransform(sizeOf(count));

/**
 * Sums of weighted phasors at evenly spaced frequencies by a non-uniform FFT, to 2e-9 of the sum of |c| at worst, and
 * some 1e-11 with many points.
 * Source: Dutt & Rokhlin (1993), SIAM J. Sci. Comput. 14, 1368, with a Kaiser-Bessel window.
 *
 * @param cycles x_j, any real, length n; only their fractions count
 * @param values c_j, length n
 */
export function* sumAtFrequencies(
  { kernel, correction, transform, grid, count }: SumsPlan,
  cycles: Float64Array,
  values: Float64Array,
): Steps<FrequencySums> {
  if (cycles.length <= MOST_DIRECT_POINTS) return yield* sumDirectly(cycles, values, count);
  grid.fill(0);
  for (let start = 0; start < cycles.length; start += POINTS_PER_LOOK) {
    spread(
      cycles.subarray(start, start + POINTS_PER_LOOK),
      values.subarray(start, start + POINTS_PER_LOOK),
      kernel,
      grid,
    );
    yield 0;
  }
  const pairs = yield* transformReal(transform, grid);
  const sums = { real: new Float64Array(count + 1), imaginary: new Float64Array(count + 1) };
  readModes(transform, pairs, correction, sums.real, sums.imaginary);
  yield 0;
  return sums;
}

function spread(
  cycles: Float64Array,
  values: Float64Array,
  { width, cells, cubics }: SpreadingKernel,
  grid: Float64Array,
): void {
  const size = grid.length;
  const mask = size - 1;
  for (let j = 0; j < cycles.length; j += 1) {
    const start = (cycles[j]! - Math.floor(cycles[j]!)) * size - width / 2;
    const first = Math.ceil(start) | 0;
    const place = (first - start) * cells;
    const cell = Math.min(cells - 1, place | 0);
    const v = 2 * (place - cell) - 1;
    const value = values[j]!;
    const linear = value * v;
    const square = linear * v;
    const cube = square * v;
    let at = 4 * width * cell;
    for (let l = first; l < first + width; l += 1) {
      const low = value * cubics[at]! + linear * cubics[at + 1]!;
      const high = square * cubics[at + 2]! + cube * cubics[at + 3]!;
      grid[l & mask] = grid[l & mask]! + low + high;
      at += 4;
    }
  }
}

/** The same sums, plainly: n count steps, to about 1e-14 of the sum of |c|. */
export function* sumDirectly(cycles: Float64Array, values: Float64Array, count: number): Steps<FrequencySums> {
  const sums = { real: new Float64Array(count + 1), imaginary: new Float64Array(count + 1) };
  for (let first = 0; first <= count; first += TURNS) {
    const end = Math.min(count + 1, first + TURNS);
    for (let j = 0; j < cycles.length; j += 1) addPhasors(sums, cycles[j]!, values[j]!, first, end);
    yield TURNS;
  }
  return sums;
}

function addPhasors({ real, imaginary }: FrequencySums, cycle: number, value: number, first: number, end: number) {
  const turns = first * cycle;
  const angle = 2 * Math.PI * (turns - Math.round(turns));
  const cosine = Math.cos(2 * Math.PI * cycle);
  const sine = Math.sin(2 * Math.PI * cycle);
  let x = value * Math.cos(angle);
  let y = value * Math.sin(angle);
  for (let k = first; k < end; k += 1) {
    real[k] = real[k]! + x;
    imaginary[k] = imaginary[k]! + y;
    const turned = x * cosine - y * sine;
    y = x * sine + y * cosine;
    x = turned;
  }
}
