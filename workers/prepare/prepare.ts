import { cancelled, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { PreparedSeries, PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { FluxColumn } from '../../src/core/light-curve.ts';
import { median } from '../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { assembleSeries, LEAST_POINTS } from './assemble-series.ts';
import { chooseColumn } from './choose-column.ts';
import { findDrops } from './find-drops.ts';
import { type FlaresFound, findFlares } from './find-flares.ts';
import { findUnitProblem, isInSigma, normaliserOf } from './normalise.ts';
import { protectPoints } from './protect-points.ts';
import { applyTrend, joinTrends, removeTrend, type Trended } from './remove-trend.ts';
import { type Dropped, type Selection, selectPoints } from './select-points.ts';
import { indicesWhere, pick, pickPoints, type SeriesPoints, segmentsAmong } from './series-points.ts';
import { findSystematics } from './systematics.ts';
import type { Systematics } from './systematics-input.ts';
import { findWindowProblem } from './window-limits.ts';

/**
 * Carries out a recipe: chooses the column; leaves out missing and flagged points, those at times of the instrument and
 * excluded ones; divides by the median; leaves flares out; splits at segments and sudden drops; takes out the recovery
 * from drops and what covariates and common modes explain; detrends and clips (see `removeTrend`); and gives every
 * point an error. A trend divides the flux, except where the unit is 'sigma': there it is subtracted
 * (flux = 1 + raw - trend), so that a depth keeps its number. What was explained is part of the series' trend.
 */
export async function prepareSeries(job: PrepareJob, checkpoint: Checkpoint): Promise<Outcome<PreparedSeries>> {
  const chosen = chooseColumn(job.lightCurve, job.recipe.fluxColumn);
  if (chosen.kind !== 'done') return chosen;
  const column = chosen.value;
  const selection = selectPoints(job.lightCurve, column.flux, job.recipe.qualityMask, job);
  const flux = pick(column.flux, selection.kept);
  const medianFlux = median(flux);
  const problem = findShortage(selection, column.name) ?? findUnitProblem(column, medianFlux);
  if (problem !== undefined) return failed(problem);
  const normalise = normaliserOf(column.unit);
  const all = pointsOf(
    job,
    selection.kept,
    normalise(flux, column.error && pick(column.error, selection.kept), medianFlux),
  );
  const tooNarrow = findWindowProblem(job, cadenceOf(all.time));
  if (tooNarrow !== undefined) return failed(tooNarrow);

  const found = await leaveFlaresOut(job, all);
  if (typeof found === 'string') return failed(found);
  const cleaned = await clean(job, found.points, column, checkpoint);
  if (cleaned === undefined) return cancelled;
  if (typeof cleaned === 'string') return failed(cleaned);
  return assembleSeries(job, {
    column,
    points: found.points,
    ...cleaned,
    flares: found.flares,
    dropped: [...selection.dropped, ...found.dropped],
    missing: selection.missing,
    warnings: [...found.warnings, ...cleaned.warnings],
    rawAt: (index) => normalise(Float64Array.of(column.flux[index]!), undefined, medianFlux).raw[0]!,
  });
}

const cadenceOf = (time: Float64Array): number =>
  time.length > 1 ? median(time.subarray(1).map((value, i) => value - time[i]!)) : 0;

function pointsOf(
  { lightCurve, protectedEvents, protectedIntervals }: PrepareJob,
  sourceIndex: Int32Array,
  relative: Pick<SeriesPoints, 'raw' | 'error'>,
): SeriesPoints {
  const time = pick(lightCurve.time, sourceIndex);
  const isProtected = protectPoints(time, protectedEvents, protectedIntervals);
  return { time, raw: relative.raw, error: relative.error, sourceIndex, isProtected };
}

interface WithoutFlares extends Pick<FlaresFound, 'flares' | 'warnings'> {
  readonly points: SeriesPoints;
  readonly dropped: readonly Dropped[];
}

async function leaveFlaresOut(
  { lightCurve, recipe }: PrepareJob,
  points: SeriesPoints,
): Promise<WithoutFlares | string> {
  if (!recipe.maskFlares) return { points, dropped: [], flares: [], warnings: [] };
  const { time, raw, isProtected, sourceIndex } = points;
  const segments = segmentsAmong(lightCurve.segmentStarts, sourceIndex);
  const { flares, isFlare, warnings } = await findFlares(time, raw, isProtected, segments);
  const quiet = pickPoints(points, indicesWhere(isFlare, 0));
  if (quiet.time.length < LEAST_POINTS)
    return `Flares leave only ${quiet.time.length} points: prepare with flares kept.`;
  const dropped = Array.from(indicesWhere(isFlare, 1), (i) => ({ index: sourceIndex[i]!, reason: 'flare' as const }));
  return { points: quiet, dropped, flares, warnings };
}

interface Cleaned extends Pick<Systematics, 'warnings'> {
  readonly trended: Trended;
  readonly drops: readonly number[];
  readonly splits: readonly number[];
}

/** Splits, what is explained, and the trend of the rest; the last two are joined into one trend of the raw flux. */
async function clean(
  job: PrepareJob,
  points: SeriesPoints,
  { unit }: FluxColumn,
  checkpoint: Checkpoint,
): Promise<Cleaned | string | undefined> {
  const { recipe, protectedEvents } = job;
  const { time, raw, isProtected } = points;
  const isSubtracted = isInSigma(unit);
  const segments = segmentsAmong(job.lightCurve.segmentStarts, points.sourceIndex);
  const drops = recipe.splitAtDrops ? findDrops(time, raw, isProtected, segments) : [];
  const splits = [...segments, ...drops].sort((a, b) => a - b);
  const systematics = findSystematics(job, { points, drops, splits, isSubtracted });
  if (typeof systematics === 'string') return systematics;
  const { explained, warnings } = systematics;
  const rest = explained === undefined ? raw : applyTrend(raw, explained, isSubtracted);
  const { detrend, clip } = recipe;
  const trended = await removeTrend(
    { time, raw: rest, splits, protectedEvents, detrend, clip, isProtected, isSubtracted },
    checkpoint,
  );
  if (trended === undefined || typeof trended === 'string') return trended;
  const trend = explained === undefined ? trended.trend : joinTrends(trended.trend, explained, isSubtracted);
  return { trended: { ...trended, trend }, drops, splits, warnings };
}

function findShortage({ kept, dropped, missing }: Selection, column: string): string | undefined {
  if (kept.length >= LEAST_POINTS) return undefined;
  const count = (reason: Dropped['reason']): number => dropped.filter((point) => point.reason === reason).length;
  const instrument = count('instrument');
  const atInstrument = instrument > 0 ? `, ${instrument} lie at times of the instrument` : '';
  return `Only ${kept.length} points of "${column}" are left: ${missing} have no flux, ${count('flagged')} are flagged by the quality mask, ${count('excluded')} lie in excluded spans${atInstrument}. At least ${LEAST_POINTS} are needed.`;
}
