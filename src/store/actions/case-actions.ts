import type { BoxPeak } from '../../contract/search-contract.ts';
import type { SinglePeriodResult } from '../../contract/single-events-contract.ts';
import type { Timing } from '../../core/ephemeris.ts';
import { measureBox } from '../../core/measure-box.ts';
import { shortestUnseenPeriod } from '../../core/shortest-unseen-period.ts';
import type { CaseNumbers, CaseOrigin, Mark, Target } from '../../session/document.ts';
import { type BenchSelection, ephemerisOf } from '../bench-selection.ts';
import { densityOf } from '../target-keys.ts';
import { FRESH_CASE_VIEW, type TrialSource } from '../view-store.ts';
import type { ActionKit } from './action-stores.ts';
import { numbersAt, numbersOfPeak } from './case-numbers.ts';

/** How far events may stray from strict periods when a period is sought from marks, in durations. */
const TIMING_VARIATION_DURATIONS = 0.25;
/** A hand-drawn mark tells its middle and its length to about this part of its length. */
const MARK_ACCURACY = 0.15;

const NO_PERIOD =
  'No period fits the marked dips and the data between them. Move or delete a mark, or make the case by hand.';

/** From signals, marks and numbers to cases. */
export function createCaseActions(kit: ActionKit) {
  const { view, bench, run, say, signals, newId } = kit;

  /** The analyst may have gone on to another target while the timing was computed: the case is made where it began. */
  function makeCase(target: Target, timing: Timing, origin: CaseOrigin, numbers: CaseNumbers | undefined): void {
    const caseId = newId();
    const made = run({ kind: 'make case', targetId: target.id, caseId, origin, timing, numbers });
    if (made && view.getState().targetId === target.id) view.setState({ ...FRESH_CASE_VIEW, caseId });
  }

  /** The trial becomes a case; taken unchanged from a peak or a single event it keeps that one's errors and numbers. */
  async function makeCaseFromTrial(): Promise<void> {
    const selection = bench();
    const { target } = selection;
    const { trial, trialSource } = view.getState();
    if (target === undefined || trial === undefined) return;
    if (trialSource?.kind === 'single event') {
      await makeSingleCase(selection, target, trial.epochDays, trial.durationDays, trialSource);
      return;
    }
    const peak = peakOf(selection, trialSource);
    if (peak === undefined)
      makeCase(target, { kind: 'linear', ...trial }, { kind: 'hand' }, numbersAt(selection, trial));
    else
      makeCase(
        target,
        timingOfPeak(peak.peak),
        peak.origin,
        numbersOfPeak(selection.search!, peak.peak, selection.falseAlarm),
      );
  }

  async function makeSingleCase(
    selection: BenchSelection,
    target: Target,
    timeDays: number,
    durationDays: number,
    origin: CaseOrigin,
  ): Promise<void> {
    const timing = await singleTiming(selection, target, timeDays, durationDays);
    makeCase(target, timing, origin, numbersOfTiming(selection, timing));
  }

  /** One marked dip makes a single-event case, several make a linear one or, where more periods fit, an alias set. */
  async function makeCaseFromMarks(): Promise<void> {
    const selection = bench();
    const { target } = selection;
    const marks = target?.marks.filter(({ kind }) => kind === 'dip') ?? [];
    if (target === undefined) return;
    if (marks.length === 0) {
      say('Mark one or more dips first: press M and drag over the strip.');
      return;
    }
    const origin: CaseOrigin = { kind: 'marks', markIds: marks.map(({ id }) => id) };
    const durationDays = marks.reduce((sum, { interval }) => sum + interval.end - interval.start, 0) / marks.length;
    if (marks.length === 1) {
      await makeSingleCase(selection, target, middleOf(marks[0]!), durationDays, origin);
      return;
    }
    const timing = await timingOfMarks(target, marks, durationDays);
    if (typeof timing === 'string') say(timing);
    else if (timing !== undefined) makeCase(target, timing, origin, numbersOfTiming(selection, timing));
  }

  async function timingOfMarks(
    target: Target,
    marks: readonly Mark[],
    durationDays: number,
  ): Promise<Timing | string | undefined> {
    const errorDays = durationDays * MARK_ACCURACY;
    const found = await signals.periodsFromTimes(target, {
      times: marks.map((mark) => ({ timeDays: middleOf(mark), errorDays })),
      durationDays,
      shortestPeriodDays: undefined,
      timingVariationDays: durationDays * TIMING_VARIATION_DURATIONS,
    });
    if (found.kind === 'cancelled') return undefined;
    if (found.kind === 'failed') return found.error.sentence;
    const [first, ...others] = found.value.candidates;
    if (first === undefined) return NO_PERIOD;
    const { epochDays, periodDays, periodErrorDays } = first;
    if (others.length === 0) return { kind: 'linear', periodDays, periodErrorDays, epochDays, durationDays };
    const periods = [first, ...others].map((one) => ({ periodDays: one.periodDays, weight: one.weight }));
    return { kind: 'alias set', epochDays, durationDays, periods };
  }

  /** A single event with what its duration, the star and the window say of the period. */
  async function singleTiming(
    { prepared }: BenchSelection,
    target: Target,
    timeDays: number,
    durationDays: number,
  ): Promise<Timing> {
    const timing = { kind: 'single', timeDays, durationDays } as const;
    if (prepared === undefined) return timing;
    const ephemeris = ephemerisOf({ timing }, prepared)!;
    const depth = measureBox(prepared.time, prepared.flux, prepared.error, ephemeris)?.depth;
    const period =
      depth === undefined || !(depth > 0) || prepared.fluxUnit === 'sigma'
        ? undefined
        : await signals.periodOfSingle(target, {
            timeDays,
            durationDays,
            durationErrorDays: durationDays * MARK_ACCURACY,
            densityCgs: densityOf(target),
            densityErrorCgs: target.star.densityErrorCgs,
            depth,
          });
    const known = period?.kind === 'done' ? period.value : undefined;
    if (period?.kind === 'failed') say(period.error.sentence);
    const shortest = known?.shortestDays ?? shortestUnseenPeriod(prepared.time, timeDays, durationDays);
    return { ...timing, shortestPeriodDays: shortest, ...likelyPeriods(known) };
  }

  async function makeCaseByHand(timing: Timing): Promise<void> {
    const selection = bench();
    const { target } = selection;
    if (target === undefined) return;
    const origin = { kind: 'hand' } as const;
    if (timing.kind === 'single') await makeSingleCase(selection, target, timing.timeDays, timing.durationDays, origin);
    else makeCase(target, timing, origin, numbersOfTiming(selection, timing));
  }

  /** One period of an alias set is kept, the others are given up: an undoable change of the timing. */
  function keepAlias(periodDays: number): void {
    const selection = bench();
    const { target, case: chosen } = selection;
    if (target === undefined || chosen?.timing.kind !== 'alias set') return;
    const { epochDays, durationDays } = chosen.timing;
    const timing: Timing = { kind: 'linear', periodDays, epochDays, durationDays };
    const numbers = numbersOfTiming(selection, timing);
    run({ kind: 'time case', targetId: target.id, caseId: chosen.id, timing, numbers });
  }

  function numbersOfTiming(selection: BenchSelection, timing: Timing): CaseNumbers | undefined {
    const ephemeris = ephemerisOf({ timing }, selection.prepared);
    return ephemeris && numbersAt(selection, ephemeris);
  }

  return { makeCaseFromTrial, makeCaseFromMarks, makeCaseByHand, keepAlias };
}

const middleOf = ({ interval }: Mark): number => (interval.start + interval.end) / 2;

/** The peak that an untouched trial came from, and how the case will say so. */
function peakOf(
  { search }: BenchSelection,
  source: TrialSource | undefined,
): { peak: BoxPeak; origin: CaseOrigin } | undefined {
  if (source?.kind !== 'peak' || search === undefined) return undefined;
  const { rank, related } = source;
  const signal = search.peaks[rank - 1];
  const { round } = search.settings;
  if (related === undefined) return signal && { peak: signal, origin: { kind: 'search', rank, round } };
  const relative = signal?.relatives[related];
  return relative && { peak: relative, origin: { kind: 'search', rank, round, relation: relative.relation } };
}

function timingOfPeak(peak: BoxPeak): Timing {
  const { periodDays, periodErrorDays, epochDays, epochErrorDays, durationDays } = peak;
  return { kind: 'linear', periodDays, periodErrorDays, epochDays, epochErrorDays, durationDays };
}

function likelyPeriods(period: SinglePeriodResult | undefined) {
  if (period === undefined) return {};
  const { medianDays, lowDays, highDays } = period;
  return { likelyPeriodDays: medianDays, likelyFromDays: lowDays, likelyToDays: highDays };
}
