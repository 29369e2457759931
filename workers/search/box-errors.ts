import type { SearchSeries } from '../../src/contract/search-contract.ts';
import { cycleOf, type Ephemeris } from '../../src/core/ephemeris.ts';
import { findEdgeGaps, findPeriodGap } from './box-gaps.ts';

/** Least ingress over duration, as nothing is known of it: a companion of a tenth of the star's radius, centrally. */
const INGRESS_FRACTION = 0.1;
/** Variance of the place of a step in Brownian motion with drift: Yao (1987), Ann. Stat. 15, 1321 (from memory). */
const STEP_PLACE_VARIANCE = 26;

export interface TimingErrors {
  /** Mid-event time at the mean cycle of the points in events, where it is uncorrelated with the period. */
  readonly epochDays: number;
  readonly epochErrorDays: number;
  readonly periodErrorDays: number;
}

/**
 * Errors of a box's timing from white noise, Q being its S/N and T its duration. The epoch's variance is the sum of
 * - T tau / (2 Q^2): a sloped ingress of length tau, Carter et al. (2008), ApJ 689, 499 (sigma of t_c); tau is taken as
 *   T / 10 and the cadence added in quadrature, since exposures smear it, but at most half of T;
 * - 26/2 T^2 / Q^4: where noise lets two sharp edges slide (Yao 1987), which rules at low Q;
 * - the variance of edges that may lie anywhere between the points that they part.
 * The period's error is the epoch's over the standard deviation of the cycle numbers of the points in events, as in a
 * least-squares line, and again what the sampling leaves open. A box of one event leaves the period unknown: the error is then the period itself.
 * The combination is our own; `test/search/peak-errors.test.ts` holds it against simulated scatter.
 */
export function estimateTimingErrors(
  series: Pick<SearchSeries, 'time'>,
  ephemeris: Ephemeris,
  signalToNoise: number,
  cadenceDays: number,
): TimingErrors {
  const { periodDays, epochDays, durationDays } = ephemeris;
  const { leading, trailing } = findEdgeGaps(series, ephemeris);
  const sampling = ((leading[1] - leading[0]) ** 2 + (trailing[1] - trailing[0]) ** 2) / 48;
  const epochErrorDays = Math.sqrt(epochNoiseVariance(durationDays, signalToNoise, cadenceDays) + sampling);
  const cycles = describeCycles(series.time, ephemeris);
  const [down, up] = findPeriodGap(series, ephemeris);
  const periodError = Math.hypot(epochErrorDays / cycles.deviation, (up - down) / Math.sqrt(12));
  return {
    epochDays: epochDays + Math.round(cycles.mean) * periodDays,
    epochErrorDays,
    periodErrorDays: cycles.deviation > 0 ? Math.min(periodDays, periodError) : periodDays,
  };
}

/** Of the epoch, from white noise alone: the first two terms above. */
export function epochNoiseVariance(durationDays: number, signalToNoise: number, cadenceDays: number): number {
  const tau = Math.min(durationDays / 2, Math.hypot(INGRESS_FRACTION * durationDays, cadenceDays));
  const ingress = (durationDays * tau) / (2 * signalToNoise ** 2);
  return ingress + (STEP_PLACE_VARIANCE / 2) * (durationDays / signalToNoise ** 2) ** 2;
}

/**
 * The same without a look at the points: for peaks that are only listed. Edges are taken to lie anywhere in a cadence,
 * and the events to be spread evenly over the span.
 */
export function roughTimingErrors(
  { periodDays, epochDays, durationDays }: Ephemeris,
  signalToNoise: number,
  { cadenceDays, spanDays }: { readonly cadenceDays: number; readonly spanDays: number },
): TimingErrors {
  const epochErrorDays = Math.sqrt(
    epochNoiseVariance(durationDays, signalToNoise, cadenceDays) + cadenceDays ** 2 / 24,
  );
  const deviation = spanDays / periodDays / Math.sqrt(12);
  return { epochDays, epochErrorDays, periodErrorDays: Math.min(periodDays, epochErrorDays / deviation) };
}

/** Mean and population standard deviation of the cycle numbers of the points inside events. */
function describeCycles(time: Float64Array, ephemeris: Ephemeris): { mean: number; deviation: number } {
  const { periodDays, epochDays, durationDays } = ephemeris;
  let n = 0;
  let mean = 0;
  let squares = 0;
  for (let i = 0; i < time.length; i += 1) {
    const cycle = cycleOf(time[i]!, periodDays, epochDays);
    if (Math.abs(time[i]! - epochDays - cycle * periodDays) > durationDays / 2) continue;
    n += 1;
    const delta = cycle - mean;
    mean += delta / n;
    squares += delta * (cycle - mean);
  }
  return n === 0 ? { mean: 0, deviation: 0 } : { mean, deviation: Math.sqrt(squares / n) };
}
