import type {
  BoxPeak,
  BoxSignal,
  CorrelatedNoise,
  RelatedPeak,
  SearchSeries,
} from '../../src/contract/search-contract.ts';
import { correlatedSigmaAt, correlatedSignalToNoise } from '../../src/core/correlated-noise.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import { median } from '../../src/core/robust-statistics.ts';
import { isSameSignal } from '../../src/core/same-signal.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { estimateTimingErrors, roughTimingErrors, type TimingErrors } from './box-errors.ts';
import type { BoxWork } from './box-search.ts';
import { maskWork, measureEvents } from './event-sums.ts';
import { type BlockKernel, makeBlockKernel } from './kernel/block-kernel.ts';
import { MASK_HALF_WIDTH } from './mask-signals.ts';
import { relatePeriods, type Sampling } from './peak-relation.ts';
import { refineBox } from './refine-box.ts';
import { windowFrequencies } from './window-frequencies.ts';

const MOST_SIGNALS = 5;
const MOST_RELATIVES = 8;
/** Candidates held against the signals already found; a strong one has hundreds of shoulders and harmonics. */
const MOST_CANDIDATES = 1500;
/** A candidate that loses more than this part of its S/N without the points of a stronger signal is its relative. */
const LEAST_OWN_SIGNAL = 0.5;
/** A relative under this part of its signal's S/N is not worth a line. */
const LEAST_RELATIVE = 0.2;

/** The joined periodogram, ascending in period. */
export interface Periodogram {
  readonly periods: Float64Array;
  readonly signalToNoise: Float64Array;
  readonly objective: Float64Array;
  readonly durationDays: Float64Array;
  readonly epochDays: Float64Array;
  readonly sde: Float64Array;
  readonly levelledEfficiency: Float64Array;
}

interface Found {
  readonly peak: BoxPeak;
  readonly relatives: RelatedPeak[];
  /** The series without this signal's events; made when first needed. */
  rest: BoxWork | undefined;
}

interface Hunt {
  readonly series: SearchSeries;
  readonly work: BoxWork;
  readonly periodogram: Periodogram;
  readonly noise: CorrelatedNoise;
  readonly sampling: Sampling;
  readonly found: Found[];
  /** The series without the events of every signal found. */
  rest: BoxWork;
  readonly cadenceDays: number;
  readonly kernel: BlockKernel | undefined;
}

/**
 * The five strongest separate signals, refined, strongest by the objective first, each with the peaks that it makes
 * at other periods. Peaks of one signal drift apart by less than half a duration over the span; a peak that loses
 * half of its S/N without the points of a stronger signal lives on those events and stands under it, as its harmonic,
 * as its alias in the spectral window, or only as what it is: a chance alignment with the same events.
 *
 * @returns undefined when cancelled
 */
export async function findSignals(
  series: SearchSeries,
  work: BoxWork,
  periodogram: Periodogram,
  noise: CorrelatedNoise,
  checkpoint: Checkpoint,
): Promise<BoxSignal[] | undefined> {
  const sampling = {
    spanDays: series.time.at(-1)! - series.time[0]!,
    windowFrequencies: windowFrequencies(series.time),
  };
  const hunt: Hunt = {
    series,
    work,
    periodogram,
    noise,
    sampling,
    found: [],
    rest: work,
    cadenceDays: medianStep(series.time),
    kernel: makeBlockKernel(),
  };
  const candidates = localMaxima(periodogram.objective).slice(0, MOST_CANDIDATES);
  for (const [rank, trial] of candidates.entries()) {
    if (checkpoint.isDue() && !(await checkpoint.pause(rank, candidates.length))) return undefined;
    consider(hunt, trial);
  }
  const rankOf = ({ signalToNoise, correlatedSignalToNoise: correlated }: BoxPeak): number =>
    periodogram.objective === periodogram.signalToNoise ? signalToNoise : correlated;
  return hunt.found.map(({ peak, relatives }) => ({ ...peak, relatives })).sort((a, b) => rankOf(b) - rankOf(a));
}

/** From up to a few thousand places all over the series. */
function medianStep(time: Float64Array): number {
  const stride = Math.max(1, Math.floor(time.length / 4000));
  const steps: number[] = [];
  for (let i = 1; i < time.length; i += stride) steps.push(time[i]! - time[i - 1]!);
  return median(steps);
}

/** Trials that no neighbour exceeds, strongest first. */
function localMaxima(power: Float64Array): number[] {
  const found: number[] = [];
  for (let i = 0; i < power.length; i += 1) {
    const value = power[i]!;
    if (value > 0 && value >= (power[i - 1] ?? 0) && value > (power[i + 1] ?? 0)) found.push(i);
  }
  return found.sort((a, b) => power[b]! - power[a]!);
}

function consider(hunt: Hunt, trial: number): void {
  const { found, periodogram, sampling } = hunt;
  const candidate = ephemerisAt(periodogram, trial);
  if (isKnown(hunt, candidate)) return;
  if (found.length > 0 && keptPart(hunt.rest, candidate, periodogram.signalToNoise[trial]!) < LEAST_OWN_SIGNAL) {
    addRelative(hunt, trial, candidate);
    return;
  }
  if (found.length === MOST_SIGNALS) return;
  const refined = refineBox(hunt.series, hunt.work, candidate, reachOf(periodogram.periods, trial), hunt.kernel);
  if (found.some(({ peak }) => isSameSignal(peak, refined, sampling.spanDays))) return;
  const peak = describePeak(hunt, refined, trial, (signalToNoise) =>
    estimateTimingErrors(hunt.series, refined, signalToNoise, hunt.cadenceDays),
  );
  if (peak === undefined) return;
  hunt.rest = maskWork(hunt.rest, [peak], MASK_HALF_WIDTH);
  found.push({ peak, relatives: [], rest: found.length === 0 ? hunt.rest : undefined });
}

function isKnown({ found, sampling }: Hunt, candidate: Ephemeris): boolean {
  const { spanDays } = sampling;
  return found.some(
    ({ peak, relatives }) =>
      isSameSignal(peak, candidate, spanDays) || relatives.some((other) => isSameSignal(other, candidate, spanDays)),
  );
}

/** Under the signal whose points it needs most. */
function addRelative(hunt: Hunt, trial: number, candidate: Ephemeris): void {
  const { found, periodogram, sampling } = hunt;
  const signalToNoise = periodogram.signalToNoise[trial]!;
  const open = found.filter(
    ({ peak, relatives }) => relatives.length < MOST_RELATIVES && signalToNoise >= LEAST_RELATIVE * peak.signalToNoise,
  );
  if (open.length === 0) return;
  const shares = found.map((one) => keptPart(restOf(hunt, one), candidate, signalToNoise));
  const owner = found[shares.indexOf(Math.min(...shares))]!;
  if (!open.includes(owner)) return;
  const { cadenceDays } = hunt;
  const peak = describePeak(hunt, candidate, trial, (own) =>
    roughTimingErrors(candidate, own, { cadenceDays, spanDays: sampling.spanDays }),
  );
  if (peak === undefined) return;
  const lost = `Without the events of ${Number(owner.peak.periodDays.toPrecision(6))} d its S/N falls from ${peak.signalToNoise.toFixed(1)} to ${(Math.max(0, Math.min(...shares)) * signalToNoise).toFixed(1)}.`;
  const related = relatePeriods(owner.peak, candidate, sampling);
  owner.relatives.push({
    ...peak,
    relation: related?.relation ?? 'same events',
    reason: related === undefined ? lost : `${related.reason} ${lost}`,
  });
}

function restOf({ work }: Hunt, one: Found): BoxWork {
  one.rest ??= maskWork(work, [one.peak], MASK_HALF_WIDTH);
  return one.rest;
}

function ephemerisAt({ periods, epochDays, durationDays }: Periodogram, trial: number): Ephemeris {
  return { periodDays: periods[trial]!, epochDays: epochDays[trial]!, durationDays: durationDays[trial]! };
}

function reachOf(periods: Float64Array, trial: number): { from: number; to: number } {
  const own = periods[trial]!;
  return { from: periods[trial - 1] ?? own, to: periods[trial + 1] ?? own };
}

/** The part of a candidate's S/N that a thinned series keeps. */
function keptPart(work: BoxWork, candidate: Ephemeris, signalToNoise: number): number {
  return (measureEvents(work, candidate)?.signalToNoise ?? 0) / signalToNoise;
}

function describePeak(
  { work, periodogram, noise }: Hunt,
  ephemeris: Ephemeris,
  trial: number,
  errorsOf: (signalToNoise: number) => TimingErrors,
): BoxPeak | undefined {
  const measure = measureEvents(work, ephemeris);
  if (measure === undefined || !(measure.signalToNoise > 0)) return undefined;
  const { depth, depthError, signalToNoise, eventCount } = measure;
  const sigma = correlatedSigmaAt(noise, ephemeris.durationDays);
  return {
    ...ephemeris,
    ...errorsOf(signalToNoise),
    boxDepth: depth,
    boxDepthError: depthError,
    signalToNoise,
    correlatedSignalToNoise: correlatedSignalToNoise(depth, depthError, sigma, eventCount),
    sde: periodogram.sde[trial]!,
    levelledEfficiency: periodogram.levelledEfficiency[trial]!,
    eventCount,
    pointsInEvents: measure.pointsInside,
  };
}
