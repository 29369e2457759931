import type { PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { DetrendKind } from '../../src/core/recipe.ts';
import { detrenderOf } from './detrend/detrenders.ts';
import type { Detrender } from './detrend/trend-input.ts';

/** A window under so many durations follows a dip: Hippke et al. (2019), AJ 158, 143. */
const LEAST_DURATIONS = 3;

/** Why a trend cannot be found with this window, if so. */
export function findWindowProblem({ recipe }: PrepareJob, cadenceDays: number): string | undefined {
  const { scaleDays, scaleName, leastCadences } = detrenderOf(recipe.detrend) as Detrender<DetrendKind>;
  const days = scaleDays(recipe.detrend);
  const least = leastCadences(recipe.detrend);
  if (days === undefined || (days >= least * cadenceDays && days > 0)) return undefined;
  return `The detrending ${scaleName} of ${days} d is shorter than ${least} cadences (${Number((least * cadenceDays).toPrecision(3))} d).`;
}

/** A sentence for each known event that the window is short against. */
export function warnOfWindow({ recipe, protectedEvents, protectedIntervals }: PrepareJob): readonly string[] {
  const { scaleDays, scaleName } = detrenderOf(recipe.detrend) as Detrender<DetrendKind>;
  const days = scaleDays(recipe.detrend);
  if (days === undefined) return [];
  const events = [
    ...protectedEvents.map(({ periodDays, durationDays }) => ({ at: describeDays(periodDays), durationDays })),
    ...protectedIntervals.map(({ start, end }) => ({
      at: `time ${describeDays((start + end) / 2)}`,
      durationDays: end - start,
    })),
  ];
  return events
    .filter(({ durationDays }) => durationDays > 0 && days < LEAST_DURATIONS * durationDays)
    .map(
      ({ at, durationDays }) =>
        `The ${scaleName} of ${days} d is ${(days / durationDays).toFixed(1)} durations of the event at ${at}: under ${LEAST_DURATIONS} a trend follows the event where it has weight, and is poorly held where it has none.`,
    );
}

const describeDays = (days: number): string => `${Number(days.toPrecision(5))} d`;
