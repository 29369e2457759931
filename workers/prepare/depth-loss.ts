import { cancelled, done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { DepthLoss, DepthLossJob, PreparedSeries } from '../../src/contract/prepare-contract.ts';
import { type Ephemeris, phaseOf } from '../../src/core/ephemeris.ts';
import { measureBox } from '../../src/core/measure-box.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { chooseColumn } from './choose-column.ts';
import { injectDips } from './inject-dips.ts';
import { prepareSeries } from './prepare.ts';

const INJECTIONS = 8;
const FEWEST_INJECTIONS = 6;
/** Middles of injected and of real events are at least so many durations apart. */
const LEAST_DISTANCE = 1.5;
/** Phases tried in one cycle: enough to find events of a long period inside the data. */
const MOST_TRIALS = 2000;
/** An injection counts with so many points of what the real events have. */
const LEAST_POINTS_PART = 0.5;
const LEAST_POINTS = 3;

/**
 * What a recipe leaves of a dip: boxes of the same period, duration and depth are put into the flux as it was read, at
 * other phases, and the flux is prepared again; where the recipe protects events, the injected ones are protected as
 * the real ones are. Kept is the box depth with the boxes less that without them at the same place, over what was put
 * in, so that noise and other dips cancel; the error is that of the mean over the phases. The depth loss of detrenders
 * is measured so by Hippke et al. (2019), AJ 158, 143.
 */
export async function measureDepthLoss(job: DepthLossJob, checkpoint: Checkpoint): Promise<Outcome<DepthLoss>> {
  const problem = findProblem(job);
  if (problem !== undefined) return failed(problem);
  const column = chooseColumn(job.lightCurve, job.recipe.fluxColumn);
  if (column.kind !== 'done') return column;
  const plain = await prepareSeries({ ...job, protectedEvents: protectedWith(job) }, checkpoint);
  if (plain.kind !== 'done') return plain;
  const places = choosePlaces(job.ephemeris, plain.value.time);
  const kept: number[] = [];
  for (const injected of places) {
    const lightCurve = injectDips(job.lightCurve, column.value, injected, job.depth);
    const prepared = await prepareSeries(
      { ...job, lightCurve, protectedEvents: protectedWith(job, injected) },
      checkpoint,
    );
    if (prepared.kind === 'cancelled') return cancelled;
    const part = prepared.kind === 'done' ? partKept(prepared.value, plain.value, injected, job) : undefined;
    if (part !== undefined) kept.push(part);
  }
  if (kept.length < FEWEST_INJECTIONS)
    return failed(
      `Only ${kept.length} other phases can take such a dip, ${FEWEST_INJECTIONS} are needed: the events fill too much of their cycle, or the data cover too little of it.`,
    );
  const mean = kept.reduce((sum, part) => sum + part, 0) / kept.length;
  const variance = kept.reduce((sum, part) => sum + (part - mean) ** 2, 0) / (kept.length - 1);
  const keptFractionError = Math.sqrt(variance / kept.length);
  return done({ key: job.key, keptFraction: mean, keptFractionError, injections: kept.length });
}

function findProblem({ ephemeris, depth }: DepthLossJob): string | undefined {
  const { periodDays, durationDays } = ephemeris;
  if (!(depth > 0)) return 'The loss of depth can only be measured of a dip: its depth must be above 0.';
  if (!(periodDays > 0) || !(durationDays > 0)) return 'The period and the duration of the event must be above 0.';
  return undefined;
}

const protectedWith = ({ recipe, ephemeris }: DepthLossJob, ...others: readonly Ephemeris[]): readonly Ephemeris[] =>
  recipe.protectCases ? [ephemeris, ...others] : [];

/** Evenly picked from the phases at which an event is seen about as well as the real ones are. */
function choosePlaces(ephemeris: Ephemeris, time: Float64Array): Ephemeris[] {
  const { periodDays, epochDays, durationDays } = ephemeris;
  const trials = Math.min(MOST_TRIALS, Math.max(4 * INJECTIONS, Math.floor((2 * periodDays) / durationDays)));
  const least = Math.max(LEAST_POINTS, LEAST_POINTS_PART * countInside(time, ephemeris));
  const seen = Array.from({ length: trials }, (_, i) => (i + 0.5) / trials)
    .filter((phase) => Math.min(phase, 1 - phase) * periodDays >= LEAST_DISTANCE * durationDays)
    .map((phase) => ({ ...ephemeris, epochDays: epochDays + phase * periodDays }))
    .filter((place) => countInside(time, place) >= least);
  const count = Math.min(INJECTIONS, seen.length);
  return Array.from({ length: count }, (_, i) => seen[Math.floor(((i + 0.5) * seen.length) / count)]!);
}

function countInside(time: Float64Array, ephemeris: Ephemeris): number {
  let count = 0;
  for (let i = 0; i < time.length; i += 1) if (isInside(time[i]!, ephemeris)) count += 1;
  return count;
}

const isInside = (time: number, { periodDays, epochDays, durationDays }: Ephemeris): boolean =>
  Math.abs(phaseOf(time, periodDays, epochDays)) * periodDays <= durationDays / 2;

function partKept(
  withDips: PreparedSeries,
  plain: PreparedSeries,
  injected: Ephemeris,
  { ephemeris, depth }: DepthLossJob,
): number | undefined {
  const after = depthOutside(withDips, injected, ephemeris);
  const before = depthOutside(plain, injected, ephemeris);
  return after === undefined || before === undefined ? undefined : (after - before) / depth;
}

/** Box depth of the injected events, the real ones left out of what is around them. */
function depthOutside({ time, flux, error }: PreparedSeries, injected: Ephemeris, real: Ephemeris) {
  const rest = Int32Array.from(time.keys()).filter((i) => !isInside(time[i]!, real));
  const pickRest = (values: Float64Array): Float64Array => Float64Array.from(rest, (i) => values[i]!);
  return measureBox(pickRest(time), pickRest(flux), pickRest(error), injected)?.depth;
}
