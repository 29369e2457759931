/** Times of events that may be spaced by whole multiples of one period. */
export interface PeriodFit {
  readonly periodDays: number;
  readonly epochDays: number;
}

/** How far an event may stand from its predicted time, in durations, and still count as fitting. */
const TOLERANCE_DURATIONS = 0.5;
/** An event lasts at most this fraction of its period; with shorter periods any times would fit. */
const MOST_DUTY_CYCLE = 0.25;

/**
 * The longest period of which all given mid-event times are whole cycles, to half a duration, by a least-squares
 * line through (cycle, time). Shorter periods (its whole fractions) fit as well: the data must rule those out.
 *
 * @param times days, any order, at least two; @param durationDays of one event
 * @returns undefined for fewer than two separate times, or when no period fits
 */
export function fitPeriodToTimes(times: readonly number[], durationDays: number): PeriodFit | undefined {
  const sorted = [...times].sort((a, b) => a - b);
  const spacings = sorted.slice(1).map((time, i) => time - sorted[i]!);
  const shortest = Math.min(...spacings);
  if (spacings.length === 0 || !(shortest > durationDays * TOLERANCE_DURATIONS)) return undefined;
  const mostCycles = Math.floor((shortest * MOST_DUTY_CYCLE) / durationDays);
  for (let cycles = 1; cycles <= mostCycles; cycles += 1) {
    const fit = fitLine(sorted, shortest / cycles);
    if (fit !== undefined && worstResidual(sorted, fit) <= durationDays * TOLERANCE_DURATIONS) return fit;
  }
  return undefined;
}

function fitLine(times: readonly number[], roughPeriod: number): PeriodFit | undefined {
  const first = times[0]!;
  const cycles = times.map((time) => Math.round((time - first) / roughPeriod));
  const meanCycle = mean(cycles);
  const meanTime = mean(times);
  let covariance = 0;
  let variance = 0;
  for (let i = 0; i < times.length; i += 1) {
    covariance += (cycles[i]! - meanCycle) * (times[i]! - meanTime);
    variance += (cycles[i]! - meanCycle) ** 2;
  }
  if (variance === 0) return undefined;
  const periodDays = covariance / variance;
  return { periodDays, epochDays: meanTime - meanCycle * periodDays };
}

function worstResidual(times: readonly number[], { periodDays, epochDays }: PeriodFit): number {
  const residuals = times.map((time) => {
    const cycles = (time - epochDays) / periodDays;
    return Math.abs(cycles - Math.round(cycles)) * periodDays;
  });
  return Math.max(...residuals);
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
