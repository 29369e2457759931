import { cycleOf, type Ephemeris } from './ephemeris.ts';

export interface BoxMeasure {
  /** Relative, positive for a dip: weighted mean outside minus weighted mean inside. */
  readonly depth: number;
  readonly depthError: number;
  readonly signalToNoise: number;
  readonly pointsInside: number;
  readonly eventCount: number;
}

/**
 * Two-level weighted least squares: the mean flux inside the box of each event against the mean outside.
 * The error is from white noise, sqrt(1/W_in + 1/W_out) with W the sum of 1/error^2.
 *
 * @param time days, length n; @param flux relative, length n; @param error one sigma of flux, length n
 * @returns undefined when no point lies inside, or none outside
 * Source: Kovács, Zucker & Mazeh (2002), A&A 391, 369, section 2 (depth = s/(r(1-r)), here with free weights).
 */
export function measureBox(
  time: Float64Array,
  flux: Float64Array,
  error: Float64Array,
  ephemeris: Ephemeris,
): BoxMeasure | undefined {
  const { periodDays, epochDays, durationDays } = ephemeris;
  const half = durationDays / 2;
  let weightIn = 0;
  let weightOut = 0;
  let sumIn = 0;
  let sumOut = 0;
  let pointsInside = 0;
  let eventCount = 0;
  let lastCycle = Number.NaN;
  for (let i = 0; i < time.length; i += 1) {
    const cycle = cycleOf(time[i]!, periodDays, epochDays);
    const weight = 1 / (error[i]! * error[i]!);
    // Flux is held against 1 so that the sums keep the digits of a shallow dip.
    const residual = weight * (flux[i]! - 1);
    if (Math.abs(time[i]! - epochDays - cycle * periodDays) > half) {
      weightOut += weight;
      sumOut += residual;
      continue;
    }
    weightIn += weight;
    sumIn += residual;
    pointsInside += 1;
    if (cycle !== lastCycle) eventCount += 1;
    lastCycle = cycle;
  }
  if (pointsInside === 0 || pointsInside === time.length) return undefined;
  const depth = sumOut / weightOut - sumIn / weightIn;
  const depthError = Math.sqrt(1 / weightIn + 1 / weightOut);
  return { depth, depthError, signalToNoise: depth / depthError, pointsInside, eventCount };
}
