import { cancelled, done, failed, type Outcome } from '../../../src/contract/outcome.ts';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import type {
  CandidatePeriod,
  PeriodsFromTimesJob,
  PeriodsFromTimesResult,
} from '../../../src/contract/single-events-contract.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { ROCHE_PERIOD_DAYS } from '../period-grid.ts';
import { type EventEvidence, type MeasuredDepth, makeEventEvidence, measureMeanDepth } from './event-evidence.ts';
import { fitCycles, type TimedEvent } from './fit-cycles.ts';
import { judgePeriod } from './judge-period.ts';
import { selectUsablePoints, type UsablePoints, withoutEvents } from './usable-points.ts';

/** Where events follow one another by less than three durations there is no level between them. */
const SHORTEST_DURATIONS = 3;
/** Periods beneath this part of the heaviest one's weight are given up. */
const LEAST_RELATIVE_WEIGHT = 0.01;
/** No time is taken as better known than this part of the duration. */
const LEAST_ERROR_DURATIONS = 0.01;
/** Half-width, in durations, of what is taken out around a marked event before the others are asked for. */
const TAKEN_OUT = 0.75;
/** The marked events together must be deeper than so many errors from white noise. */
const LEAST_SIGNAL = 3;
const MOST_CYCLES = 200_000;
/**
 * A period is dropped unheard when it is this much worse than the best so far: eleven absent events, which eleven later
 * ones would have to outweigh.
 */
const HOPELESS = 200;
/**
 * Chance of a period before the data, for aliases of the same times, as a power of P. With periods spread evenly in
 * ln P, aliases are equally many a priori (each peak is as wide in ln P as the next); an event falls at the marked time
 * with density 1/P; and an orbit transits with probability R/a, P^(-2/3) by Kepler's third law. The two are those of
 * Kipping (2018), RNAAS 2, 223; whether other events are missing is asked of the data instead.
 */
export const PRIOR_EXPONENT = -5 / 3;

/**
 * The periods of which all marked times are whole cycles: (last - first)/n for n from 1 up to the shortest period, which
 * unless given is three durations, but at least the Roche limit of a rocky body. Each is weighed by
 * P^(-5/3) exp(-(chi-square of the times + what the data object to its other events)/2).
 *
 * @returns candidates over 1 % of the heaviest; epochs at the first marked event
 */
export async function findPeriodsFromTimes(
  series: SearchSeries,
  job: Omit<PeriodsFromTimesJob, 'jobId' | 'seriesId'>,
  checkpoint: Checkpoint,
): Promise<Outcome<PeriodsFromTimesResult>> {
  const problem = findJobProblem(job);
  if (problem !== undefined) return failed(problem);
  const points = selectUsablePoints(series, 'Weighing the periods of marked events');
  if (typeof points === 'string') return failed(points);
  const events = placeEvents(job, points);
  const times = events.map(({ time }) => time);
  const others = withoutEvents(points, times, TAKEN_OUT * job.durationDays);
  const measured = measureMeanDepth(points, times, job.durationDays);
  if (measured === undefined)
    return failed('No marked event holds two points with a level beside them, so its depth cannot be measured.');
  if (!(measured.depth > LEAST_SIGNAL * measured.error)) return failed(describeShallow(measured));
  const evidence = makeEventEvidence(others, measured.depth, job.durationDays);
  const weighed = await weighPeriods(job, points, events, evidence, checkpoint);
  if (weighed === undefined) return cancelled;
  return done({ key: job.key, ...selectSurvivors(weighed), depth: measured.depth });
}

function describeShallow({ depth, error }: MeasuredDepth): string {
  const ppm = (value: number): number => Math.round(value * 1e6);
  return `The marked events are ${ppm(depth)} ± ${ppm(error)} ppm deep together: too little to tell whether others are missing. Mark them more closely, or give the period by hand.`;
}

function placeEvents(
  { times, durationDays }: Pick<PeriodsFromTimesJob, 'times' | 'durationDays'>,
  points: UsablePoints,
) {
  return times
    .map(
      ({ timeDays, errorDays }): TimedEvent => ({
        time: timeDays - points.anchorDays,
        errorDays: Math.max(errorDays, LEAST_ERROR_DURATIONS * durationDays),
      }),
    )
    .sort((a, b) => a.time - b.time);
}

interface WeighedPeriod {
  /** -2 ln of the weight, up to a constant. */
  readonly score: number;
  readonly candidate: Omit<CandidatePeriod, 'weight'>;
}

async function weighPeriods(
  job: Omit<PeriodsFromTimesJob, 'jobId' | 'seriesId'>,
  points: UsablePoints,
  events: readonly TimedEvent[],
  evidence: EventEvidence,
  checkpoint: Checkpoint,
): Promise<WeighedPeriod[] | undefined> {
  const most = countCycles(job);
  const weighed: WeighedPeriod[] = [];
  let best = Number.POSITIVE_INFINITY;
  for (let cycles = 1; cycles <= most; cycles += 1) {
    const one = weighPeriod(job, points, events, evidence, cycles, best + HOPELESS);
    if (one !== undefined) {
      weighed.push(one);
      best = Math.min(best, one.score);
    }
    if (checkpoint.isDue() && !(await checkpoint.pause(cycles, most))) return undefined;
  }
  return weighed;
}

/** @returns undefined when the times do not fit */
function weighPeriod(
  { durationDays, timingVariationDays }: Pick<PeriodsFromTimesJob, 'durationDays' | 'timingVariationDays'>,
  points: UsablePoints,
  events: readonly TimedEvent[],
  evidence: EventEvidence,
  cycles: number,
  worstScore: number,
): WeighedPeriod | undefined {
  const roughPeriod = (events.at(-1)!.time - events[0]!.time) / cycles;
  const line = fitCycles(events, roughPeriod, timingVariationDays);
  if (line === undefined) return undefined;
  const before = line.chiSquare - 2 * PRIOR_EXPONENT * Math.log(line.periodDays);
  const verdict = judgePeriod(points.x, evidence, line, durationDays, timingVariationDays, worstScore - before);
  return {
    score: before + verdict.deltaChiSquare,
    candidate: {
      periodDays: line.periodDays,
      periodErrorDays: line.periodErrorDays,
      epochDays: points.anchorDays + line.epoch,
      ...verdict,
    },
  };
}

function selectSurvivors(weighed: readonly WeighedPeriod[]): Pick<PeriodsFromTimesResult, 'candidates' | 'considered'> {
  const best = weighed.reduce((least, { score }) => Math.min(least, score), Number.POSITIVE_INFINITY);
  const relative = weighed.map(({ score }) => Math.exp((best - score) / 2));
  const total = relative.reduce((sum, weight) => sum + weight, 0);
  const candidates = weighed
    .map(({ candidate }, i) => ({ ...candidate, weight: relative[i]! / total }))
    .filter((_, i) => relative[i]! > LEAST_RELATIVE_WEIGHT)
    .sort((a, b) => b.weight - a.weight);
  return { candidates, considered: weighed.length };
}

/** Cycles between the first and the last time at the shortest period. */
function countCycles({
  times,
  durationDays,
  shortestPeriodDays,
}: Pick<PeriodsFromTimesJob, 'times' | 'durationDays' | 'shortestPeriodDays'>): number {
  const all = times.map(({ timeDays }) => timeDays);
  const distance = Math.max(...all) - Math.min(...all);
  const shortest = shortestPeriodDays ?? Math.max(SHORTEST_DURATIONS * durationDays, ROCHE_PERIOD_DAYS);
  // A hair, so that a period given as an exact fraction is among them.
  return Math.floor((distance / shortest) * (1 + 1e-9));
}

function findJobProblem(job: Omit<PeriodsFromTimesJob, 'jobId' | 'seriesId'>): string | undefined {
  const { times, durationDays, shortestPeriodDays, timingVariationDays } = job;
  if (times.some(({ timeDays, errorDays }) => !(Number.isFinite(timeDays) && Number.isFinite(errorDays))))
    return 'A marked time, or its error, is not a number.';
  if (new Set(times.map(({ timeDays }) => timeDays)).size < 2)
    return 'A period needs at least two events at different times.';
  if (!(durationDays > 0 && Number.isFinite(durationDays)))
    return `The duration must be a positive number of days, not ${durationDays}.`;
  if (!(timingVariationDays >= 0 && Number.isFinite(timingVariationDays)))
    return `The allowed timing variation must be a number of days from 0 on, not ${timingVariationDays}.`;
  if (shortestPeriodDays !== undefined && !(shortestPeriodDays > 0))
    return `The shortest period must be a positive number of days, not ${shortestPeriodDays}.`;
  if (countCycles(job) > MOST_CYCLES)
    return `More than ${MOST_CYCLES} periods would have to be weighed: raise the shortest period.`;
  return undefined;
}
