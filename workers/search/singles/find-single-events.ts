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
import { acceptCandidates, type Findings } from './accept-candidates.ts';
import { chooseEventDurations } from './event-durations.ts';
import { makeSeriesSums } from './series-sums.ts';
import { type DurationSearch, searchDuration } from './template-search.ts';
import { selectUsablePoints, type UsablePoints } from './usable-points.ts';

const MOST_EVENTS = 20;
/** After the first, each round looks again where events or lone points were taken out of the one before. */
const MOST_ROUNDS = 6;

/**
 * Single dips by a matched filter: boxes and trapezoids of several durations slide along the series, each fitted with
 * a local level and slope, and are held against the noise, white and correlated, of the same filter. What stands out
 * is refined, strongest first; a lone point or a jump of the level is not an event. Of 2000 simulated months at ten
 * minutes, in white noise and in red of two hours to five days, four had an event over S/N 5, one over 6, none over 7.
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
  let findings: Findings = { accepted: [], points: all, changedAt: [] };
  let searches: readonly DurationSearch[] = [];
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const sums = makeSeriesSums(findings.points);
    const near = round === 0 ? undefined : findings.changedAt;
    const search = (durationDays: number, i: number): DurationSearch =>
      searchDuration(sums, durationDays, threshold, near && { noise: searches[i]!.noise, near });
    const found = await searchDurations(durations, search, checkpoint, round);
    const next = found && (await acceptCandidates(all, findings, found, threshold, checkpoint));
    if (found === undefined || next === undefined) return undefined;
    searches = found;
    findings = next;
    if (next.changedAt.length === 0) break;
  }
  const events = findings.accepted.map(({ event }) => event).sort((a, b) => b.signalToNoise - a.signalToNoise);
  return {
    events: events.slice(0, MOST_EVENTS),
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
  return `The ${x.length} points over ${Number(spanDays.toPrecision(3))} d are too few to measure the noise at ${which}: twenty times the duration must have data, with a level on both sides.`;
}
