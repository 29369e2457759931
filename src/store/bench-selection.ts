import type { LombScargleResult } from '../contract/lomb-scargle-contract.ts';
import type { PreparedSeries } from '../contract/prepare-contract.ts';
import type { BoxSearchResult, FalseAlarmResult } from '../contract/search-contract.ts';
import type { SingleEventsResult } from '../contract/single-events-contract.ts';
import type { Ephemeris } from '../core/ephemeris.ts';
import type { Case, SessionDocument, Target } from '../session/document.ts';
import type { LightCurveRead, ResultsState, RunningJob } from './results-store.ts';
import { falseAlarmKey, lightCurveKey, preparedKey, searchKey, sinesKey, singlesKey } from './target-keys.ts';
import type { ViewState } from './view-store.ts';

/** Everything that belongs to what is on the screen now; results only where their key is that of the inputs shown. */
export interface BenchSelection {
  readonly target: Target | undefined;
  readonly case: Case | undefined;
  /** What the fold shows: the case's period, or the trial. */
  readonly ephemeris: Ephemeris | undefined;
  readonly lightCurve: LightCurveRead | undefined;
  readonly prepared: PreparedSeries | undefined;
  readonly search: BoxSearchResult | undefined;
  readonly sines: LombScargleResult | undefined;
  readonly singles: SingleEventsResult | undefined;
  readonly falseAlarm: FalseAlarmResult | undefined;
  readonly running: RunningJob | undefined;
  readonly runningSines: RunningJob | undefined;
  readonly runningFalseAlarm: RunningJob | undefined;
  readonly searchKey: string | undefined;
  readonly searchCancelled: boolean;
  /** Why there is no prepared series, or no search. */
  readonly failure: string | undefined;
}

export function selectBench(
  document: SessionDocument | undefined,
  view: Pick<ViewState, 'targetId' | 'caseId' | 'trial' | 'aliasPeriodDays'>,
  results: ResultsState,
): BenchSelection {
  const target = document?.targets.find(({ id }) => id === view.targetId);
  if (target === undefined) return NOTHING;
  const keys = { read: lightCurveKey(target), prepared: preparedKey(target), search: searchKey(target) };
  const chosen = target.cases.find(({ id }) => id === view.caseId);
  const prepared = results.prepared.get(keys.prepared);
  return {
    target,
    case: chosen,
    ephemeris: chosen === undefined ? view.trial : ephemerisOf(chosen, prepared, view.aliasPeriodDays),
    lightCurve: results.lightCurves.get(keys.read),
    prepared,
    search: results.searches.get(keys.search),
    running: results.running.get(keys.search),
    sines: results.sines.get(sinesKey(target)),
    singles: results.singles.get(singlesKey(target)),
    falseAlarm: results.falseAlarms.get(falseAlarmKey(target)),
    runningSines: results.running.get(sinesKey(target)),
    runningFalseAlarm: results.running.get(falseAlarmKey(target)),
    searchKey: keys.search,
    searchCancelled: results.cancelledKeys.has(keys.search),
    failure:
      results.failures.get(keys.read) ?? results.failures.get(keys.prepared) ?? results.failures.get(keys.search),
  };
}

const NOTHING: BenchSelection = {
  target: undefined,
  case: undefined,
  ephemeris: undefined,
  lightCurve: undefined,
  prepared: undefined,
  search: undefined,
  sines: undefined,
  singles: undefined,
  falseAlarm: undefined,
  runningSines: undefined,
  runningFalseAlarm: undefined,
  running: undefined,
  searchKey: undefined,
  searchCancelled: false,
  failure: undefined,
};

/** How a case is folded: a single event about itself, over a "period" longer than the series so that it never wraps. */
export function ephemerisOf(
  { timing }: Pick<Case, 'timing'>,
  prepared: Pick<PreparedSeries, 'spanDays'> | undefined,
  aliasPeriodDays?: number,
): Ephemeris | undefined {
  const { durationDays } = timing;
  switch (timing.kind) {
    case 'linear':
      return { periodDays: timing.periodDays, epochDays: timing.epochDays, durationDays };
    case 'single':
      return { periodDays: 2 * (prepared?.spanDays ?? 1) + 1, epochDays: timing.timeDays, durationDays };
    case 'alias set':
      return { periodDays: aliasPeriodDays ?? heaviest(timing.periods), epochDays: timing.epochDays, durationDays };
    default:
      return undefined;
  }
}

function heaviest(periods: readonly { readonly periodDays: number; readonly weight: number }[]): number {
  return periods.reduce((best, period) => (period.weight > best.weight ? period : best)).periodDays;
}
