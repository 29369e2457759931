import type { BoxSignal, CorrelatedNoise } from '../../src/contract/search-contract.ts';
import { correlatedSigmaAt, correlatedSignalToNoise } from '../../src/core/correlated-noise.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import type { BoxMeasure } from '../../src/core/measure-box.ts';
import { isSameSignal } from '../../src/core/same-signal.ts';
import { type BoxWork, makeTrialBox, searchTrial } from './box-search.ts';
import { maskWork, measureEvents } from './event-sums.ts';
import { MASK_HALF_WIDTH } from './mask-signals.ts';

/** Odd and even depths that differ by more, in their common error, are two stars' (a threshold of our own). */
const ODD_EVEN_SIGMA = 4;
/** A second dip at the same period must stand out from correlated noise by this, some dozens of phases being tried. */
const SECONDARY_SIGMA = 6;
/** Nor is a difference of a few parts in a hundred a second star's, whatever its error. */
const LEAST_DIFFERENCE = 0.05;
const BINS_PER_BOX = 10;

/**
 * Why another round of the search should wait: the strongest signal shows what two stars eclipsing would show, so that
 * what is found next may be their secondary and not a second planet. Undefined: nothing of the kind is seen.
 */
export function findHoldBack(work: BoxWork, signals: readonly BoxSignal[], noise: CorrelatedNoise): string | undefined {
  const [main, second] = signals;
  if (main === undefined) return undefined;
  return describeOddEven(work, main, noise) ?? describeSecondary(work, main, noise) ?? describeTwin(work, main, second);
}

function describeOddEven(work: BoxWork, main: BoxSignal, noise: CorrelatedNoise): string | undefined {
  const { periodDays, epochDays, durationDays } = main;
  const everySecond = { periodDays: 2 * periodDays, durationDays };
  // Each is held against flux outside both.
  const one = measureAlone(work, { ...everySecond, epochDays }, { ...everySecond, epochDays: epochDays + periodDays });
  const other = measureAlone(
    work,
    { ...everySecond, epochDays: epochDays + periodDays },
    { ...everySecond, epochDays },
  );
  if (one === undefined || other === undefined || one.eventCount < 2 || other.eventCount < 2) return undefined;
  const sigma = correlatedSigmaAt(noise, durationDays);
  const errorOf = ({ depthError, eventCount }: BoxMeasure) => Math.hypot(depthError, sigma / Math.sqrt(eventCount));
  const difference = Math.abs(one.depth - other.depth);
  const significance = difference / Math.hypot(errorOf(one), errorOf(other));
  const part = difference / Math.max(one.depth, other.depth);
  if (significance < ODD_EVEN_SIGMA || part < LEAST_DIFFERENCE) return undefined;
  return `Every other event of ${days(periodDays)} is ${Math.round(part * 100)} % shallower (${significance.toFixed(1)} σ), as of two unlike stars at ${days(2 * periodDays)}: what the next round finds may be their other eclipse.`;
}

function measureAlone(work: BoxWork, own: Ephemeris, other: Ephemeris): BoxMeasure | undefined {
  return measureEvents(maskWork(work, [other], MASK_HALF_WIDTH), own);
}

/** The deepest other box of the same duration at the same period. */
function describeSecondary(work: BoxWork, main: BoxSignal, noise: CorrelatedNoise): string | undefined {
  const rest = maskWork(work, [main], MASK_HALF_WIDTH);
  if (!(rest.totalWeight > 0)) return undefined;
  const best = makeTrialBox();
  const durations = Float64Array.of(main.durationDays);
  searchTrial(rest, main.periodDays, durations, { first: 0, last: 0 }, best, BINS_PER_BOX);
  if (best.signalToNoise === 0) return undefined;
  const ephemeris = { periodDays: main.periodDays, epochDays: best.epochDays, durationDays: best.durationDays };
  const box = measureEvents(rest, ephemeris);
  if (box === undefined || box.eventCount < 2) return undefined;
  const sigma = correlatedSigmaAt(noise, main.durationDays);
  const significance = correlatedSignalToNoise(box.depth, box.depthError, sigma, box.eventCount);
  if (significance < SECONDARY_SIGMA) return undefined;
  const cycles = (best.epochDays - main.epochDays) / main.periodDays;
  const phase = cycles - Math.floor(cycles);
  return `At the period of ${days(main.periodDays)} there is a second dip at phase ${phase.toFixed(2)}, ${Math.round(box.depth * 1e6)} ppm deep (${significance.toFixed(1)} σ): a binary's secondary is not a second planet.`;
}

function describeTwin(work: BoxWork, main: BoxSignal, second: BoxSignal | undefined): string | undefined {
  if (second === undefined) return undefined;
  const spanDays = work.elapsed[work.weight.length - 1]!;
  const ratio = [0.5, 2].find((factor) =>
    isSameSignal({ ...main, periodDays: main.periodDays * factor }, second, spanDays),
  );
  return ratio === undefined || second.signalToNoise < SECONDARY_SIGMA
    ? undefined
    : `The second signal has ${ratio === 2 ? 'twice' : 'half'} the period of ${days(main.periodDays)} and other times: eclipses of two stars look so.`;
}

const days = (value: number): string => `${Number(value.toPrecision(6))} d`;
