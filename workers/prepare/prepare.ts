import { cancelled, done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { PreparedSeries, PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { FluxColumn } from '../../src/core/light-curve.ts';
import { median, robustSigma } from '../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { chooseColumn } from './choose-column.ts';
import { chooseErrors } from './choose-errors.ts';
import { findUnitProblem, isInSigma, normaliserOf } from './normalise.ts';
import { protectPoints } from './protect-points.ts';
import { removeTrend, type Trended } from './remove-trend.ts';
import { reasonCode, type Selection, selectPoints } from './select-points.ts';

const LEAST_POINTS = 3;
/** A window must hold more than noise: this many cadences. */
const LEAST_CADENCES = 3;

/**
 * Carries out a recipe: chooses the column, leaves out missing, flagged and excluded points, divides by the median,
 * detrends and clips (see `removeTrend`), and gives every point an error. A trend divides the flux, except where the
 * unit is 'sigma': there it is subtracted (flux = 1 + raw - trend), so that a depth keeps its number.
 */
export async function prepareSeries(job: PrepareJob, checkpoint: Checkpoint): Promise<Outcome<PreparedSeries>> {
  const { lightCurve, recipe } = job;
  const chosen = chooseColumn(lightCurve, recipe.fluxColumn);
  if (chosen.kind !== 'done') return chosen;
  const column = chosen.value;
  const selection = selectPoints(lightCurve, column.flux, recipe.qualityMask, job.excluded);
  const time = pick(lightCurve.time, selection.kept);
  const flux = pick(column.flux, selection.kept);
  const medianFlux = median(flux);
  const cadenceDays = time.length > 1 ? median(time.subarray(1).map((value, i) => value - time[i]!)) : 0;
  const problem =
    findShortage(selection, column.name) ?? findUnitProblem(column, medianFlux) ?? findWindowProblem(job, cadenceDays);
  if (problem !== undefined) return failed(problem);
  const normalise = normaliserOf(column.unit);
  const relative = normalise(flux, column.error && pick(column.error, selection.kept), medianFlux);
  const trended = await removeTrend(
    {
      time,
      raw: relative.raw,
      detrend: recipe.detrend,
      clip: recipe.clip,
      isProtected: protectPoints(time, job.protectedEvents, job.protectedIntervals),
      isSubtracted: isInSigma(column.unit),
    },
    checkpoint,
  );
  if (trended === undefined) return cancelled;
  if (typeof trended === 'string') return failed(trended);
  const droppedRaw = (index: number): number =>
    normalise(Float64Array.of(column.flux[index]!), undefined, medianFlux).raw[0]!;
  return assemble(job, column, selection, { time, raw: relative.raw, error: relative.error, trended, droppedRaw });
}

interface Worked {
  readonly time: Float64Array;
  readonly raw: Float64Array;
  readonly error: Float64Array | undefined;
  readonly trended: Trended;
  readonly droppedRaw: (index: number) => number;
}

function assemble(
  job: PrepareJob,
  column: FluxColumn,
  selection: Selection,
  { time: allTime, raw: allRaw, error: allError, trended, droppedRaw }: Worked,
): Outcome<PreparedSeries> {
  const kept = Int32Array.from(trended.kept.keys()).filter((i) => trended.kept[i] === 1);
  if (kept.length < LEAST_POINTS) return failed(`Clipping left ${kept.length} points of "${column.name}".`);
  const trend = pick(trended.trend, kept);
  const isDivided = !isInSigma(column.unit);
  const flux = pick(trended.flux, kept);
  const given = allError && pick(allError, kept).map((sigma, i) => (isDivided ? sigma / trend[i]! : sigma));
  const errors = chooseErrors(flux, given, column.name);
  const time = pick(allTime, kept);
  return done({
    key: job.key,
    time,
    raw: pick(allRaw, kept),
    trend,
    flux,
    error: errors.error,
    errorOrigin: errors.origin,
    sourceIndex: kept.map((i) => selection.kept[i]!),
    dropped: joinDropped(job, selection, trended.kept, droppedRaw),
    missing: selection.missing,
    scatter: robustSigma(flux),
    cadenceDays: median(time.subarray(1).map((value, i) => value - time[i]!)),
    spanDays: time.at(-1)! - time[0]!,
    fluxColumn: column.name,
    fluxUnit: column.unit,
    warnings: [...warnOfUnit(column), ...errors.warnings],
  });
}

function joinDropped(
  { lightCurve }: PrepareJob,
  selection: Selection,
  kept: Uint8Array,
  droppedRaw: (index: number) => number,
): PreparedSeries['dropped'] {
  const clipped = [...selection.kept]
    .filter((_, i) => kept[i] === 0)
    .map((index) => ({ index, reason: 'clipped' as const }));
  const all = [...selection.dropped, ...clipped].sort((a, b) => a.index - b.index);
  return {
    time: Float64Array.from(all, ({ index }) => lightCurve.time[index]!),
    raw: Float64Array.from(all, ({ index }) => droppedRaw(index)),
    reason: Uint8Array.from(all, ({ reason }) => reasonCode(reason)),
  };
}

function pick(values: Float64Array, indices: Int32Array): Float64Array {
  return Float64Array.from(indices, (index) => values[index]!);
}

function findShortage({ kept, dropped, missing }: Selection, column: string): string | undefined {
  if (kept.length >= LEAST_POINTS) return undefined;
  const flagged = dropped.filter(({ reason }) => reason === 'flagged').length;
  const excluded = dropped.length - flagged;
  return `Only ${kept.length} points of "${column}" are left: ${missing} have no flux, ${flagged} are flagged by the quality mask, ${excluded} lie in excluded spans. At least ${LEAST_POINTS} are needed.`;
}

function findWindowProblem({ recipe }: PrepareJob, cadenceDays: number): string | undefined {
  if (recipe.detrend.kind === 'none') return undefined;
  const { windowDays } = recipe.detrend;
  if (windowDays >= LEAST_CADENCES * cadenceDays && windowDays > 0) return undefined;
  return `The detrending window of ${windowDays} d is shorter than ${LEAST_CADENCES} cadences (${Number((LEAST_CADENCES * cadenceDays).toPrecision(3))} d).`;
}

function warnOfUnit({ name, unit }: FluxColumn): readonly string[] {
  if (unit === 'sigma')
    return [`"${name}" is in multiples of its scatter: depths are in sigma, and radii cannot be derived from them.`];
  if (unit === 'unknown') return [`The unit of "${name}" is not known: it was taken as proportional to flux.`];
  return [];
}
