import type { UsablePoints } from './usable-points.ts';

/** Values a point has in `before`. */
export const SUM_COUNT = 6;

/** Running sums in time, from which any moment of any stretch of points is two looks away. */
export interface SeriesSums {
  readonly points: UsablePoints;
  /** `before[6 i ...]`: sums of w, w x, w x^2, w y, w x y and of the points with weight, over the points before i. */
  readonly before: Float64Array;
}

/**
 * Sums of squares of times lose digits with the square of the span over the window: for four years at half an hour and
 * a window of a few hours some 2e-4 of the slope's share is noise, for a month at two minutes 1e-7. What is listed is
 * measured again on sums of its own neighbourhood.
 */
export function makeSeriesSums(points: UsablePoints): SeriesSums {
  const { x, y, weight } = points;
  const before = new Float64Array(SUM_COUNT * (x.length + 1));
  for (let i = 0; i < x.length; i += 1) {
    const a = SUM_COUNT * i;
    const b = a + SUM_COUNT;
    const w = weight[i]!;
    const wx = w * x[i]!;
    before[b] = before[a]! + w;
    before[b + 1] = before[a + 1]! + wx;
    before[b + 2] = before[a + 2]! + wx * x[i]!;
    before[b + 3] = before[a + 3]! + w * y[i]!;
    before[b + 4] = before[a + 4]! + wx * y[i]!;
    before[b + 5] = before[a + 5]! + (w > 0 ? 1 : 0);
  }
  return { points, before };
}

/** Weighted moments of a range of points, with times counted from a centre. */
export interface Moments {
  w: number;
  x: number;
  xx: number;
  y: number;
  xy: number;
}

export const makeMoments = (): Moments => ({ w: 0, x: 0, xx: 0, y: 0, xy: 0 });

export function takeMoments(before: Float64Array, from: number, end: number, centre: number, into: Moments): Moments {
  const a = SUM_COUNT * from;
  const b = SUM_COUNT * end;
  const w = before[b]! - before[a]!;
  const x = before[b + 1]! - before[a + 1]!;
  const y = before[b + 3]! - before[a + 3]!;
  into.w = w;
  into.x = x - centre * w;
  into.xx = before[b + 2]! - before[a + 2]! - centre * (2 * x - centre * w);
  into.y = y;
  into.xy = before[b + 4]! - before[a + 4]! - centre * y;
  return into;
}

export function countPoints(before: Float64Array, from: number, end: number): number {
  return before[SUM_COUNT * end + 5]! - before[SUM_COUNT * from + 5]!;
}
