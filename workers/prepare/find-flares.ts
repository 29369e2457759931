import type { Interval } from '../../src/core/interval.ts';
import { medianInPlace, pointToPointScatter, robustSigma } from '../../src/core/robust-statistics.ts';

/** Points in a row this far above the level around them make a flare, the highest of them further still. */
const RISE_SIGMA = 3;
const PEAK_SIGMA = 5;
const LEAST_POINTS = 3;
/** The level is the higher of the medians of so many days before and after: both sides of a flare are lower. */
const LEVEL_DAYS = 0.25;
/** A side with fewer points has no level, and a flare there is not told from the side of an eclipse. */
const LEAST_SIDE = 3;
/** A flare rises within this part of its length: what rises as slowly as it falls is a pulsation or an egress. */
const LARGEST_RISE = 0.4;
/** The tail is left out until it has decayed to this many sigma; it falls exponentially from the peak. */
const TAIL_SIGMA = 0.5;
const LONGEST_TAIL_DAYS = 0.3;
/** A median window holds at most so many points on each side: long enough, and quick on fast cadences. */
const MOST_SIDE = 200;

/**
 * Flares by their shape: at least three points in a row over 3 robust sigma of their neighbourhood, the peak over 5,
 * a quick rise and a slower fall. Each is returned with its tail, as far as an exponential through its fall stays over
 * half a sigma. Protected points are never part of one. The shape is that of Davenport et al. (2014), ApJ 797, 122;
 * the thresholds are ours.
 *
 * @param time days, ascending, length n; @param flux relative, length n; @param isProtected length n
 */
export function findFlares(time: Float64Array, flux: Float64Array, isProtected: Uint8Array): Interval[] {
  const n = time.length;
  if (n < 3 * LEAST_POINTS) return [];
  const above = heightsOver(time, flux);
  // A star that pulsates is as far from its level all the time: its scatter is that.
  const sigma = Math.max(pointToPointScatter(flux), robustSigma(above.filter(Number.isFinite)));
  if (!(sigma > 0)) return [];
  const flares: Interval[] = [];
  for (let i = 0; i < n; i += 1) {
    if (!isHigh(i)) continue;
    let end = i;
    while (end < n && isHigh(end)) end += 1;
    const flare = describeFlare(time, above, { first: i, end }, sigma);
    if (flare !== undefined) addFlare(flares, flare);
    i = end;
  }
  return flares;

  function isHigh(i: number): boolean {
    return above[i]! > RISE_SIGMA * sigma && Number.isFinite(above[i]!) && isProtected[i] === 0;
  }
}

/** Flux over the higher level of its two sides; what is high on one side only, as beside an eclipse, is no flare. */
function heightsOver(time: Float64Array, flux: Float64Array): Float64Array {
  const scratch = new Float64Array(MOST_SIDE);
  return flux.map((value, i) => {
    const sides = [-1, 1].map((direction) => sideLevel(time, flux, i, direction, scratch));
    return value - Math.max(...sides);
  });
}

function sideLevel(
  time: Float64Array,
  flux: Float64Array,
  i: number,
  direction: number,
  scratch: Float64Array,
): number {
  let count = 0;
  for (let j = i + direction; j >= 0 && j < time.length && count < MOST_SIDE; j += direction) {
    if (Math.abs(time[j]! - time[i]!) > LEVEL_DAYS) break;
    scratch[count] = flux[j]!;
    count += 1;
  }
  return count < LEAST_SIDE ? Number.NaN : medianInPlace(scratch, count);
}

/** Noise may cut a tail into runs: what begins before the last one's end belongs to it. */
function addFlare(flares: Interval[], flare: Interval): void {
  const last = flares.at(-1);
  if (last === undefined || flare.start > last.end) flares.push(flare);
  else flares[flares.length - 1] = { start: last.start, end: Math.max(last.end, flare.end) };
}

function describeFlare(
  time: Float64Array,
  above: Float64Array,
  { first, end }: { readonly first: number; readonly end: number },
  sigma: number,
): Interval | undefined {
  if (end - first < LEAST_POINTS) return undefined;
  let peak = first;
  for (let i = first; i < end; i += 1) if (above[i]! > above[peak]!) peak = i;
  if (above[peak]! < PEAK_SIGMA * sigma) return undefined;
  const rise = time[peak]! - time[Math.max(0, first - 1)]!;
  const fall = time[Math.min(time.length, end) - 1]! - time[peak]!;
  if (!(fall > 0) || rise > LARGEST_RISE * (rise + fall)) return undefined;
  // Decay time from the peak to where the run ends, then on to the end of the tail.
  const last = Math.max(above[end - 1]!, RISE_SIGMA * sigma);
  const decay = fall / Math.max(Math.log(above[peak]! / last), 0.1);
  const tail = Math.min(LONGEST_TAIL_DAYS, decay * Math.log(last / (TAIL_SIGMA * sigma)));
  return { start: time[Math.max(0, first - 1)]!, end: time[end - 1]! + Math.max(0, tail) };
}
