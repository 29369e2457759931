import { cancelled, done, failed, type Outcome } from '../../../src/contract/outcome.ts';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import type { SinglePeriodJob, SinglePeriodResult } from '../../../src/contract/single-events-contract.ts';
import { SOLAR_DENSITY_CGS } from '../../../src/core/constants.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { ROCHE_PERIOD_DAYS } from '../period-grid.ts';
import { durationLogLikelihood, type TransitFacts } from './duration-likelihood.ts';
import { makeEventEvidence } from './event-evidence.ts';
import { type Survival, surviveAtPeriods } from './period-survival.ts';
import { selectUsablePoints, withoutEvents } from './usable-points.ts';

const CELLS = 2000;
/** The grid ends at so many spans, or a century where that is longer: beyond it the prior leaves next to nothing. */
const LONGEST_SPANS = 1000;
const LONGEST_DAYS = 36525;
/** An orbit is at least so many durations long: shorter ones would have to be inside the star. */
const SHORTEST_DURATIONS = 3;
/** No duration is taken as better known. */
const LEAST_DURATION_ERROR = 0.005;
/** Relative error of a density that comes without one. */
const TYPICAL_DENSITY_ERROR = 0.3;
/** Without a density: solar within a factor of 5, one sigma, from dwarfs of late type to subgiants. */
const UNKNOWN_DENSITY_LOG_ERROR = Math.log(5);
const TAKEN_OUT = 0.75;

/**
 * Posterior of the period of an event seen once. Per unit of ln P it is the product of
 * - a prior even in ln P;
 * - the density 1/P of an event at the time that was seen (phases are even): Kipping (2018), RNAAS 2, 223, who takes it
 *   with the chance that a window of length S holds one event alone, S/P; here each period's other events are asked of
 *   the data themselves instead;
 * - the chance to transit, R/a, P^(-2/3): with 1/P this makes the prior P^(-5/3) per ln P, P^(-8/3) per day;
 * - the likelihood of the duration, with the star's density and the impact parameter integrated out, eccentricity 0;
 * - 0 where the data show that another event is absent (`surviveAtPeriods`): the posterior has holes.
 * The density is log-normal with the given median; without an error 30 % is taken, and without a density the Sun's
 * within a factor of 5. An error of the duration under 0.5 % counts as 0.5 %.
 *
 * @returns days; where holes are narrower than a cell, the posterior there is that of the part that is left
 */
export async function findPeriodOfSingle(
  series: SearchSeries,
  job: Omit<SinglePeriodJob, 'jobId' | 'seriesId'>,
  checkpoint: Checkpoint,
): Promise<Outcome<SinglePeriodResult>> {
  const problem = findJobProblem(job);
  if (problem !== undefined) return failed(problem);
  const points = selectUsablePoints(series, 'The window of a single event');
  if (typeof points === 'string') return failed(points);
  const { durationDays } = job;
  const event = job.timeDays - points.anchorDays;
  const others = withoutEvents(points, [event], TAKEN_OUT * durationDays);
  const evidence = makeEventEvidence(others, job.depth, durationDays);
  const edges = makeEdges(durationDays, points.spanDays);
  const survival = await surviveAtPeriods(points.x, event, durationDays, evidence, edges, checkpoint);
  if (survival === undefined) return cancelled;
  const posterior = await weighCells(edges, survival, factsOf(job), checkpoint);
  if (posterior === undefined) return cancelled;
  return describePosterior(job, edges, posterior, survival);
}

/** Log-spaced edges of the cells, days. */
function makeEdges(durationDays: number, spanDays: number): Float64Array {
  const shortest = Math.max(SHORTEST_DURATIONS * durationDays, ROCHE_PERIOD_DAYS);
  const longest = Math.max(LONGEST_SPANS * spanDays, LONGEST_DAYS, 10 * shortest);
  return Float64Array.from({ length: CELLS + 1 }, (_, i) => shortest * (longest / shortest) ** (i / CELLS));
}

function factsOf(job: Omit<SinglePeriodJob, 'jobId' | 'seriesId'>): TransitFacts {
  const { durationDays, durationErrorDays, densityCgs, densityErrorCgs, depth } = job;
  const relativeError = densityErrorCgs === undefined ? TYPICAL_DENSITY_ERROR : densityErrorCgs / (densityCgs ?? 1);
  return {
    durationDays,
    durationLogError: Math.max(LEAST_DURATION_ERROR, durationErrorDays / durationDays),
    densityCgs: densityCgs ?? SOLAR_DENSITY_CGS,
    // Of a log-normal with that ratio of standard deviation to mean.
    densityLogError: densityCgs === undefined ? UNKNOWN_DENSITY_LOG_ERROR : Math.sqrt(Math.log1p(relativeError ** 2)),
    k: Math.sqrt(depth),
  };
}

const middleOf = (edges: Float64Array, cell: number): number => Math.sqrt(edges[cell]! * edges[cell + 1]!);

/** @returns posterior of each cell, highest 1; all 0 where nothing is possible; undefined when cancelled */
async function weighCells(
  edges: Float64Array,
  { chance }: Survival,
  facts: TransitFacts,
  checkpoint: Checkpoint,
): Promise<Float64Array | undefined> {
  const logs = new Float64Array(CELLS);
  for (let cell = 0; cell < CELLS; cell += 1) {
    const periodDays = middleOf(edges, cell);
    const possible = chance[cell]! > 0;
    logs[cell] = possible
      ? Math.log(chance[cell]!) + durationLogLikelihood(periodDays, facts) - Math.log(periodDays)
      : Number.NEGATIVE_INFINITY;
    if (checkpoint.isDue() && !(await checkpoint.pause(CELLS + cell, 2 * CELLS))) return undefined;
  }
  const most = logs.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  return logs.map((log) => (most === Number.NEGATIVE_INFINITY ? 0 : Math.exp(log - most)));
}

function describePosterior(
  { key }: Pick<SinglePeriodJob, 'key'>,
  edges: Float64Array,
  posterior: Float64Array,
  { shortestDays }: Survival,
): Outcome<SinglePeriodResult> {
  const quantile = readQuantiles(edges, posterior);
  if (quantile === undefined || shortestDays === undefined)
    return failed(
      'No period fits this duration, the density of the star and the data: check the duration, or leave the density out.',
    );
  if (posterior.at(-1) === 1)
    return failed(
      `This duration and the density of the star ask for a period beyond ${Math.round(edges.at(-1)! / 365.25)} years: check both, or leave the density out.`,
    );
  return done({
    key,
    periods: Float64Array.from({ length: CELLS }, (_, cell) => middleOf(edges, cell)),
    posterior,
    medianDays: quantile(0.5),
    lowDays: quantile(0.16),
    highDays: quantile(0.84),
    shortestDays,
  });
}

/** Periods below which a part of the posterior lies, even in ln P within a cell; undefined when there is none. */
function readQuantiles(edges: Float64Array, posterior: Float64Array): ((part: number) => number) | undefined {
  const total = posterior.reduce((sum, value) => sum + value, 0);
  if (!(total > 0)) return undefined;
  return (part) => {
    let left = part * total;
    let cell = 0;
    while (cell < CELLS - 1 && left > posterior[cell]!) {
      left -= posterior[cell]!;
      cell += 1;
    }
    return edges[cell]! * (edges[cell + 1]! / edges[cell]!) ** (left / posterior[cell]!);
  };
}

function findJobProblem(job: Omit<SinglePeriodJob, 'jobId' | 'seriesId'>): string | undefined {
  const { timeDays, durationDays, durationErrorDays, densityCgs, densityErrorCgs, depth } = job;
  if (!Number.isFinite(timeDays)) return 'The time of the event is not a number.';
  if (!(durationDays > 0 && Number.isFinite(durationDays)))
    return `The duration must be a positive number of days, not ${durationDays}.`;
  if (!(durationErrorDays >= 0 && Number.isFinite(durationErrorDays)))
    return `The error of the duration must be a number of days from 0 on, not ${durationErrorDays}.`;
  if (densityCgs !== undefined && !(densityCgs > 0 && Number.isFinite(densityCgs)))
    return `The stellar density must be a positive number of g/cm³, not ${densityCgs}.`;
  if (densityErrorCgs !== undefined && !(densityErrorCgs >= 0 && Number.isFinite(densityErrorCgs)))
    return `The error of the density must be a number of g/cm³ from 0 on, not ${densityErrorCgs}.`;
  if (!(depth > 0 && depth < 1)) return `The depth must lie between 0 and 1, not at ${depth}.`;
  return undefined;
}
