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
/** The trapezoid that is tried beside the box; refinement tries others. Its correlation with the box is 0.92. */
const INGRESS_FRACTION = 0.25;

/** What the templates of one duration gave along the series. */
export interface FilterOutput {
  readonly durationDays: number;
  readonly strideDays: number;
  /** Days, as `x`, ascending; only places where the box could be fitted. */
  readonly centres: Float64Array;
  /** Depth over its error from white noise, of the box. */
  readonly box: Float64Array;
  /** The same of the trapezoid; 0 where the box left no hope of one. */
  readonly trapezoid: Float64Array;
  readonly sides: Uint8Array;
  /** Of the box with one side left out, at every fourth place that has both. */
  readonly oneSided: Float64Array;
}

export interface SlideLimits {
  /** The trapezoid is tried where the box has this significance. */
  readonly trapezoidFrom: number;
  /** Only places within three durations of these are tried; undefined: all. */
  readonly near: readonly number[] | undefined;
}

export const boxOf = (durationDays: number): Template => ({ durationDays, ingressDays: 0 });
export const trapezoidOf = (durationDays: number): Template => ({
  durationDays,
  ingressDays: INGRESS_FRACTION * durationDays,
});

/** Fits a box, and in promising places a trapezoid, at every tenth of the duration, but not finer than the cadence. */
export function slideTemplate(
  sums: SeriesSums,
  stretches: readonly Stretch[],
  durationDays: number,
  limits: SlideLimits = { trapezoidFrom: Number.POSITIVE_INFINITY, near: undefined },
): FilterOutput {
  const { x, cadenceDays } = sums.points;
  const strideDays = Math.max(STRIDE * durationDays, LEAST_STRIDE_CADENCES * cadenceDays);
  const places = stretches.map(({ from, end }) => Math.floor((x[end - 1]! - x[from]!) / strideDays) + 1);
  const most = places.reduce((sum, count) => sum + count, 0);
  const column = (): Float64Array => new Float64Array(most);
  const taken: Taken = {
    count: 0,
    oneSidedCount: 0,
    centres: column(),
    box: column(),
    trapezoid: column(),
    sides: new Uint8Array(most),
    oneSided: column(),
  };
  const slide = { durationDays, strideDays, ...limits };
  stretches.forEach((stretch, i) => void slideAlong(sums, stretch, slide, places[i]!, taken));
  return {
    durationDays,
    strideDays,
    centres: taken.centres.subarray(0, taken.count),
    box: taken.box.subarray(0, taken.count),
    trapezoid: taken.trapezoid.subarray(0, taken.count),
    sides: taken.sides.subarray(0, taken.count),
    oneSided: taken.oneSided.subarray(0, taken.oneSidedCount),
  };
}

interface Taken {
  count: number;
  oneSidedCount: number;
  readonly centres: Float64Array;
  readonly box: Float64Array;
  readonly trapezoid: Float64Array;
  readonly sides: Uint8Array;
  readonly oneSided: Float64Array;
}

interface Slide extends SlideLimits {
  readonly durationDays: number;
  readonly strideDays: number;
}

const fit = makeTemplateFit();
const window: FitWindow = { from: 0, first: 0, last: 0, end: 0 };

function slideAlong(sums: SeriesSums, stretch: Stretch, slide: Slide, places: number, taken: Taken): void {
  const start = sums.points.x[stretch.from]!;
  const { durationDays, strideDays, near, trapezoidFrom } = slide;
  const box = boxOf(durationDays);
  const trapezoid = trapezoidOf(durationDays);
  window.from = window.first = window.last = window.end = stretch.from;
  for (let place = 0; place < places; place += 1) {
    const centre = start + place * strideDays;
    if (near !== undefined && !isNear(centre, near, NEAR_DURATIONS * durationDays)) continue;
    moveWindow(sums.points.x, stretch, centre, durationDays);
    fitWindow(sums, window, centre, box, BOTH_SIDES, fit);
    if (fit.sides === NO_SIDE) continue;
    const i = taken.count;
    const significance = significanceOf(fit);
    taken.centres[i] = centre;
    taken.box[i] = significance;
    taken.sides[i] = fit.sides;
    taken.count += 1;
    if (fit.sides === BOTH_SIDES && i % ONE_SIDE_EVERY === 0) takeOneSided(sums, centre, box, taken);
    if (!(significance >= trapezoidFrom)) continue;
    fitWindow(sums, window, centre, trapezoid, BOTH_SIDES, fit);
    taken.trapezoid[i] = significanceOf(fit);
  }
}

function takeOneSided(sums: SeriesSums, centre: number, box: Template, taken: Taken): void {
  const side = taken.count % (2 * ONE_SIDE_EVERY) < ONE_SIDE_EVERY ? BEFORE : AFTER;
  fitWindow(sums, window, centre, box, side, fit);
  if (fit.sides === NO_SIDE) return;
  taken.oneSided[taken.oneSidedCount] = significanceOf(fit);
  taken.oneSidedCount += 1;
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
