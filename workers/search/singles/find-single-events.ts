import { cancelled, done, failed, type Outcome } from '../../../src/contract/outcome.ts';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import type {
  SingleEvent,
  SingleEventsJob,
  SingleEventsResult,
  SingleEventsSettings,
} from '../../../src/contract/single-events-contract.ts';
import type { Checkpoint } from '../../checkpoint.ts';
import { maskSignals } from '../mask-signals.ts';
import { type AcceptedEvent, acceptCandidates } from './accept-candidates.ts';
import { chooseEventDurations } from './event-durations.ts';
import { makeSeriesSums } from './series-sums.ts';
import { type DurationSearch, searchAgain, searchDuration } from './template-search.ts';
import { selectUsablePoints, type UsablePoints } from './usable-points.ts';

const MOST_EVENTS = 20;
/** After the first, each round looks at what the events found so far had hidden in their shoulders. */
const MOST_ROUNDS = 3;

/**
 * Single dips by a matched filter: boxes and trapezoids of several durations slide along the series, each fitted with
 * a local level and slope, and are held against the noise, white and correlated, of the same filter. What stands out
 * is refined, strongest first; a lone point or a jump of the level is not an event. Gaussian noise, white or red,
 * passes S/N 7 less than once in a thousand series.
 *
 * @returns times in the series' reference; depths relative; cancelled when the checkpoint says so
 */
export async function findSingleEvents(
  series: SearchSeries,
  { key, settings }: Omit<SingleEventsJob, 'jobId' | 'seriesId'>,
  checkpoint: Checkpoint,
): Promise<Outcome<SingleEventsResult>> {
  const problem = findSettingsProblem(settings);
  if (problem !== undefined) return failed(problem);
  const points = selectUsablePoints(maskSignals(series, settings.masked), 'A search for single events');
  if (typeof points === 'string') return failed(points);
  const durations = chooseEventDurations(points, settings.densityCgs, settings.durationsDays);
  const found = await searchRounds(points, durations, settings.threshold, checkpoint);
  if (found === undefined) return cancelled;
  if (found.durationsDays.length === 0) return failed(describeTooShort(points, settings));
  return done({ key, events: found.events, durationsDays: found.durationsDays });
}

interface Found {
  readonly events: SingleEvent[];
  /** Those whose noise could be measured. */
  readonly durationsDays: number[];
}

async function searchRounds(
  all: UsablePoints,
  durations: readonly number[],
  threshold: number,
  checkpoint: Checkpoint,
): Promise<Found | undefined> {
  let accepted: AcceptedEvent[] = [];
  let points = all;
  let near: readonly number[] | undefined;
  let searches: readonly DurationSearch[] = [];
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const sums = makeSeriesSums(points);
    const search = (durationDays: number, i: number): DurationSearch =>
      near === undefined
        ? searchDuration(sums, durationDays, threshold)
        : searchAgain(sums, searches[i]!, threshold, near);
    const found = await searchDurations(durations, search, checkpoint, round);
    if (found === undefined) return undefined;
    const next = acceptCandidates(all, points, found, threshold, accepted);
    searches = found;
    accepted = next.accepted;
    points = next.points;
    near = next.changedAt;
    if (near.length === 0) break;
  }
  const strongest = accepted.map(({ event }) => event).sort((a, b) => b.signalToNoise - a.signalToNoise);
  return {
    events: strongest.slice(0, MOST_EVENTS),
    durationsDays: searches.filter(({ noise }) => noise !== undefined).map(({ durationDays }) => durationDays),
  };
}

async function searchDurations(
  durations: readonly number[],
  search: (durationDays: number, i: number) => DurationSearch,
  checkpoint: Checkpoint,
  round: number,
): Promise<DurationSearch[] | undefined> {
  const searches: DurationSearch[] = [];
  for (const [i, durationDays] of durations.entries()) {
    searches.push(search(durationDays, i));
    const progress = round * durations.length + i + 1;
    if (checkpoint.isDue() && !(await checkpoint.pause(progress, MOST_ROUNDS * durations.length))) return undefined;
  }
  return searches;
}

function findSettingsProblem({ durationsDays, densityCgs, threshold }: SingleEventsSettings): string | undefined {
  const isBad = (value: number | undefined): boolean => value !== undefined && !(value > 0 && Number.isFinite(value));
  if (isBad(threshold)) return `The least S/N must be a positive number, not ${threshold}.`;
  if (isBad(densityCgs)) return `The stellar density must be a positive number of g/cm³, not ${densityCgs}.`;
  if (durationsDays?.length === 0) return 'The list of durations is empty.';
  const wrong = durationsDays?.find(isBad);
  return wrong === undefined ? undefined : `Durations must be positive numbers of days, not ${wrong}.`;
}

function describeTooShort({ spanDays, x }: UsablePoints, { durationsDays }: SingleEventsSettings): string {
  const which = durationsDays === undefined ? 'any duration that is searched' : 'any of the given durations';
  return `The ${x.length} points over ${Number(spanDays.toPrecision(3))} d are too few to measure the noise at ${which}: twelve times the duration must have data, with a level on both sides.`;
}
