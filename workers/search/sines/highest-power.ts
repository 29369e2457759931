import { highestBetween } from './highest-between.ts';
import { expandPower } from './local-power.ts';
import type { FrequencyGrid } from './plan-sines.ts';
import type { Steps } from './steps.ts';
import type { WeightedSeries } from './weighted-series.ts';

const MOST_CANDIDATES = 5;
/** Of a step. */
const TOLERANCE = 1e-4;

/**
 * The highest maximum of the power, by plain sums between the trials. A peak may stand between two trials, so that
 * not only the highest trial is looked at, but all that could hide as high a one.
 *
 * @param power at k * step, k = 0..last
 */
export function* findHighest(
  series: WeightedSeries,
  power: Float64Array,
  grid: FrequencyGrid,
): Steps<{ readonly frequency: number; readonly power: number }> {
  let best = { frequency: grid.first * grid.step, power: 0 };
  for (const k of candidatesOf(power, grid, series.spanDays)) {
    const low = Math.max(grid.first, k - 1) * grid.step;
    const high = Math.min(grid.last, k + 1) * grid.step;
    const bracket = { low, middle: k * grid.step, high };
    const powerNear = yield* expandPower(series, bracket.middle, grid.step);
    const own = highestBetween(powerNear, bracket, TOLERANCE * grid.step);
    if (own.value > best.power) best = { frequency: own.x, power: own.value };
  }
  return best;
}

/** Trials with none higher beside them, highest first, of which the peak may be the highest. */
function candidatesOf(power: Float64Array, grid: FrequencyGrid, spanDays: number): number[] {
  const { first, last } = grid;
  const hills: { readonly k: number; readonly height: number }[] = [];
  let most = 0;
  for (let k = first; k <= last; k += 1) {
    const own = power[k]!;
    const isHill = (k === first || own >= power[k - 1]!) && (k === last || own > power[k + 1]!);
    if (!isHill || own < most / 2) continue;
    const height = k === first || k === last ? own : vertexHeight(power[k - 1]!, own, power[k + 1]!);
    most = Math.max(most, height);
    hills.push({ k, height });
  }
  const least = (1 - vertexLoss(grid.step * spanDays)) * most;
  const candidates = hills.filter(({ height }) => height > 0 && height >= least);
  return candidates
    .sort((a, b) => b.height - a.height)
    .slice(0, MOST_CANDIDATES)
    .map(({ k }) => k);
}

function vertexHeight(before: number, own: number, after: number): number {
  const curvature = before - 2 * own + after;
  return curvature < 0 ? own - (after - before) ** 2 / (8 * curvature) : own;
}

/** Part of a sine's power that the parabola through three trials misses at most, for evenly spread times. */
function vertexLoss(elements: number): number {
  const x = (Math.PI * Math.min(1, elements)) / 2;
  const trialLoss = 1 - (Math.sin(x) / x) ** 2;
  return Math.min(0.6, 4 * trialLoss ** 2);
}
