import type { BoxPeak } from '../../contract/search-contract.ts';
import type { SingleEvent } from '../../contract/single-events-contract.ts';
import { type Ephemeris, phaseOf, type Timing } from '../../core/ephemeris.ts';
import type { Interval } from '../../core/interval.ts';
import { ephemerisOf } from '../bench-selection.ts';
import { FRESH_CASE_VIEW, type TrialSource } from '../view-store.ts';
import type { ActionKit, DragPhase } from './action-stores.ts';
import { numbersAt } from './case-numbers.ts';

export type NudgedQuantity = 'period' | 'epoch' | 'duration';

/** A window stepped from the full view shows this many durations. */
const EVENT_WINDOW_DURATIONS = 12;

/** What the fold shows: a trial picked from a search, or the selected case retimed by hand. */
export function createFoldActions(kit: ActionKit) {
  const { view, bench, drag } = kit;

  function fold(trial: Ephemeris, trialSource: TrialSource | undefined): void {
    view.setState({ ...FRESH_CASE_VIEW, trial, trialSource });
  }

  /** `related` counts the peaks that stand under a signal from 0. */
  function pickPeak(peak: BoxPeak, rank: number, related?: number): void {
    fold(ephemerisFields(peak), { kind: 'peak', rank, related });
  }

  /** The signal of a round: of this one it is the strongest peak, an earlier one's is masked in this search. */
  function showSignal(signal: Ephemeris, isMasked: boolean): void {
    fold(ephemerisFields(signal), isMasked ? undefined : { kind: 'peak', rank: 1, related: undefined });
  }

  /** Folds at a trial period of the search, with the box that was best there. */
  function pickPeriod(periodDays: number): void {
    const { search } = bench();
    if (search === undefined) return;
    const at = nearestIndex(search.periods, periodDays);
    const duration = search.durationDays[at]!;
    const epochDays = search.epochDays[at]!;
    const durationDays = duration > 0 ? duration : search.periods[at]! / 50;
    fold({ periodDays: search.periods[at]!, epochDays, durationDays }, undefined);
  }

  /** Folds at any period of a sine, its minimum in the middle. */
  function pickSine(periodDays: number, maximumDays: number): void {
    fold({ periodDays, epochDays: maximumDays + periodDays / 2, durationDays: periodDays / 4 }, { kind: 'sine' });
  }

  /** Shows one dip: the strip goes there, and the fold is about it alone. */
  function pickSingle({ timeDays, durationDays }: SingleEvent, rank: number): void {
    const timing: Timing = { kind: 'single', timeDays, durationDays };
    const trial = ephemerisOf({ timing }, bench().prepared);
    if (trial === undefined) return;
    fold(trial, { kind: 'single event', rank });
    const half = (EVENT_WINDOW_DURATIONS * durationDays) / 2;
    view.setState({ stripSpan: { start: timeDays - half, end: timeDays + half } });
  }

  /** Folds at any period: typed, halved, nudged or dragged. A selected case is retimed, otherwise the trial moves. */
  function setEphemeris(ephemeris: Ephemeris, phase: DragPhase = 'commit'): void {
    if (!(ephemeris.periodDays > 0) || !(ephemeris.durationDays > 0)) return;
    const selection = bench();
    if (selection.case === undefined) {
      if (phase !== 'cancel') view.setState({ trial: ephemeris, trialSource: undefined });
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

  /** Moves the strip's window to the next or last event of the selected ephemeris, its width kept. */
  function stepEvent(direction: 1 | -1): void {
    const { ephemeris, prepared } = bench();
    if (ephemeris === undefined || prepared === undefined || prepared.time.length === 0) return;
    const full = { start: prepared.time[0]!, end: prepared.time.at(-1)! };
    const { stripSpan } = view.getState();
    const width = stripSpan === undefined ? EVENT_WINDOW_DURATIONS * ephemeris.durationDays : lengthOf(stripSpan);
    const centre = stripSpan === undefined ? full.start : (stripSpan.start + stripSpan.end) / 2;
    const time = nextEvent(ephemeris, centre, direction);
    const { periodDays } = ephemeris;
    if (time < full.start - periodDays || time > full.end + periodDays) return;
    view.setState({ stripSpan: { start: time - width / 2, end: time + width / 2 } });
  }

  return {
    pickPeak,
    showSignal,
    pickPeriod,
    pickSine,
    pickSingle,
    setEphemeris,
    scalePeriod,
    nudge,
    stepEvent,
    /** Which period of an alias set the fold and the strip show. */
    showAlias: (aliasPeriodDays: number) => view.setState({ aliasPeriodDays }),
  };
}

const lengthOf = (interval: Interval) => interval.end - interval.start;

function ephemerisFields({ periodDays, epochDays, durationDays }: Ephemeris): Ephemeris {
  return { periodDays, epochDays, durationDays };
}

function nextEvent({ periodDays, epochDays }: Ephemeris, from: number, direction: 1 | -1): number {
  const at = (from - epochDays) / periodDays;
  const cycle = direction > 0 ? Math.floor(at + 1e-6) + 1 : Math.ceil(at - 1e-6) - 1;
  return epochDays + cycle * periodDays;
}

/**
 * A hand-set timing has no errors: they belonged to the timing that was fitted. An alias set stays one while its
 * period is one of its own.
 */
function retimed(timing: Timing, ephemeris: Ephemeris): Timing {
  const { periodDays, durationDays, epochDays } = ephemeris;
  if (timing.kind === 'single') return { ...timing, timeDays: epochDays, durationDays };
  if (timing.kind === 'alias set' && timing.periods.some((one) => one.periodDays === periodDays)) {
    // The epoch shown may be some cycles of this period away from the one that all periods share.
    const shift = phaseOf(epochDays, periodDays, timing.epochDays) * periodDays;
    return { ...timing, epochDays: timing.epochDays + shift, durationDays };
  }
  return { kind: 'linear', periodDays, epochDays, durationDays };
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
