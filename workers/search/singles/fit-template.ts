import { countPoints, makeMoments, type SeriesSums, takeMoments } from './series-sums.ts';
import { boundWithin, type Stretch } from './stretches.ts';

/** Local level and slope are taken from this many durations before and after the event. */
export const SHOULDER_DURATIONS = 2;
/** A side gives a level when it holds the points of half a duration. */
const LEAST_SIDE = 0.5;
/** An event needs this part of the points that the cadence would give it. */
const LEAST_COVERAGE = 1 / 3;
const LEAST_POINTS = 2;
/** Beneath this part of the template's own weight what is left of it beside level and slope is rounding. */
const LEAST_INFORMATION = 1e-6;

/** From which sides the local level comes. */
export const NO_SIDE = 0;
export const BEFORE = 1;
export const AFTER = 2;
export const BOTH_SIDES = 3;

/** Where a fit is tried: an isosceles trapezoid of depth 1; `ingressDays` 0 makes it a box. */
export interface Template {
  /** First to last contact. */
  readonly durationDays: number;
  /** First to second contact, at most half the duration. */
  readonly ingressDays: number;
}

export interface TemplateFit {
  /** NO_SIDE: nothing could be fitted, and the rest is 0. */
  sides: number;
  /** Of the template's floor, positive for a dip. */
  depth: number;
  /** 1 / variance of the depth from white noise. */
  information: number;
  pointsInside: number;
}

export const makeTemplateFit = (): TemplateFit => ({ sides: NO_SIDE, depth: 0, information: 0, pointsInside: 0 });

/** Depth over its error from white noise; 0 where there is no fit. */
export const significanceOf = ({ depth, information }: TemplateFit): number => depth * Math.sqrt(information);

const whole = makeMoments();
const ingress = makeMoments();
const floor = makeMoments();
const egress = makeMoments();

/** Indices of the points of a fit: its window is `from` up to `end`, the event in it `first` up to `last`. */
export interface FitWindow {
  from: number;
  first: number;
  last: number;
  end: number;
}

/**
 * Weighted least squares of level, slope and depth of a template at `centre`, over the event and two durations on
 * either side, within one stretch: no level is taken across a gap that ends it. Where a side holds fewer points than
 * half a duration has, level alone comes from the other side, for a slope could not be told from half a dip. An event
 * with less than a third of its points, or without a level, is not fitted.
 *
 * @param centre days, as `x` of the points
 */
export function fitTemplate(
  sums: SeriesSums,
  stretch: Stretch,
  centre: number,
  template: Template,
  into: TemplateFit,
): void {
  const { x } = sums.points;
  const half = template.durationDays / 2;
  const reach = half + SHOULDER_DURATIONS * template.durationDays;
  searched.from = boundWithin(x, centre - reach, stretch.from, stretch.end);
  searched.first = boundWithin(x, centre - half, searched.from, stretch.end);
  searched.last = boundWithin(x, centre + half, searched.first, stretch.end);
  searched.end = boundWithin(x, centre + reach, searched.last, stretch.end);
  fitWindow(sums, searched, centre, template, BOTH_SIDES, into);
}

const searched: FitWindow = { from: 0, first: 0, last: 0, end: 0 };

/** The same where the window is known. @param sidesWanted leaves a side out on purpose */
export function fitWindow(
  sums: SeriesSums,
  { from, first, last, end }: FitWindow,
  centre: number,
  template: Template,
  sidesWanted: number,
  into: TemplateFit,
): void {
  const expected = template.durationDays / sums.points.cadenceDays;
  const leastSide = Math.max(LEAST_POINTS, LEAST_SIDE * expected);
  const sides =
    (countPoints(sums.before, from, first) >= leastSide ? BEFORE : 0) |
    (countPoints(sums.before, last, end) >= leastSide ? AFTER : 0);
  into.pointsInside = countPoints(sums.before, first, last);
  into.sides = into.pointsInside >= Math.max(LEAST_POINTS, LEAST_COVERAGE * expected) ? sides & sidesWanted : NO_SIDE;
  into.depth = 0;
  into.information = 0;
  if (into.sides === NO_SIDE) return;
  const windowFrom = (into.sides & BEFORE) === 0 ? first : from;
  const windowEnd = (into.sides & AFTER) === 0 ? last : end;
  solveTemplate(sums, windowFrom, windowEnd, centre, template, into.sides === BOTH_SIDES, into);
}

/** The same over a window of points given by hand, all of it used. */
export function solveTemplate(
  { before, points }: SeriesSums,
  from: number,
  end: number,
  centre: number,
  { durationDays, ingressDays }: Template,
  hasSlope: boolean,
  into: TemplateFit,
): void {
  const half = durationDays / 2;
  const { x } = points;
  const first = boundWithin(x, centre - half, from, end);
  const second = ingressDays > 0 ? boundWithin(x, centre - half + ingressDays, first, end) : first;
  const fourth = boundWithin(x, centre + half, second, end);
  const third = ingressDays > 0 ? boundWithin(x, centre + half - ingressDays, second, fourth) : fourth;
  takeMoments(before, from, end, centre, whole);
  takeMoments(before, first, second, centre, ingress);
  takeMoments(before, second, third, centre, floor);
  takeMoments(before, third, fourth, centre, egress);
  solve(half, ingressDays > 0 ? 1 / ingressDays : 0, hasSlope, into);
}

/**
 * From the moments above. With s the template and <> sums over weights: the part of s that level and slope cannot
 * make has the information I = <ss> - ..., and depth = -<s_rest y> / I.
 */
function solve(half: number, steepness: number, hasSlope: boolean, into: TemplateFit): void {
  const s = steepness * (ingress.x + half * (ingress.w + egress.w) - egress.x) + floor.w;
  const sx = steepness * (ingress.xx + half * (ingress.x + egress.x) - egress.xx) + floor.x;
  const sy = steepness * (ingress.xy + half * (ingress.y + egress.y) - egress.xy) + floor.y;
  const ss =
    steepness *
      steepness *
      (ingress.xx + egress.xx + 2 * half * (ingress.x - egress.x) + half * half * (ingress.w + egress.w)) +
    floor.w;
  const meanX = whole.x / whole.w;
  const spreadX = whole.xx - meanX * whole.x;
  const fromLevel = s / whole.w;
  const alongX = sx - meanX * s;
  const slope = hasSlope && spreadX > 0 ? alongX / spreadX : 0;
  const information = ss - fromLevel * s - slope * alongX;
  if (!(information > LEAST_INFORMATION * ss) || !(ss > 0)) {
    into.sides = NO_SIDE;
    into.depth = 0;
    into.information = 0;
    return;
  }
  into.information = information;
  into.depth = -(sy - fromLevel * whole.y - slope * (whole.xy - meanX * whole.y)) / information;
}
