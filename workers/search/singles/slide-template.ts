import {
  AFTER,
  BEFORE,
  BOTH_SIDES,
  type FitWindow,
  fitWindow,
  makeTemplateFit,
  NO_SIDE,
  SHOULDER_DURATIONS,
  significanceOf,
  type Template,
} from './fit-template.ts';
import type { SeriesSums } from './series-sums.ts';
import { advanceTo, type Stretch } from './stretches.ts';

/** Steps of a sliding template, in its duration: at worst a twentieth of it is missed, and refinement finds it. */
const STRIDE = 0.1;
/** A box holds other points only when it has moved by a cadence. */
const LEAST_STRIDE_CADENCES = 1;
/** One place in so many also tells what a level from one side alone would have given. */
export const ONE_SIDE_EVERY = 4;

/** What was taken out changes the fits within so many durations of it: half the event and its shoulder. */
const NEAR_DURATIONS = 3;

/** What one template gave along the series. */
export interface FilterOutput {
  readonly template: Template;
  readonly strideDays: number;
  /** Days, as `x`, ascending; only places where it could be fitted. */
  readonly centres: Float64Array;
  /** Depth over its error from white noise. */
  readonly significance: Float64Array;
  readonly sides: Uint8Array;
  /** The same from one side, at every fourth place that has both. */
  readonly oneSided: Float64Array;
}

/**
 * Fits a template all along the series: at every tenth of its duration, but not finer than the cadence.
 *
 * @param near only places within three durations of these are tried; undefined: all
 */
export function slideTemplate(
  sums: SeriesSums,
  stretches: readonly Stretch[],
  template: Template,
  near?: readonly number[],
): FilterOutput {
  const { x, cadenceDays } = sums.points;
  const stride = Math.max(STRIDE * template.durationDays, LEAST_STRIDE_CADENCES * cadenceDays);
  const places = stretches.map(({ from, end }) => Math.floor((x[end - 1]! - x[from]!) / stride) + 1);
  const most = places.reduce((sum, count) => sum + count, 0);
  const taken: Taken = {
    count: 0,
    oneSidedCount: 0,
    centres: new Float64Array(most),
    significance: new Float64Array(most),
    sides: new Uint8Array(most),
    oneSided: new Float64Array(most),
  };
  stretches.forEach((stretch, i) => void slideAlong(sums, stretch, template, stride, places[i]!, near, taken));
  return {
    template,
    strideDays: stride,
    centres: taken.centres.subarray(0, taken.count),
    significance: taken.significance.subarray(0, taken.count),
    sides: taken.sides.subarray(0, taken.count),
    oneSided: taken.oneSided.subarray(0, taken.oneSidedCount),
  };
}

interface Taken {
  count: number;
  oneSidedCount: number;
  readonly centres: Float64Array;
  readonly significance: Float64Array;
  readonly sides: Uint8Array;
  readonly oneSided: Float64Array;
}

const fit = makeTemplateFit();
const sideFit = makeTemplateFit();
const window: FitWindow = { from: 0, first: 0, last: 0, end: 0 };

function slideAlong(
  sums: SeriesSums,
  stretch: Stretch,
  template: Template,
  stride: number,
  places: number,
  near: readonly number[] | undefined,
  taken: Taken,
): void {
  const start = sums.points.x[stretch.from]!;
  const reach = NEAR_DURATIONS * template.durationDays;
  window.from = window.first = window.last = window.end = stretch.from;
  for (let place = 0; place < places; place += 1) {
    const centre = start + place * stride;
    if (near !== undefined && !isNear(centre, near, reach)) continue;
    moveWindow(sums.points.x, stretch, centre, template.durationDays);
    fitWindow(sums, window, centre, template, BOTH_SIDES, fit);
    if (fit.sides === NO_SIDE) continue;
    taken.centres[taken.count] = centre;
    taken.significance[taken.count] = significanceOf(fit);
    taken.sides[taken.count] = fit.sides;
    taken.count += 1;
    if (fit.sides !== BOTH_SIDES || taken.count % ONE_SIDE_EVERY !== 0) continue;
    fitWindow(sums, window, centre, template, taken.count % (2 * ONE_SIDE_EVERY) === 0 ? BEFORE : AFTER, sideFit);
    if (sideFit.sides === NO_SIDE) continue;
    taken.oneSided[taken.oneSidedCount] = significanceOf(sideFit);
    taken.oneSidedCount += 1;
  }
}

function moveWindow(x: Float64Array, { end }: Stretch, centre: number, durationDays: number): void {
  const half = durationDays / 2;
  const reach = half + SHOULDER_DURATIONS * durationDays;
  window.from = advanceTo(x, centre - reach, window.from, end);
  window.first = advanceTo(x, centre - half, window.first, end);
  window.last = advanceTo(x, centre + half, window.last, end);
  window.end = advanceTo(x, centre + reach, window.end, end);
}

function isNear(centre: number, near: readonly number[], reach: number): boolean {
  for (let i = 0; i < near.length; i += 1) if (Math.abs(centre - near[i]!) <= reach) return true;
  return false;
}
