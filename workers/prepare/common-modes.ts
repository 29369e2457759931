import { done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { CommonModes, CommonModesJob, ModeStar } from '../../src/contract/prepare-contract.ts';
import { phaseOf } from '../../src/core/ephemeris.ts';
import { median, pointToPointScatter, robustSigma } from '../../src/core/robust-statistics.ts';

const FEWEST_STARS = 8;
/** A star that varies this many times more than the typical one between neighbours is not quiet. */
const LOUDEST = 3;
/** Its whole scatter over the typical star's: beyond it the star's own variation rules. */
const LARGEST_VARIATION = 3;
/** A star must have a value at this part of the lattice's times. */
const LEAST_COVERAGE = 0.6;
const POWER_ROUNDS = 60;
const MASK_HALF_WIDTH = 0.75;

/**
 * What the quiet stars of a docket do together: the strongest principal components of their fluxes, each star about
 * its mean and over its own scatter, on a lattice of their typical cadence. A star's own events are masked, so that no
 * planet becomes a mode. Missing values count as the star's mean.
 * Principal components by power iteration with deflation (Golub & Van Loan 2013, Matrix Computations, section 8.2).
 */
export function findCommonModes({ key, stars, modeCount }: Omit<CommonModesJob, 'jobId'>): Outcome<CommonModes> {
  const usable = stars.filter(({ time }) => time.length > 20);
  if (usable.length < FEWEST_STARS) return tooFew(usable.length);
  const lattice = latticeOf(usable);
  const rows = pickQuiet(usable)
    .map((star) => onLattice(star, lattice))
    .filter((row) => row !== undefined);
  if (rows.length < FEWEST_STARS) return tooFew(rows.length);
  const total = rows.reduce((sum, row) => sum + dot(row, row), 0);
  const modes: Float64Array[] = [];
  const explained: number[] = [];
  for (let mode = 0; mode < modeCount; mode += 1) {
    const { direction, variance } = strongest(rows);
    if (!(variance > 0)) break;
    for (const row of rows) subtract(row, direction, dot(row, direction));
    modes.push(scaled(direction));
    explained.push(variance / total);
  }
  return done({ key, time: lattice.time, modes, explained, starsUsed: rows.length });
}

const tooFew = (found: number) =>
  failed(`Common modes need at least ${FEWEST_STARS} quiet stars with common times; this docket has ${found}.`);

interface Lattice {
  readonly time: Float64Array;
  readonly start: number;
  readonly step: number;
}

function latticeOf(stars: readonly ModeStar[]): Lattice {
  const cadences = stars.map(({ time }) => median(time.subarray(1).map((value, i) => value - time[i]!)));
  const step = median(cadences);
  const start = Math.min(...stars.map(({ time }) => time[0]!));
  const end = Math.max(...stars.map(({ time }) => time.at(-1)!));
  const time = Float64Array.from({ length: Math.floor((end - start) / step) + 1 }, (_, i) => start + i * step);
  return { time, start, step };
}

function pickQuiet(stars: readonly ModeStar[]): ModeStar[] {
  const between = stars.map(({ flux }) => pointToPointScatter(flux));
  const typical = median(Float64Array.from(between));
  const whole = stars.map(({ flux }) => robustSigma(flux));
  const typicalWhole = median(Float64Array.from(whole));
  return stars.filter((_, i) => between[i]! <= LOUDEST * typical && whole[i]! <= LARGEST_VARIATION * typicalWhole);
}

/** A star on the lattice, mean 0 and scatter 1; undefined where it has too few of the times. */
function onLattice({ time, flux, masked }: ModeStar, { time: grid, start, step }: Lattice): Float64Array | undefined {
  const sums = new Float64Array(grid.length);
  const counts = new Int32Array(grid.length);
  for (let i = 0; i < time.length; i += 1) {
    if (
      masked.some(
        (event) =>
          Math.abs(phaseOf(time[i]!, event.periodDays, event.epochDays)) * event.periodDays <
          MASK_HALF_WIDTH * event.durationDays,
      )
    )
      continue;
    const cell = Math.round((time[i]! - start) / step);
    sums[cell]! += flux[i]!;
    counts[cell]! += 1;
  }
  const filled = [...counts.keys()].filter((cell) => counts[cell]! > 0);
  if (filled.length < LEAST_COVERAGE * grid.length) return undefined;
  const values = Float64Array.from(filled, (cell) => sums[cell]! / counts[cell]!);
  const centre = median(values);
  const scatter = robustSigma(values);
  if (!(scatter > 0)) return undefined;
  const row = new Float64Array(grid.length);
  // What stands out by more than five sigma is that star's own affair.
  for (const [place, cell] of filled.entries())
    row[cell] = Math.max(-5, Math.min(5, (values[place]! - centre) / scatter));
  return row;
}

function strongest(rows: readonly Float64Array[]): { direction: Float64Array; variance: number } {
  let direction = rows.reduce((best, row) => (dot(row, row) > dot(best, best) ? row : best)).slice();
  normalise(direction);
  let variance = 0;
  for (let round = 0; round < POWER_ROUNDS; round += 1) {
    const next = new Float64Array(direction.length);
    for (const row of rows) subtract(next, row, -dot(row, direction));
    variance = Math.sqrt(dot(next, next));
    if (!(variance > 1e-9)) return { direction, variance: 0 };
    normalise(next);
    direction = next;
  }
  return { direction, variance };
}

const dot = (a: Float64Array, b: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += a[i]! * b[i]!;
  return sum;
};

function subtract(from: Float64Array, what: Float64Array, factor: number): void {
  for (let i = 0; i < from.length; i += 1) from[i] = from[i]! - factor * what[i]!;
}

function normalise(vector: Float64Array): void {
  const length = Math.sqrt(dot(vector, vector));
  if (length > 0) for (let i = 0; i < vector.length; i += 1) vector[i] = vector[i]! / length;
}

function scaled(direction: Float64Array): Float64Array {
  const scatter = Math.sqrt(dot(direction, direction) / direction.length);
  return direction.map((value) => value / scatter);
}

/** A mode at other times, linear between the lattice's; NaN outside it. */
export function modeAt(
  { time: grid }: Pick<CommonModes, 'time'>,
  mode: Float64Array,
  time: Float64Array,
): Float64Array {
  const step = grid.length > 1 ? grid[1]! - grid[0]! : 1;
  return time.map((value) => {
    const place = (value - grid[0]!) / step;
    const cell = Math.min(grid.length - 2, Math.floor(place));
    if (place < -0.5 || place > grid.length - 0.5 || cell < 0) return Number.NaN;
    return mode[cell]! + (place - cell) * (mode[cell + 1]! - mode[cell]!);
  });
}
