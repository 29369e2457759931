import { failed, type Outcome } from '../../src/contract/outcome.ts';
import type { ResolvedBoxSettings, SearchSeries } from '../../src/contract/search-contract.ts';
import type { BoxSearchSettings } from '../../src/core/box-search-settings.ts';
import { median } from '../../src/core/robust-statistics.ts';
import {
  chooseDurations,
  type DurationLimits,
  type DurationRange,
  durationBounds,
  LARGEST_DUTY_CYCLE,
  LEAST_CADENCES,
  sensibleDurations,
} from './box-durations.ts';
import { countTrials, makePeriodGrid, ROCHE_PERIOD_DAYS, surfacePeriodDays } from './period-grid.ts';

const LEAST_POINTS = 10;
const MOST_STEPS = 4000;
/** About half a gigabyte of results: beyond it the settings are a slip. */
const MOST_TRIALS = 4_000_000;

/** A search with nothing left open: equal series and settings give an equal plan in every worker. */
export interface BoxPlan {
  readonly resolved: ResolvedBoxSettings;
  /** Days, ascending. */
  readonly periods: Float64Array;
  /** Days, ascending. */
  readonly durations: Float64Array;
  rangeAt(periodDays: number, into: DurationRange): void;
}

/**
 * Chooses what the settings leave open: the shortest period is the Roche limit of a rocky body (5.4 h), or the
 * orbit at the star's surface where that is longer, and never under eight cadences; the longest is half the span, so
 * that there can be two events.
 */
export function planBoxSearch(series: SearchSeries, settings: BoxSearchSettings): Outcome<BoxPlan> {
  const { time } = series;
  if (time.length < LEAST_POINTS)
    return failed(`A box search needs at least ${LEAST_POINTS} points; this series has ${time.length}.`);
  const spanDays = time.at(-1)! - time[0]!;
  const cadenceDays = median(positiveSteps(time));
  const problem = findSettingsProblem(settings) ?? (spanDays > 0 ? undefined : 'All points have the same time.');
  if (problem !== undefined) return failed(problem);
  const limits = { densityCgs: settings.densityCgs, cadenceDays };
  const range: PlannedRange = {
    ...limits,
    shortestPeriodDays: settings.shortestPeriodDays ?? defaultShortest(settings, cadenceDays),
    longestPeriodDays: settings.longestPeriodDays ?? spanDays / 2,
    spanDays,
    oversampling: settings.oversampling,
  };
  const contradiction = findContradiction(settings, range, cadenceDays);
  if (contradiction !== undefined) return failed(contradiction);
  return { kind: 'done', value: makePlan(range, settings, limits) };
}

interface PlannedRange {
  readonly shortestPeriodDays: number;
  readonly longestPeriodDays: number;
  readonly spanDays: number;
  readonly oversampling: number;
  readonly densityCgs: number | undefined;
}

function makePlan(
  range: PlannedRange,
  { durationsDays: given, objective, masked }: BoxSearchSettings,
  limits: DurationLimits,
): BoxPlan {
  const { shortestPeriodDays, longestPeriodDays, oversampling, densityCgs } = range;
  const periods = makePeriodGrid(range);
  const durations =
    given === undefined
      ? chooseDurations(shortestPeriodDays, longestPeriodDays, limits)
      : Float64Array.from(new Set(given)).sort();
  const anything: readonly [number, number] = [0, Number.POSITIVE_INFINITY];
  return {
    periods,
    durations,
    resolved: {
      shortestPeriodDays,
      longestPeriodDays,
      oversampling,
      trialCount: periods.length,
      durationsDays: [...durations],
      densityCgs,
      objective,
      round: masked.length + 1,
      maskedPoints: 0,
    },
    rangeAt: (periodDays, into) =>
      sensibleDurations(
        durations,
        periodDays,
        given === undefined ? durationBounds(periodDays, limits) : anything,
        into,
      ),
  };
}

function defaultShortest(settings: BoxSearchSettings, cadenceDays: number): number {
  const { densityCgs, durationsDays } = settings;
  const surface = densityCgs === undefined ? 0 : surfacePeriodDays(densityCgs);
  const shortestBox = durationsDays === undefined ? LEAST_CADENCES * cadenceDays : Math.min(...durationsDays);
  return Math.max(ROCHE_PERIOD_DAYS, surface, shortestBox / LARGEST_DUTY_CYCLE);
}

function findSettingsProblem(settings: BoxSearchSettings): string | undefined {
  const { shortestPeriodDays, longestPeriodDays, oversampling, densityCgs, durationsDays } = settings;
  const isBad = (value: number | undefined): boolean => value !== undefined && !(value > 0 && Number.isFinite(value));
  if (isBad(shortestPeriodDays))
    return `The shortest period must be a positive number of days, not ${shortestPeriodDays}.`;
  if (isBad(longestPeriodDays))
    return `The longest period must be a positive number of days, not ${longestPeriodDays}.`;
  if (isBad(oversampling)) return `The oversampling must be a positive number, not ${oversampling}.`;
  if (isBad(densityCgs)) return `The stellar density must be a positive number of g/cm³, not ${densityCgs}.`;
  if (durationsDays?.length === 0) return 'The list of durations is empty.';
  const wrong = durationsDays?.find(isBad);
  return wrong === undefined ? undefined : `Durations must be positive numbers of days, not ${wrong}.`;
}

function findContradiction(settings: BoxSearchSettings, range: PlannedRange, cadenceDays: number): string | undefined {
  const { shortestPeriodDays: shortest, longestPeriodDays: longest, spanDays } = range;
  if (longest > spanDays)
    return `The longest period (${days(longest)}) exceeds the ${days(spanDays)} that the data span.`;
  if (shortest >= longest)
    return settings.shortestPeriodDays === undefined && settings.longestPeriodDays === undefined
      ? `The data span ${days(spanDays)}: too short for two events of the shortest period that is searched (${days(shortest)}).`
      : `The shortest period (${days(shortest)}) is not below the longest (${days(longest)}).`;
  const leastBox =
    settings.durationsDays === undefined ? LEAST_CADENCES * cadenceDays : Math.min(...settings.durationsDays);
  if (leastBox > LARGEST_DUTY_CYCLE * shortest * (1 + 1e-12))
    return `The shortest box (${hours(leastBox)}) is longer than a quarter of the shortest period (${hours(shortest)}); search from ${days(leastBox / LARGEST_DUTY_CYCLE)} on.`;
  const trials = countTrials(range);
  if (trials > MOST_TRIALS)
    return `These settings ask for ${Math.round(trials / 1e6)} million trial periods, more than the ${MOST_TRIALS / 1e6} million that fit: raise the shortest period or lower the oversampling.`;
  return undefined;
}

const days = (value: number): string => `${Number(value.toPrecision(4))} d`;
const hours = (value: number): string => `${Number((value * 24).toPrecision(4))} h`;

/** Steps to the next point from up to some thousand places all over the series: enough for a median. */
function positiveSteps(time: Float64Array): Float64Array {
  const stride = Math.max(1, Math.floor(time.length / MOST_STEPS));
  const steps: number[] = [];
  for (let i = 1; i < time.length; i += stride) if (time[i]! > time[i - 1]!) steps.push(time[i]! - time[i - 1]!);
  return Float64Array.from(steps);
}
