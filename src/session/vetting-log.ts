import type { Timing } from '../core/ephemeris.ts';
import { formatConcise } from '../core/number-format.ts';
import { stableKey } from '../core/stable-key.ts';
import { describeRecipe } from './describe-recipe.ts';
import type { Case, CaseOrigin, SessionDocument, Target } from './document.ts';
import { standingRuling } from './selectors.ts';

/** Who exports, and when. */
export interface LogStamp {
  readonly at: string;
  readonly app: string;
}

type Cell = string | number | undefined;
export type LogRow = Readonly<Record<string, Cell>>;

/**
 * One row for each case of a session, and one for each target that has none, so that nothing is silently absent.
 * Where a ruling stands, timing, numbers and recipe are those that it was given on.
 */
export function vettingLogRows(document: SessionDocument, stamp: LogStamp): readonly LogRow[] {
  return document.targets.flatMap((target) =>
    target.cases.length === 0
      ? [rowOf(document, target, undefined, stamp)]
      : target.cases.map((one) => rowOf(document, target, one, stamp)),
  );
}

function rowOf(document: SessionDocument, target: Target, one: Case | undefined, stamp: LogStamp): LogRow {
  const ruling = one && standingRuling(one);
  const timing = ruling?.timing ?? one?.timing;
  const numbers = ruling?.numbers ?? one?.numbers;
  const recipe = ruling?.recipe ?? target.recipe;
  const file = target.files[0]!;
  const { zeroJd, scale, frame } = file.timeReference;
  return {
    session: document.name,
    target: target.label,
    case: one === undefined ? 'no case' : one.number,
    ruling: ruling?.kind ?? '',
    confidence: ruling?.confidence ?? '',
    reasons: ruling?.reasons.join('; ') ?? '',
    note: ruling?.note ?? '',
    analyst: ruling?.analyst ?? '',
    ruled_at: ruling?.at ?? '',
    earlier_rulings: one === undefined ? undefined : Math.max(0, one.rulings.length - 1),
    retimed_since: one && ruling ? yesNo(stableKey(one.timing) !== stableKey(ruling.timing)) : '',
    recipe_changed_since: ruling ? yesNo(stableKey(target.recipe) !== stableKey(ruling.recipe)) : '',
    parked: one?.parked?.reason ?? '',
    parked_until: one?.parked?.until ?? '',
    origin: one === undefined ? '' : originWords(one.origin),
    ...timingCells(timing),
    time_zero_jd: zeroJd ?? 'unknown',
    time_scale: scale,
    time_frame: frame,
    box_depth_ppm: numbers && numbers.boxDepth * 1e6,
    box_depth_err_ppm: numbers?.boxDepthError === undefined ? undefined : numbers.boxDepthError * 1e6,
    signal_to_noise: numbers?.signalToNoise,
    signal_to_noise_correlated: numbers?.correlatedSignalToNoise,
    signal_detection_efficiency: numbers?.sde,
    false_alarm_probability: numbers?.falseAlarmProbability,
    events: numbers?.eventCount,
    recipe: describeRecipe(recipe),
    recipe_json: JSON.stringify(recipe),
    file: file.name,
    sha256: file.sha256,
    result_key: numbers?.key ?? '',
    app_at_ruling: ruling?.app ?? '',
    app_at_export: stamp.app,
    exported_at: stamp.at,
  };
}

/** The same columns whatever the kind, so that every row has them. */
function timingCells(timing: Timing | undefined): LogRow {
  const linear = timing?.kind === 'linear' ? timing : undefined;
  const epoch =
    timing?.kind === 'single' ? timing.timeDays : timing && 'epochDays' in timing ? timing.epochDays : undefined;
  return {
    timing: timing?.kind ?? '',
    period: linear === undefined ? '' : formatConcise(linear.periodDays, linear.periodErrorDays),
    period_d: linear?.periodDays,
    period_err_d: linear?.periodErrorDays,
    shortest_period_d: timing?.kind === 'single' ? timing.shortestPeriodDays : undefined,
    likely_period_d: timing?.kind === 'single' ? timing.likelyPeriodDays : undefined,
    alias_periods_d: timing?.kind === 'alias set' ? timing.periods.map((one) => one.periodDays).join(' ') : '',
    epoch_d: epoch,
    epoch_err_d: linear?.epochErrorDays,
    duration_h: timing && timing.durationDays * 24,
    timing_json: timing === undefined ? '' : JSON.stringify(timing),
  };
}

function originWords(origin: CaseOrigin): string {
  if (origin.kind === 'search') {
    const round = origin.round === undefined || origin.round === 1 ? '' : `, round ${origin.round}`;
    return `box search${round}, peak ${origin.rank}${origin.relation === undefined ? '' : `, its ${origin.relation}`}`;
  }
  if (origin.kind === 'single event') return `single events, number ${origin.rank}`;
  return origin.kind === 'marks' ? `${origin.markIds.length} marked dips` : 'set by hand';
}

const yesNo = (value: boolean) => (value ? 'yes' : 'no');

export function writeVettingLogJson(document: SessionDocument, stamp: LogStamp): string {
  const { id, name } = document;
  const log = {
    format: 'candling-vetting-log',
    version: 1,
    session: { id, name },
    ...stamp,
    rows: vettingLogRows(document, stamp),
  };
  return `${JSON.stringify(log, undefined, 1)}\n`;
}

/** RFC 4180: comma, CRLF, quotes doubled inside quotes. */
export function writeVettingLogCsv(document: SessionDocument, stamp: LogStamp): string {
  const rows = vettingLogRows(document, stamp);
  const names = Object.keys(rows[0] ?? { target: '' });
  const lines = rows.map((row) => names.map((name) => csvCell(row[name])).join(','));
  return [names.join(','), ...lines].map((line) => `${line}\r\n`).join('');
}

/**
 * Text that a spreadsheet would run as a formula gets an apostrophe before it (OWASP, CSV injection: cells that begin
 * with = + - @, tab or carriage return). Numbers of ours are numbers and stay so.
 */
function csvCell(cell: Cell): string {
  if (cell === undefined) return '';
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell) : '';
  const harmless = /^[=+\-@\t\r\n\uff1d\uff0b\uff0d\uff20]/.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless;
}
