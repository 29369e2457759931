import { cancelled, done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { CommonModes, CommonModesJob } from '../../src/contract/prepare-contract.ts';
import { median } from '../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { latticeOf, type ModeRow, rowOf } from './mode-lattice.ts';
import { findPrincipalModes } from './principal-modes.ts';
import { pickQuietRows, withoutRulers } from './quiet-rows.ts';

const FEWEST_STARS = 8;
const FEWEST_POINTS = 20;

/**
 * What the quiet stars of a docket do together: principal components of their fluxes on a lattice of their median
 * cadence, each star about its median and over its own scatter, so that no bright one rules. A star's own events are
 * masked and interpolated, so that no planet becomes a mode; stars that vary by themselves are left out. The method is
 * that of SVD-based cotrending (common practice); the thresholds are ours.
 */
export async function findCommonModes(
  { key, stars, modeCount }: Omit<CommonModesJob, 'jobId'>,
  checkpoint: Checkpoint,
): Promise<Outcome<CommonModes>> {
  const usable = stars.filter(({ time }) => time.length >= FEWEST_POINTS);
  if (usable.length < FEWEST_STARS) return tooFew(usable.length, stars.length);
  const lattice = latticeOf(usable);
  const rows: ModeRow[] = [];
  for (const [i, star] of usable.entries()) {
    const row = rowOf(star, lattice);
    if (row !== undefined) rows.push(row);
    if (checkpoint.isDue() && !(await checkpoint.pause(i, 2 * usable.length))) return cancelled;
  }
  let quiet = pickQuietRows(rows, lattice.stepDays);
  for (;;) {
    if (quiet.length < FEWEST_STARS) return tooFew(quiet.length, stars.length);
    const found = await findPrincipalModes(
      quiet.map(({ values }) => values),
      modeCount,
      checkpoint,
    );
    if (found === undefined) return cancelled;
    const rest = withoutRulers(quiet, found.loadings);
    if (rest.length === quiet.length) {
      const { modes, explained } = found;
      return done({ key, time: lattice.time, modes, explained, starsUsed: quiet.length });
    }
    quiet = rest;
  }
}

const tooFew = (found: number, all: number) =>
  failed(
    `Common modes need at least ${FEWEST_STARS} quiet stars with common times; of this docket's ${all}, ${found} are: stars without data at most of the times, louder than most or ruled by their own variation do not count.`,
  );

/** Further from a cell of the lattice than so many cells, nothing is known. */
const REACH_CELLS = 0.75;
/** Cells further apart are not interpolated between. */
const LONGEST_STEP_CELLS = 3;

/** A mode at other times (ascending), linear between the lattice's; NaN where none of its times is near. */
export function modeAt(
  { time: grid }: Pick<CommonModes, 'time'>,
  mode: Float64Array,
  time: Float64Array,
): Float64Array {
  const values = new Float64Array(time.length).fill(Number.NaN);
  const step = grid.length > 1 ? median(grid.subarray(1).map((value, i) => value - grid[i]!)) : 0;
  let next = 0;
  for (let i = 0; i < time.length; i += 1) {
    while (next < grid.length && grid[next]! < time[i]!) next += 1;
    const [before, after] = [time[i]! - (grid[next - 1] ?? Number.NaN), (grid[next] ?? Number.NaN) - time[i]!];
    if (before + after <= LONGEST_STEP_CELLS * step)
      values[i] = mode[next - 1]! + (before / (before + after)) * (mode[next]! - mode[next - 1]!);
    else if (after <= REACH_CELLS * step) values[i] = mode[next]!;
    else if (before <= REACH_CELLS * step) values[i] = mode[next - 1]!;
  }
  return values;
}
