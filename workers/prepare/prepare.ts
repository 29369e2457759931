import { cancelled, done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { PreparedSeries, PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { FluxColumn } from '../../src/core/light-curve.ts';
import { median, robustSigma } from '../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { chooseColumn } from './choose-column.ts';
import { chooseErrors } from './choose-errors.ts';
import { type CleanSeries, cleanSeries } from './clean-series.ts';
import { scaleDaysOf } from './detrend/detrenders.ts';
import { piecesOf } from './detrend/pieces.ts';
import { findUnitProblem, isInSigma, normaliserOf, type RelativeFlux } from './normalise.ts';
import { protectPoints } from './protect-points.ts';
import { applyTrend, removeTrend, type Trended } from './remove-trend.ts';
import { reasonCode, type Selection, selectPoints } from './select-points.ts';

const LEAST_POINTS = 3;
/** A window must hold more than noise: this many cadences. */
const LEAST_CADENCES = 3;
const LEAST_DURATIONS = 3;

/**
 * Carries out a recipe: chooses the column, leaves out missing, flagged and excluded points and those at times of the
 * instrument, divides by the median, leaves flares out, splits at drops, takes out what covariates and common modes
 * explain, detrends and clips (see `removeTrend`), and gives every point an error. A trend divides the flux, except
 * where the unit is 'sigma': there it is subtracted (flux = 1 + raw - trend), so that a depth keeps its number.
 */
export async function prepareSeries(job: PrepareJob, checkpoint: Checkpoint): Promise<Outcome<PreparedSeries>> {
  const { lightCurve, recipe } = job;
  const chosen = chooseColumn(lightCurve, recipe.fluxColumn);
  if (chosen.kind !== 'done') return chosen;
  const column = chosen.value;
  const selection = selectPoints(lightCurve, column.flux, recipe.qualityMask, job);
  const time = pick(lightCurve.time, selection.kept);
  const flux = pick(column.flux, selection.kept);
  const medianFlux = median(flux);
  const cadenceDays = time.length > 1 ? median(time.subarray(1).map((value, i) => value - time[i]!)) : 0;
  const problem =
    findShortage(selection, column.name) ?? findUnitProblem(column, medianFlux) ?? findWindowProblem(job, cadenceDays);
  if (problem !== undefined) return failed(problem);
  const normalise = normaliserOf(column.unit);
  const relative = normalise(flux, column.error && pick(column.error, selection.kept), medianFlux);
  const isProtected = protectPoints(time, job.protectedEvents, job.protectedIntervals);
  const clean = cleanSeries(job, time, relative.raw, selection.kept, isProtected);
  if (typeof clean === 'string') return failed(clean);
  const worked = await detrendClean(job, { time, relative, clean, isProtected, unit: column.unit }, checkpoint);
  if (worked === undefined) return cancelled;
  if (typeof worked === 'string') return failed(worked);
  const droppedRaw = (index: number): number =>
    normalise(Float64Array.of(column.flux[index]!), undefined, medianFlux).raw[0]!;
  return assemble(job, column, selection, { time, ...relative, clean, trended: worked, droppedRaw });
}

interface Cleaned {
  readonly time: Float64Array;
  readonly relative: RelativeFlux;
  readonly clean: CleanSeries;
  readonly isProtected: Uint8Array;
  readonly unit: FluxColumn['unit'];
}

/** The trend of what is neither flare nor explained; both are joined again into one trend of the raw flux. */
async function detrendClean(
  { recipe, protectedEvents }: PrepareJob,
  { time, relative, clean, isProtected, unit }: Cleaned,
  checkpoint: Checkpoint,
): Promise<Trended | string | undefined> {
  const isSubtracted = isInSigma(unit);
  const explained = clean.explained?.map((value) => 1 + value);
  const raw = explained === undefined ? relative.raw : applyTrend(relative.raw, explained, isSubtracted);
  const quiet = Int32Array.from(time.keys()).filter((i) => clean.isFlare[i] === 0);
  const at = new Map(Array.from(quiet, (index, place) => [index, place]));
  const trended = await removeTrend(
    {
      time: pick(time, quiet),
      raw: pick(raw, quiet),
      splits: clean.splits.flatMap((split) => placeAfter(split, at, time.length)),
      protectedEvents,
      detrend: recipe.detrend,
      clip: recipe.clip,
      isProtected: Uint8Array.from(quiet, (i) => isProtected[i]!),
      isSubtracted,
    },
    checkpoint,
  );
  if (trended === undefined || typeof trended === 'string') return trended;
  const whole = spreadOut(trended, quiet, time.length);
  if (explained === undefined) return whole;
  const trend = whole.trend.map((value, i) => (isSubtracted ? value + explained[i]! - 1 : value * explained[i]!));
  return { ...whole, trend };
}

/** Where a split among all points lies among the quiet ones. */
function placeAfter(split: number, at: ReadonlyMap<number, number>, length: number): number[] {
  for (let i = split; i < length; i += 1) {
    const place = at.get(i);
    if (place !== undefined) return place > 0 ? [place] : [];
  }
  return [];
}

/** Back to all points: flares are not kept, and take the trend of the last quiet point. */
function spreadOut({ trend, flux, kept }: Trended, quiet: Int32Array, length: number): Trended {
  if (quiet.length === length) return { trend, flux, kept };
  const whole = {
    trend: new Float64Array(length).fill(1),
    flux: new Float64Array(length).fill(1),
    kept: new Uint8Array(length),
  };
  let last = 0;
  for (let i = 0, place = 0; i < length; i += 1) {
    if (quiet[place] === i) {
      last = place;
      whole.flux[i] = flux[place]!;
      whole.kept[i] = kept[place]!;
      place += 1;
    }
    whole.trend[i] = trend[last] ?? 1;
  }
  return whole;
}

interface Worked {
  readonly time: Float64Array;
  readonly raw: Float64Array;
  readonly error: Float64Array | undefined;
  readonly clean: CleanSeries;
  readonly trended: Trended;
  readonly droppedRaw: (index: number) => number;
}

function assemble(
  job: PrepareJob,
  column: FluxColumn,
  selection: Selection,
  { time: allTime, raw: allRaw, error: allError, clean, trended, droppedRaw }: Worked,
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
    dropped: joinDropped(job, selection, { kept: trended.kept, isFlare: clean.isFlare }, droppedRaw),
    missing: selection.missing,
    ...describePieces(job, time, clean, kept),
    flares: clean.flares,
    drops: clean.drops.map((drop) => allTime[drop]!),
    scatter: robustSigma(flux),
    cadenceDays: median(time.subarray(1).map((value, i) => value - time[i]!)),
    spanDays: time.at(-1)! - time[0]!,
    fluxColumn: column.name,
    fluxUnit: column.unit,
    warnings: [...warnOfUnit(column), ...errors.warnings, ...warnOfWindow(job)],
  });
}

function joinDropped(
  { lightCurve }: PrepareJob,
  selection: Selection,
  { kept, isFlare }: { readonly kept: Uint8Array; readonly isFlare: Uint8Array },
  droppedRaw: (index: number) => number,
): PreparedSeries['dropped'] {
  const clipped = [...selection.kept.keys()]
    .filter((i) => kept[i] === 0)
    .map((i) => ({ index: selection.kept[i]!, reason: isFlare[i] === 1 ? ('flare' as const) : ('clipped' as const) }));
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
  const windowDays = scaleDaysOf(recipe.detrend);
  if (windowDays === undefined || (windowDays >= LEAST_CADENCES * cadenceDays && windowDays > 0)) return undefined;
  return `The detrending window of ${windowDays} d is shorter than ${LEAST_CADENCES} cadences (${Number((LEAST_CADENCES * cadenceDays).toPrecision(3))} d).`;
}

/** Pieces that no trend reaches across, among the points kept, and the points whose window a piece's end cuts off. */
function describePieces({ recipe }: PrepareJob, time: Float64Array, clean: CleanSeries, kept: Int32Array) {
  const scaleDays = scaleDaysOf(recipe.detrend);
  const splits = clean.splits.map((split) => kept.findIndex((index) => index >= split)).filter((i) => i > 0);
  const pieces = piecesOf(time, splits, scaleDays === undefined ? Number.POSITIVE_INFINITY : scaleDays / 2);
  const isAtEdge = new Uint8Array(time.length);
  for (const { first, end } of scaleDays === undefined ? [] : pieces)
    for (let i = first; i < end; i += 1)
      if (time[i]! - time[first]! < scaleDays! / 2 || time[end - 1]! - time[i]! < scaleDays! / 2) isAtEdge[i] = 1;
  return { pieceStarts: Int32Array.from(pieces, ({ first }) => first), isAtEdge };
}

/** A window under three durations eats into a dip, unless the dip has no weight in it. Hippke et al. (2019), AJ 158, 143. */
function warnOfWindow({ recipe, protectedEvents }: PrepareJob): readonly string[] {
  const scaleDays = scaleDaysOf(recipe.detrend);
  if (scaleDays === undefined) return [];
  return protectedEvents
    .filter(({ durationDays }) => scaleDays < LEAST_DURATIONS * durationDays)
    .map(
      ({ periodDays, durationDays }) =>
        `The window of ${scaleDays} d is ${(scaleDays / durationDays).toFixed(1)} durations of the event at ${Number(periodDays.toPrecision(5))} d: under ${LEAST_DURATIONS} the trend around it is poorly held.`,
    );
}

function warnOfUnit({ name, unit }: FluxColumn): readonly string[] {
  if (unit === 'sigma')
    return [`"${name}" is in multiples of its scatter: depths are in sigma, and radii cannot be derived from them.`];
  if (unit === 'unknown') return [`The unit of "${name}" is not known: it was taken as proportional to flux.`];
  return [];
}
