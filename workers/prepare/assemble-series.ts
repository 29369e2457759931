import { done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { PreparedSeries, PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { Interval } from '../../src/core/interval.ts';
import type { FluxColumn } from '../../src/core/light-curve.ts';
import { median, robustSigma } from '../../src/core/robust-statistics.ts';
import { chooseErrors } from './choose-errors.ts';
import { scaleDaysOf } from './detrend/detrenders.ts';
import { piecesOf } from './detrend/pieces.ts';
import { isInSigma } from './normalise.ts';
import type { Trended } from './remove-trend.ts';
import { type Dropped, reasonCode } from './select-points.ts';
import { indicesWhere, pick, pickPoints, type SeriesPoints } from './series-points.ts';
import { warnOfWindow } from './window-limits.ts';

export const LEAST_POINTS = 3;

/** Everything that preparation found, before the clipped points go. */
export interface Prepared {
  readonly column: FluxColumn;
  readonly points: SeriesPoints;
  readonly trended: Trended;
  /** Left out before the trend. */
  readonly dropped: readonly Dropped[];
  readonly missing: number;
  readonly flares: readonly Interval[];
  readonly drops: readonly number[];
  readonly splits: readonly number[];
  readonly warnings: readonly string[];
  /** Relative flux of a point of the light curve. */
  readonly rawAt: (index: number) => number;
}

/** The series of the points that are kept, with its errors, pieces and warnings. */
export function assembleSeries(job: PrepareJob, prepared: Prepared): Outcome<PreparedSeries> {
  const { column, points, trended, drops } = prepared;
  const kept = indicesWhere(trended.kept, 1);
  if (kept.length < LEAST_POINTS) return failed(`Clipping left ${kept.length} points of "${column.name}".`);
  const { time, raw, error, sourceIndex } = pickPoints(points, kept);
  const trend = pick(trended.trend, kept);
  const flux = pick(trended.flux, kept);
  const given = isInSigma(column.unit) ? error : error?.map((sigma, i) => sigma / trend[i]!);
  const errors = chooseErrors(flux, given, column.name);
  return done({
    key: job.key,
    time,
    raw,
    trend,
    flux,
    error: errors.error,
    errorOrigin: errors.origin,
    sourceIndex,
    dropped: joinDropped(job, prepared),
    missing: prepared.missing,
    ...describePieces(job, prepared, kept),
    flares: prepared.flares,
    drops: drops.map((drop) => points.time[drop]!),
    scatter: robustSigma(flux),
    cadenceDays: median(time.subarray(1).map((value, i) => value - time[i]!)),
    spanDays: time.at(-1)! - time[0]!,
    fluxColumn: column.name,
    fluxUnit: column.unit,
    warnings: [...warnOfUnit(column), ...errors.warnings, ...prepared.warnings, ...warnOfWindow(job)],
  });
}

function joinDropped(
  { lightCurve }: PrepareJob,
  { points, trended, dropped, rawAt }: Prepared,
): PreparedSeries['dropped'] {
  const clipped = [...indicesWhere(trended.kept, 0)].map((i) => ({
    index: points.sourceIndex[i]!,
    reason: 'clipped' as const,
  }));
  const all = [...dropped, ...clipped].sort((a, b) => a.index - b.index);
  return {
    time: Float64Array.from(all, ({ index }) => lightCurve.time[index]!),
    raw: Float64Array.from(all, ({ index }) => rawAt(index)),
    reason: Uint8Array.from(all, ({ reason }) => reasonCode(reason)),
  };
}

/** Pieces that no trend reaches across, and the points whose window a piece's end cuts off. */
function describePieces({ recipe }: PrepareJob, { points, splits }: Prepared, kept: Int32Array) {
  const { time } = points;
  const scaleDays = scaleDaysOf(recipe.detrend);
  const half = scaleDays === undefined ? 0 : scaleDays / 2;
  const starts: number[] = [];
  const isAtEdge = new Uint8Array(kept.length);
  let i = 0;
  for (const { first, end } of piecesOf(time, splits, half > 0 ? half : Number.POSITIVE_INFINITY)) {
    if (i < kept.length && kept[i]! < end) starts.push(i);
    for (; i < kept.length && kept[i]! < end; i += 1) {
      const at = time[kept[i]!]!;
      if (at - time[first]! < half || time[end - 1]! - at < half) isAtEdge[i] = 1;
    }
  }
  return { pieceStarts: Int32Array.from(starts), isAtEdge };
}

function warnOfUnit({ name, unit }: FluxColumn): readonly string[] {
  if (unit === 'sigma')
    return [`"${name}" is in multiples of its scatter: depths are in sigma, and radii cannot be derived from them.`];
  if (unit === 'unknown') return [`The unit of "${name}" is not known: it was taken as proportional to flux.`];
  return [];
}
