import type { CaseNumbers, SessionDocument, Target } from '../session/document.ts';
import { type Standing, targetStanding } from '../session/selectors.ts';
import type { ResultsState, TargetSummary } from './results-store.ts';
import type { DocketOrder, ViewState } from './view-store.ts';

/** What one line of the docket says of a target. */
export interface DocketRow {
  readonly target: Target;
  readonly standing: Standing;
  /** ISO date that a parked case waits for. */
  readonly parkedUntil: string | undefined;
  readonly periodDays: number | undefined;
  readonly signalToNoise: number | undefined;
  /** Undefined while the target has not been searched. */
  readonly smallFold: readonly number[] | undefined;
  readonly smallStrip: readonly number[] | undefined;
  /** Why it could not be searched. */
  readonly failure: string | undefined;
}

/** The first case speaks for its target; without one, the strongest peak of the search does. */
export function docketRow(target: Target, summary: TargetSummary | undefined): DocketRow {
  const [first] = target.cases;
  const parked = target.cases.find((one) => one.parked !== undefined)?.parked;
  return {
    target,
    standing: targetStanding(target),
    parkedUntil: parked?.until,
    periodDays:
      first === undefined ? summary?.periodDays : first.timing.kind === 'linear' ? first.timing.periodDays : undefined,
    signalToNoise: first === undefined ? (summary?.objective ?? summary?.signalToNoise) : strengthOf(first.numbers),
    smallFold: summary?.smallFold,
    smallStrip: summary?.smallStrip,
    failure: summary?.failure,
  };
}

/** With correlated noise where that was measured. */
const strengthOf = (numbers: CaseNumbers | undefined): number | undefined =>
  numbers?.correlatedSignalToNoise ?? numbers?.signalToNoise;

/** The docket's rows in their order on the screen. */
export function shownRows(
  document: SessionDocument | undefined,
  summaries: ReadonlyMap<string, TargetSummary>,
  filter: string,
  order: DocketOrder = { by: 'docket', descending: false },
): readonly DocketRow[] {
  const rows = (document?.targets ?? []).map((target) => docketRow(target, summaries.get(target.id)));
  const terms = parseFilter(filter);
  return sortRows(
    rows.filter((row) => terms.every((term) => term(row))),
    order,
  );
}

/** The targets as the docket shows them now. */
export function shownTargets(
  document: SessionDocument | undefined,
  { summaries }: Pick<ResultsState, 'summaries'>,
  { filter, docketOrder }: Pick<ViewState, 'filter' | 'docketOrder'>,
): readonly Target[] {
  return shownRows(document, summaries, filter, docketOrder).map(({ target }) => target);
}

/** Rows without the value stand last, whichever way the others go. */
function sortRows(rows: readonly DocketRow[], { by, descending }: DocketOrder): readonly DocketRow[] {
  const sign = descending ? -1 : 1;
  if (by === 'docket') return descending ? rows.toReversed() : rows;
  if (by === 'label') return rows.toSorted((a, b) => sign * COLLATOR.compare(a.target.label, b.target.label));
  const quantityOf = ({ periodDays, signalToNoise }: DocketRow) => (by === 'period' ? periodDays : signalToNoise);
  return rows.toSorted((a, b) => {
    const [left, right] = [quantityOf(a), quantityOf(b)];
    if (left === undefined || right === undefined) return Number(left === undefined) - Number(right === undefined);
    return sign * (left - right);
  });
}

const COLLATOR = new Intl.Collator('en', { numeric: true });

type Term = (row: DocketRow) => boolean;

const COMPARISON = /\b(s\/n|sn|snr|period|p)\s*([<>]=?)\s*(\d+(?:\.\d*)?)/gi;

/** "S/N > 10 unruled SR-0": comparisons, words of a ruling, parked, unruled, and otherwise parts of the label. */
export function parseFilter(filter: string): readonly Term[] {
  const comparisons = [...filter.matchAll(COMPARISON)].map(([, quantity, sign, number]) =>
    comparison(quantity!, sign!, Number(number)),
  );
  const rest = filter.replace(COMPARISON, ' ').toLowerCase().trim();
  const words = rest.split(/\s+/).filter(Boolean);
  return [...comparisons, ...(STANDINGS.has(rest) ? [ofStanding(rest)] : words.map(wordTerm))];
}

const STANDINGS = new Set([
  'worth telescope time',
  'stellar mimic',
  'not astrophysical',
  'cannot decide',
  'parked',
  'unruled',
  'ruled',
]);

function comparison(quantity: string, sign: string, limit: number): Term {
  const isPeriod = quantity.toLowerCase().startsWith('p');
  return ({ periodDays, signalToNoise }) => {
    const value = isPeriod ? periodDays : signalToNoise;
    if (value === undefined) return false;
    if (sign.startsWith('>')) return sign === '>' ? value > limit : value >= limit;
    return sign === '<' ? value < limit : value <= limit;
  };
}

function wordTerm(word: string): Term {
  if (STANDINGS.has(word)) return ofStanding(word);
  return ({ target, standing }) =>
    target.label.toLowerCase().includes(word) || (standing?.split(' ').includes(word) ?? false);
}

function ofStanding(name: string): Term {
  if (name === 'unruled') return ({ standing }) => standing === undefined;
  if (name === 'ruled') return ({ standing }) => standing !== undefined && standing !== 'parked';
  return ({ standing }) => standing === name;
}
