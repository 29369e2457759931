import { DEFAULT_LOMB_SCARGLE, type LombScargleResult } from '../../../src/contract/lomb-scargle-contract.ts';
import type { Ephemeris } from '../../../src/core/ephemeris.ts';
import { median, pointToPointScatter, robustSigma } from '../../../src/core/robust-statistics.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { computeLombScargle } from '../../search/sines/lomb-scargle.ts';
import { createOrthogonalBasis, type OrthogonalBasis } from '../orthogonal-basis.ts';
import { piecesOf } from './pieces.ts';
import type { Detrender, TrendInput } from './trend-input.ts';

/** Faster variation is a pulsator's, and no trend. */
const SHORTEST_PERIOD_DAYS = 1 / 12;
const FEWEST_POINTS = 20;
/** Sines that white noise makes as often as this stay in. */
const LEAST_SIGNIFICANCE = 1e-3;
/** A sine within this many resolution elements (1 / span) of a protected signal's harmonic is spared. */
const SPARED_ELEMENTS = 1;
/** Sines are fitted without points this far from the median: eclipses and outliers; a sine's peaks are at 1. */
const CLIP_SIGMA = 10;
/** Below it the residual is rounding. */
const SMALLEST_SCATTER = 1e-12;

/**
 * A trend of at most `count` sines, each the strongest of what the ones before it left, all fitted together by least
 * squares with a level for each stretch between splits. Sines at the protected signals' orbital frequencies and their
 * multiples are spared: a train of dips is made of them. Prewhitening, as in the study of pulsators (common practice).
 */
export const harmonics: Detrender<'harmonics'> = {
  scaleDays: () => undefined,
  scaleName: 'harmonics',
  leastCadences: () => 0,
  fit: ({ count }, input, checkpoint) => fitHarmonicTrend(input, count, checkpoint),
};

async function fitHarmonicTrend(
  input: TrendInput,
  count: number,
  checkpoint: Checkpoint,
): Promise<Float64Array | undefined> {
  const { time, flux, protectedEvents } = input;
  const isUsed = withoutOutliers(input);
  const used = Int32Array.from(isUsed.keys()).filter((i) => isUsed[i] === 1);
  if (used.length < FEWEST_POINTS) return new Float64Array(time.length).fill(1);
  const basis = createOrthogonalBasis(isUsed);
  for (const column of levelColumns(input)) basis.add(column);
  let trend = basis.fit(flux);
  for (let found = 0; found < count; found += 1) {
    const outcome = await searchResidual(input, used, trend, checkpoint);
    if (outcome === 'cancelled') return undefined;
    const next = outcome && strongestAllowed(outcome, protectedEvents, time.at(-1)! - time[0]!);
    if (next === undefined || !addSine(basis, time, next)) break;
    trend = basis.fit(flux);
  }
  return trend;
}

/** 1 where a point has weight and lies within what the variation between two splits makes likely. */
function withoutOutliers({ time, flux, hasWeight, splits }: TrendInput): Uint8Array {
  const isUsed = hasWeight.map((own, i) => (own === 1 && Number.isFinite(flux[i]!) ? 1 : 0));
  for (const { first, end } of piecesOf(time, splits, Number.POSITIVE_INFINITY)) {
    const own = flux.subarray(first, end).filter((_, i) => isUsed[first + i] === 1);
    const [centre, limit] = [median(own), CLIP_SIGMA * robustSigma(own)];
    for (let i = first; i < end; i += 1) if (limit > 0 && Math.abs(flux[i]! - centre) > limit) isUsed[i] = 0;
  }
  return isUsed;
}

/** One level for each stretch between splits; a stretch without a weighted point is dropped by the basis. */
function levelColumns({ time, splits }: TrendInput): Float64Array[] {
  const all = new Float64Array(time.length).fill(1);
  const own = piecesOf(time, splits, Number.POSITIVE_INFINITY).slice(1);
  return [all, ...own.map(({ first, end }) => new Float64Array(time.length).fill(1, first, end))];
}

/** False where neither phase of it is new. */
function addSine(basis: OrthogonalBasis, time: Float64Array, frequencyPerDay: number): boolean {
  const angles = time.map((at) => 2 * Math.PI * frequencyPerDay * (at - time[0]!));
  const isNew = [basis.add(angles.map(Math.cos)), basis.add(angles.map(Math.sin))];
  return isNew.includes(true);
}

async function searchResidual(
  { time, flux }: TrendInput,
  used: Int32Array,
  trend: Float64Array,
  checkpoint: Checkpoint,
): Promise<LombScargleResult | 'cancelled' | undefined> {
  const residual = Float64Array.from(used, (i) => flux[i]! - trend[i]!);
  const scatter = pointToPointScatter(residual);
  const series = {
    seriesId: '',
    time: Float64Array.from(used, (i) => time[i]!),
    flux: residual,
    error: new Float64Array(used.length).fill(Math.max(scatter, SMALLEST_SCATTER)),
  };
  if (residual.every((value) => Math.abs(value) < SMALLEST_SCATTER)) return undefined;
  const settings = { ...DEFAULT_LOMB_SCARGLE, shortestPeriodDays: SHORTEST_PERIOD_DAYS, rounds: 1 };
  const outcome = await computeLombScargle(series, { key: '', settings }, checkpoint);
  if (outcome.kind === 'cancelled') return 'cancelled';
  return outcome.kind === 'done' ? outcome.value : undefined;
}

/** The refined strongest sine, or where that is spared the strongest trial frequency that is not. */
function strongestAllowed(
  { power, frequencies, peaks, levels }: LombScargleResult,
  spared: readonly Ephemeris[],
  spanDays: number,
): number | undefined {
  const least = levels.find(({ probability }) => probability <= LEAST_SIGNIFICANCE)?.power ?? 1;
  const [peak] = peaks;
  if (peak === undefined || peak.power < least) return undefined;
  if (!isSpared(peak.frequencyPerDay, spared, spanDays)) return peak.frequencyPerDay;
  let best: number | undefined;
  for (let k = 0; k < power.length; k += 1) {
    const isStrongest = power[k]! > (best === undefined ? least : power[best]!);
    if (isStrongest && !isSpared(frequencies[k]!, spared, spanDays)) best = k;
  }
  return best === undefined ? undefined : frequencies[best];
}

function isSpared(frequency: number, spared: readonly Ephemeris[], spanDays: number): boolean {
  return spared.some(({ periodDays }) => {
    const order = Math.round(frequency * periodDays);
    return order >= 1 && Math.abs(frequency - order / periodDays) < SPARED_ELEMENTS / spanDays;
  });
}
