import type { BoxPeak } from '../contract/search-contract.ts';
import type { Ephemeris, Timing } from '../core/ephemeris.ts';
import type { Interval } from '../core/interval.ts';
import { type BoxMeasure, measureBox } from '../core/measure-box.ts';
import { fitPeriodToTimes } from '../core/period-from-times.ts';
import { shortestUnseenPeriod } from '../core/shortest-unseen-period.ts';
import type { Command } from '../session/commands.ts';
import type { CaseNumbers, CaseOrigin, Mark, Target } from '../session/document.ts';
import { nextUnruledTarget } from '../session/selectors.ts';
import { type BenchSelection, ephemerisOf, selectBench } from './bench-selection.ts';
import type { DocumentStore } from './document-store.ts';
import type { ResultsStore } from './results-store.ts';
import { preparedKey } from './target-keys.ts';
import { FRESH_TARGET_VIEW, type ViewStore } from './view-store.ts';

/** What the analyst does with the selected target: every action that a key, a click or a drag can reach. */

interface Stores {
  readonly document: DocumentStore;
  readonly view: ViewStore;
  readonly results: ResultsStore;
  readonly newId: () => string;
}

export type DragPhase = 'preview' | 'commit' | 'cancel';
export type NudgedQuantity = 'period' | 'epoch' | 'duration';

export type BenchActions = ReturnType<typeof createBenchActions>;

export function createBenchActions({ document, view, results, newId }: Stores) {
  const bench = (): BenchSelection => selectBench(document.getState().document, view.getState(), results.getState());
  const run = document.getState().run;

  function selectTarget(targetId: string | undefined): void {
    if (targetId === view.getState().targetId) return;
    const target = document.getState().document?.targets.find(({ id }) => id === targetId);
    view.setState({ targetId, ...FRESH_TARGET_VIEW, caseId: target?.cases[0]?.id });
  }

  function stepTarget(step: 1 | -1, shown: readonly Target[]): void {
    const at = shown.findIndex(({ id }) => id === view.getState().targetId);
    const next = shown[at + step];
    if (next !== undefined) selectTarget(next.id);
  }

  function goToNextUnruled(): void {
    const current = document.getState().document;
    const next = current && nextUnruledTarget(current, view.getState().targetId);
    if (next !== undefined) selectTarget(next.id);
    else view.setState({ notice: { kind: 'notice', sentence: 'Every target of the docket is ruled or parked.' } });
  }

  function selectCase(caseId: string | undefined): void {
    view.setState({ caseId, trial: undefined, trialRank: undefined, rulingDraft: undefined });
  }

  function stepCase(): void {
    const { target, case: chosen } = bench();
    const cases = target?.cases ?? [];
    const at = chosen === undefined ? -1 : cases.indexOf(chosen);
    if (cases.length > 0) selectCase(cases[(at + 1) % cases.length]!.id);
  }

  function pickPeak(peak: BoxPeak, rank: number): void {
    const { periodDays, epochDays, durationDays } = peak;
    view.setState({ caseId: undefined, trial: { periodDays, epochDays, durationDays }, trialRank: rank });
  }

  /** Folds at a trial period of the search, with the box that was best there. */
  function pickPeriod(periodDays: number): void {
    const { search } = bench();
    if (search === undefined) return;
    const at = nearestIndex(search.periods, periodDays);
    const trial = {
      periodDays: search.periods[at]!,
      epochDays: search.epochDays[at]!,
      durationDays: search.durationDays[at]!,
    };
    view.setState({ caseId: undefined, trial, trialRank: undefined });
  }

  /** Folds at any period: typed, halved, nudged or dragged. A selected case is retimed, otherwise the trial moves. */
  function setEphemeris(ephemeris: Ephemeris, phase: DragPhase = 'commit'): void {
    if (!(ephemeris.periodDays > 0) || !(ephemeris.durationDays > 0)) return;
    const selection = bench();
    if (selection.case === undefined) {
      if (phase !== 'cancel') view.setState({ trial: ephemeris, trialRank: undefined });
      return;
    }
    if (phase === 'cancel') {
      document.getState().abandon();
      return;
    }
    drag(phase, {
      kind: 'time case',
      targetId: selection.target!.id,
      caseId: selection.case.id,
      timing: retimed(selection.case.timing, ephemeris),
      numbers: phase === 'commit' ? numbersAt(selection, ephemeris) : selection.case.numbers,
    });
  }

  /** A drag's command: shown while it moves, one entry in the history when it is let go. */
  function drag(phase: Exclude<DragPhase, 'cancel'>, command: Command): void {
    if (phase === 'preview') document.getState().preview(command);
    else {
      document.getState().abandon();
      run(command);
    }
  }

  function scalePeriod(factor: number): void {
    const { ephemeris } = bench();
    if (ephemeris !== undefined) setEphemeris({ ...ephemeris, periodDays: ephemeris.periodDays * factor });
  }

  /** One step is sized to the data: it moves the last event (period) or every event (epoch) by a tenth of a duration. */
  function nudge(quantity: NudgedQuantity, direction: 1 | -1): void {
    const { ephemeris, prepared } = bench();
    if (ephemeris === undefined || prepared === undefined) return;
    const { periodDays, epochDays, durationDays } = ephemeris;
    const step = (direction * durationDays) / 10;
    const cycles = Math.max(1, Math.round(prepared.spanDays / periodDays));
    if (quantity === 'period') setEphemeris({ ...ephemeris, periodDays: periodDays + step / cycles });
    if (quantity === 'epoch') setEphemeris({ ...ephemeris, epochDays: epochDays + step });
    if (quantity === 'duration') setEphemeris({ ...ephemeris, durationDays: durationDays + step });
  }

  function makeCase(timing: Timing, origin: CaseOrigin, numbers: CaseNumbers | undefined): void {
    const { target } = bench();
    if (target === undefined) return;
    const caseId = newId();
    if (run({ kind: 'make case', targetId: target.id, caseId, origin, timing, numbers }))
      view.setState({ caseId, trial: undefined, trialRank: undefined });
  }

  /** The trial becomes a case; taken unchanged from a search peak it keeps the peak's errors and numbers. */
  function makeCaseFromTrial(): void {
    const selection = bench();
    const { search, target } = selection;
    const { trial, trialRank } = view.getState();
    if (target === undefined || trial === undefined) return;
    const peak = trialRank === undefined ? undefined : search?.peaks[trialRank - 1];
    if (peak === undefined || search === undefined)
      makeCase({ kind: 'linear', ...trial }, { kind: 'hand' }, numbersAt(selection, trial));
    else makeCase(timingOfPeak(peak), { kind: 'search', rank: trialRank! }, numbersOfPeak(search.key, peak));
  }

  /** One marked dip makes a single-event case, several make a linear one where a period fits them. */
  function makeCaseFromMarks(): void {
    const selection = bench();
    const marks = selection.target?.marks.filter(({ kind }) => kind === 'dip') ?? [];
    const timing = timingOfMarks(marks, selection.prepared?.time);
    if (timing === undefined) {
      const sentence =
        marks.length === 0
          ? 'Mark one or more dips first: press M and drag over the strip.'
          : 'No single period fits the marked dips to half a duration. Move or delete a mark, or make the case by hand.';
      view.setState({ notice: { kind: 'notice', sentence } });
      return;
    }
    makeCase(timing, { kind: 'marks', markIds: marks.map(({ id }) => id) }, numbersOfTiming(selection, timing));
  }

  function makeCaseByHand(timing: Timing): void {
    const selection = bench();
    makeCase(timing, { kind: 'hand' }, numbersOfTiming(selection, timing));
  }

  function numbersOfTiming(selection: BenchSelection, timing: Timing): CaseNumbers | undefined {
    const ephemeris = ephemerisOf({ timing }, selection.prepared);
    return ephemeris && numbersAt(selection, ephemeris);
  }

  /** Depth and S/N of the box at an ephemeris, under the key of the series they were measured on. */
  function numbersAt(selection: BenchSelection, ephemeris: Ephemeris): CaseNumbers | undefined {
    const { prepared, target } = selection;
    if (prepared === undefined || target === undefined) return undefined;
    const box = measureBox(prepared.time, prepared.flux, prepared.error, ephemeris);
    return box && numbersOfBox(preparedKey(target), box);
  }

  function saveMark(interval: Interval, fields: Omit<Mark, 'id' | 'interval'>, markId?: string): void {
    const { target } = bench();
    if (target === undefined) return;
    const mark = { interval, ...fields };
    if (markId !== undefined) run({ kind: 'edit mark', targetId: target.id, markId, mark });
    else {
      const id = newId();
      if (run({ kind: 'add mark', targetId: target.id, markId: id, mark })) view.setState({ selectedMarkId: id });
    }
    view.setState({ markDraft: undefined, tool: 'pan' });
  }

  function moveMark(markId: string, interval: Interval, phase: DragPhase): void {
    const { target } = bench();
    if (target === undefined) return;
    if (phase === 'cancel') document.getState().abandon();
    else drag(phase, { kind: 'edit mark', targetId: target.id, markId, mark: { interval } });
  }

  function deleteMark(markId: string): void {
    const { target } = bench();
    if (target !== undefined) run({ kind: 'delete mark', targetId: target.id, markId });
    view.setState({ selectedMarkId: undefined, markDraft: undefined });
  }

  /** Moves the strip's window to the next or last event of the selected ephemeris, its width kept. */
  function stepEvent(direction: 1 | -1): void {
    const { ephemeris, prepared } = bench();
    if (ephemeris === undefined || prepared === undefined || prepared.time.length === 0) return;
    const full = { start: prepared.time[0]!, end: prepared.time.at(-1)! };
    const { stripSpan } = view.getState();
    const width = stripSpan === undefined ? EVENT_WINDOW_DURATIONS * ephemeris.durationDays : span(stripSpan);
    const centre = stripSpan === undefined ? full.start : (stripSpan.start + stripSpan.end) / 2;
    const { periodDays, epochDays } = ephemeris;
    const at = (centre - epochDays) / periodDays;
    const cycle = direction > 0 ? Math.floor(at + 1e-6) + 1 : Math.ceil(at - 1e-6) - 1;
    const time = epochDays + cycle * periodDays;
    if (time < full.start - periodDays || time > full.end + periodDays) return;
    view.setState({ stripSpan: { start: time - width / 2, end: time + width / 2 } });
  }

  return {
    bench,
    selectTarget,
    stepTarget,
    goToNextUnruled,
    selectCase,
    stepCase,
    pickPeak,
    pickPeriod,
    setEphemeris,
    scalePeriod,
    nudge,
    makeCaseFromTrial,
    makeCaseFromMarks,
    makeCaseByHand,
    saveMark,
    moveMark,
    deleteMark,
    stepEvent,
  };
}

/** A window stepped from the full view shows this many durations. */
const EVENT_WINDOW_DURATIONS = 12;

const span = (interval: Interval) => interval.end - interval.start;

function timingOfPeak(peak: BoxPeak): Timing {
  const { periodDays, periodErrorDays, epochDays, epochErrorDays, durationDays } = peak;
  return { kind: 'linear', periodDays, periodErrorDays, epochDays, epochErrorDays, durationDays };
}

function numbersOfPeak(key: string, peak: BoxPeak): CaseNumbers {
  const { boxDepth, boxDepthError, signalToNoise, sde, eventCount } = peak;
  return { key, boxDepth, boxDepthError, signalToNoise, sde, eventCount };
}

function numbersOfBox(key: string, box: BoxMeasure): CaseNumbers {
  const { depth, depthError, signalToNoise, eventCount } = box;
  return { key, boxDepth: depth, boxDepthError: depthError, signalToNoise, sde: undefined, eventCount };
}

/** A hand-set timing has no errors: they belonged to the timing that was fitted. */
function retimed(timing: Timing, ephemeris: Ephemeris): Timing {
  const { durationDays, epochDays } = ephemeris;
  if (timing.kind === 'single') return { ...timing, timeDays: epochDays, durationDays };
  return { kind: 'linear', periodDays: ephemeris.periodDays, epochDays, durationDays };
}

function timingOfMarks(marks: readonly Mark[], time: Float64Array | undefined): Timing | undefined {
  if (marks.length === 0) return undefined;
  const times = marks.map(({ interval }) => (interval.start + interval.end) / 2);
  const durationDays = marks.reduce((sum, { interval }) => sum + span(interval), 0) / marks.length;
  if (marks.length === 1) return singleTiming(times[0]!, durationDays, time);
  const fit = fitPeriodToTimes(times, durationDays);
  return fit && { kind: 'linear', ...fit, durationDays };
}

export function singleTiming(timeDays: number, durationDays: number, time: Float64Array | undefined): Timing {
  const shortestPeriodDays = time && shortestUnseenPeriod(time, timeDays, durationDays);
  return { kind: 'single', timeDays, durationDays, shortestPeriodDays, longestPeriodDays: undefined };
}

function nearestIndex(ascending: Float64Array, value: number): number {
  let low = 0;
  let high = ascending.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (ascending[middle]! < value) low = middle;
    else high = middle;
  }
  return value - ascending[low]! < ascending[high]! - value ? low : high;
}
