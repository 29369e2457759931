import { DEFAULT_LOMB_SCARGLE, type LombScargleResult } from '../../../src/contract/lomb-scargle-contract.ts';
import type { Ephemeris } from '../../../src/core/ephemeris.ts';
import { pointToPointScatter } from '../../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { computeLombScargle } from '../../search/sines/lomb-scargle.ts';
import { regressOn } from '../regress.ts';
import type { TrendInput } from './trend-input.ts';

/** Faster variation is a pulsator's, and no trend. */
const SHORTEST_PERIOD_DAYS = 1 / 12;
const FEWEST_POINTS = 20;
/** Sines that white noise makes as often as this stay in. */
const LEAST_SIGNIFICANCE = 1e-3;
/** A sine within this many resolution elements of a protected signal's harmonic is spared. */
const SPARED_ELEMENTS = 1;

/**
 * A trend of at most `count` sines, each the strongest of what the ones before it left, all fitted together; sines at
 * the protected signals' orbital frequencies and their multiples are spared, as they are what a train of dips is made
 * of. Prewhitening, as in the study of pulsators (common practice).
 *
 * @returns length n, in the unit of flux; 1 everywhere for too few points; undefined when cancelled
 */
export async function fitHarmonicTrend(
  input: TrendInput,
  count: number,
  checkpoint: Checkpoint,
): Promise<Float64Array | undefined> {
  const { time, flux, hasWeight } = input;
  const used = Int32Array.from(hasWeight.keys()).filter((i) => hasWeight[i] === 1);
  if (used.length < FEWEST_POINTS) return new Float64Array(time.length).fill(1);
  const frequencies: number[] = [];
  let explained: Float64Array = new Float64Array(time.length);
  while (frequencies.length < count) {
    const outcome = await searchResidual(input, used, explained, checkpoint);
    if (outcome === 'cancelled') return undefined;
    const next = outcome && strongestAllowed(outcome, input.protectedEvents, time.at(-1)! - time[0]!);
    if (next === undefined) break;
    frequencies.push(next);
    explained = regressOn(flux, columnsOf(time, frequencies), hasWeight, [{ first: 0, end: time.length }]);
  }
  const level = used.reduce((sum, i) => sum + flux[i]! - explained[i]!, 0) / used.length;
  return explained.map((value) => level + value);
}

async function searchResidual(
  { time, flux }: TrendInput,
  used: Int32Array,
  explained: Float64Array,
  checkpoint: Checkpoint,
): Promise<LombScargleResult | 'cancelled' | undefined> {
  const residual = Float64Array.from(used, (i) => flux[i]! - explained[i]!);
  const scatter = pointToPointScatter(residual);
  const series = {
    seriesId: '',
    time: Float64Array.from(used, (i) => time[i]!),
    flux: residual,
    error: new Float64Array(used.length).fill(scatter > 0 ? scatter : 1e-6),
  };
  const settings = { ...DEFAULT_LOMB_SCARGLE, shortestPeriodDays: SHORTEST_PERIOD_DAYS, rounds: 1 };
  const outcome = await computeLombScargle(series, { key: '', settings }, checkpoint);
  if (outcome.kind === 'cancelled') return 'cancelled';
  return outcome.kind === 'done' ? outcome.value : undefined;
}

/** The refined strongest sine, or where that is spared the strongest trial frequency that is not. */
function strongestAllowed(result: LombScargleResult, spared: readonly Ephemeris[], spanDays: number) {
  const least = result.levels.find(({ probability }) => probability <= LEAST_SIGNIFICANCE)?.power ?? 1;
  const [peak] = result.peaks;
  if (peak === undefined || peak.power < least) return undefined;
  if (!isSpared(peak.frequencyPerDay, spared, spanDays)) return peak.frequencyPerDay;
  let best: number | undefined;
  for (let k = 0; k < result.power.length; k += 1)
    if (
      result.power[k]! > (best === undefined ? least : result.power[best]!) &&
      !isSpared(result.frequencies[k]!, spared, spanDays)
    )
      best = k;
  return best === undefined ? undefined : result.frequencies[best];
}

function isSpared(frequency: number, spared: readonly Ephemeris[], spanDays: number): boolean {
  return spared.some(({ periodDays }) => {
    const order = Math.round(frequency * periodDays);
    return order >= 1 && Math.abs(frequency - order / periodDays) < SPARED_ELEMENTS / spanDays;
  });
}

function columnsOf(time: Float64Array, frequencies: readonly number[]): Float64Array[] {
  return frequencies.flatMap((frequency) => [
    time.map((t) => Math.cos(2 * Math.PI * frequency * t)),
    time.map((t) => Math.sin(2 * Math.PI * frequency * t)),
  ]);
}
