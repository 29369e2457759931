/** Scatter of means over a duration beyond what white noise leaves, relative flux, at some durations in days. */
export interface NoiseByDuration {
  readonly durationsDays: readonly number[];
  readonly sigma: readonly number[];
}

/** Linear in ln(duration) between the measured durations, flat beyond them; 0 where none was measured. */
export function correlatedSigmaAt({ durationsDays, sigma }: NoiseByDuration, durationDays: number): number {
  const after = durationsDays.findIndex((duration) => duration >= durationDays);
  if (after < 0) return sigma.at(-1) ?? 0;
  if (after === 0) return sigma[0]!;
  const [low, high] = [durationsDays[after - 1]!, durationsDays[after]!];
  const part = Math.log(durationDays / low) / Math.log(high / low);
  return sigma[after - 1]! + part * (sigma[after]! - sigma[after - 1]!);
}

/**
 * Depth over its error from white and correlated noise: the correlated part falls with the number of events only.
 *
 * @param depthError of the box from white noise, in the unit of depth, as is sigma
 * Source: Pont, Zucker & Queloz (2006), MNRAS 373, 231, eqs. 5-8, for events with equal numbers of points.
 */
export function correlatedSignalToNoise(depth: number, depthError: number, sigma: number, eventCount: number): number {
  return depth / Math.hypot(depthError, sigma / Math.sqrt(Math.max(1, eventCount)));
}
