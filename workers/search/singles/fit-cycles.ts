/** Mid-time of an event, days, and its error. */
export interface TimedEvent {
  readonly time: number;
  readonly errorDays: number;
}

/** A straight line of times against cycles, the first event being cycle 0. */
export interface CycleLine {
  readonly cycles: readonly number[];
  readonly periodDays: number;
  readonly periodErrorDays: number;
  /** Time of cycle 0. */
  readonly epoch: number;
  /** By how much the times stray beyond what they may, in squares of their errors. */
  readonly chiSquare: number;
  /** One sigma of the time of a cycle, days. */
  predictionError(cycle: number): number;
}

/** Times must lie within so many of their errors, beyond the variation that is allowed. */
const MOST_SIGMA = 3;

/**
 * Weighted least squares of epoch and period through the times, each with the variance error^2 + variation^2 / 3: its
 * own, and that of an event which may stray evenly by as much as `variationDays`.
 *
 * @param events ascending in time; @param roughPeriod days, gives each its cycle
 * @returns undefined when two of them have the same cycle, or one strays by over three errors more than is allowed
 */
export function fitCycles(
  events: readonly TimedEvent[],
  roughPeriod: number,
  variationDays: number,
): CycleLine | undefined {
  const cycles = events.map(({ time }) => Math.round((time - events[0]!.time) / roughPeriod));
  if (cycles.some((cycle, i) => i > 0 && cycle === cycles[i - 1])) return undefined;
  const weights = events.map(({ errorDays }) => 1 / (errorDays ** 2 + variationDays ** 2 / 3));
  const total = sumOf(weights);
  const meanCycle = sumOf(cycles.map((cycle, i) => weights[i]! * cycle)) / total;
  const meanTime = sumOf(events.map(({ time }, i) => weights[i]! * time)) / total;
  const spread = sumOf(cycles.map((cycle, i) => weights[i]! * (cycle - meanCycle) ** 2));
  const products = events.map(({ time }, i) => weights[i]! * (cycles[i]! - meanCycle) * (time - meanTime));
  const periodDays = sumOf(products) / spread;
  const epoch = meanTime - meanCycle * periodDays;
  const strays = events.map(({ time, errorDays }, i) => {
    const residual = Math.abs(time - epoch - cycles[i]! * periodDays);
    return Math.max(0, residual - variationDays) / errorDays;
  });
  if (strays.some((stray) => stray > MOST_SIGMA)) return undefined;
  return {
    cycles,
    periodDays,
    periodErrorDays: Math.sqrt(1 / spread),
    epoch,
    chiSquare: sumOf(strays.map((stray) => stray * stray)),
    predictionError: (cycle) => Math.sqrt(1 / total + (cycle - meanCycle) ** 2 / spread),
  };
}

function sumOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0);
}
