import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import { median, robustSigma } from '../../../src/core/robust-statistics.ts';

/** Fewer points say nothing of their noise. */
const LEAST_POINTS = 10;
/** No point counts as better than this part of the typical error: one absurd error must not outweigh all others. */
const LEAST_ERROR = 0.1;
/** A point this many sigma off its neighbours, neither of which follows it a quarter of the way, stands alone. */
const LONE_SIGMA = 8;
const FOLLOWED = 0.25;
/** Running sums keep their digits only while no value dwarfs all others; no dip is deeper than this many sigma. */
const MOST_SIGMA = 1e6;

/** A series made safe for running sums. All arrays of one length, in time order, without NaN. */
export interface UsablePoints {
  /** What `x` is counted from: the middle of the series. */
  readonly anchorDays: number;
  readonly x: Float64Array;
  /** Flux less its median. */
  readonly y: Float64Array;
  /** 1 / error^2; 0 leaves the point out, while its time still shows that the instrument was on. */
  readonly weight: Float64Array;
  /** Median of the positive steps in time. */
  readonly cadenceDays: number;
  readonly spanDays: number;
}

/** @returns a sentence for the analyst where the series is too short to be searched for `purpose` */
export function selectUsablePoints({ time, flux, error }: SearchSeries, purpose: string): UsablePoints | string {
  const isUsable = (_: number, i: number): boolean =>
    Number.isFinite(time[i]) && Number.isFinite(flux[i]) && Number.isFinite(error[i]) && error[i]! > 0;
  const usableTime = time.filter(isUsable);
  const n = usableTime.length;
  if (n < LEAST_POINTS) return `${purpose} needs at least ${LEAST_POINTS} points; this series has ${n}.`;
  const spanDays = usableTime[n - 1]! - usableTime[0]!;
  if (!(spanDays > 0)) return `${purpose} needs points at several times; all ${n} have the same time.`;
  const anchorDays = (usableTime[0]! + usableTime[n - 1]!) / 2;
  const x = usableTime.map((value) => value - anchorDays);
  const steps = x.subarray(1).map((value, i) => value - x[i]!);
  const y = limitFlux(flux.filter(isUsable));
  return {
    anchorDays,
    x,
    y,
    weight: leaveOutLonePoints(y, weighPoints(error.filter(isUsable))),
    cadenceDays: median(steps.filter((step) => step > 0)),
    spanDays,
  };
}

function limitFlux(flux: Float64Array): Float64Array {
  const middle = median(flux);
  const most = MOST_SIGMA * robustSigma(flux) || Number.POSITIVE_INFINITY;
  return flux.map((value) => Math.max(-most, Math.min(most, value - middle)));
}

function weighPoints(error: Float64Array): Float64Array {
  const least = LEAST_ERROR * median(error);
  return error.map((sigma) => 1 / Math.max(sigma, least) ** 2);
}

/**
 * Takes the weight from points that differ from the median of two neighbours on either side by over eight sigma (of
 * that difference over the series), and that neither neighbour follows a quarter of the way: particle hits and dropped
 * readings. A dip of two points is none of them; one of a single point cannot be told from them.
 */
function leaveOutLonePoints(y: Float64Array, weight: Float64Array): Float64Array {
  const middles = y.map((value, i) =>
    middleOfFour(y[i - 2] ?? value, y[i - 1] ?? value, y[i + 1] ?? value, y[i + 2] ?? value),
  );
  const sigma = robustSigma(y.map((value, i) => value - middles[i]!));
  return weight.map((own, i) => {
    const middle = middles[i]!;
    const off = y[i]! - middle;
    if (!(Math.abs(off) > LONE_SIGMA * sigma) || sigma === 0) return own;
    const isFollowed = [y[i - 1], y[i + 1]].some(
      (beside) => beside !== undefined && (beside - middle) / off > FOLLOWED,
    );
    return isFollowed ? own : 0;
  });
}

function middleOfFour(a: number, b: number, c: number, d: number): number {
  return (a + b + c + d - Math.min(a, b, c, d) - Math.max(a, b, c, d)) / 2;
}

/** The same points, those within `halfWidthDays` of any of the times (as `x`) without weight. */
export function withoutEvents(points: UsablePoints, times: readonly number[], halfWidthDays: number): UsablePoints {
  const isInEvent = (x: number): boolean => times.some((time) => Math.abs(x - time) <= halfWidthDays);
  return { ...points, weight: points.weight.map((weight, i) => (isInEvent(points.x[i]!) ? 0 : weight)) };
}
