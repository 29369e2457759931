import type { ColumnAssignment, FileMapping } from '../../src/core/file-mapping.ts';
import type { FluxMeaning, FluxUnit } from '../../src/core/light-curve.ts';
import { looksLikeError, looksLikeFlux, looksLikeTime, summarise } from './column-values.ts';
import type { RawColumn, RawTable } from './raw-table.ts';
import { readTimeMeaning } from './time-meaning.ts';

const TIME_NAME = /^(t|time|times|date|days?|epoch|timestamp)$|time(?!.*(corr|exp))|[bhm]?jd/i;
const FLUX_NAME = /flux|(^|[^a-z])d?mag(nitude)?s?([^a-z]|$)|counts?$|brightness|intensity/i;
const ERROR_NAME = /err|unc|sigma|(^|_)e(_|$)|std|(^|_)sd(_|$)/i;
const QUALITY_NAME = /qual|flag/i;
const NOT_FLUX_NAME = /background|bkg|sky/i;

/** What was guessed, and whether the analyst must confirm it before anything is computed. */
export interface Guess {
  readonly mapping: FileMapping;
  readonly question: string | undefined;
  readonly warnings: readonly string[];
}

/** Takes every column for something, each with its reason; names come first, values second and are asked about. */
export function guessMapping(table: RawTable): Guess {
  const named = table.columns.map(roleByName);
  const has = (role: ColumnAssignment['role']) => named.filter((assignment) => assignment.role === role).length;
  const sure = has('time') === 1 && has('flux') >= 1;
  const columns = sure ? named : guessByValues(table, named);
  const timeColumn = table.columns.find((_, index) => columns[index]!.role === 'time');
  const time = readTimeMeaning(timeColumn, table.facts);
  const mapping: FileMapping = {
    columns: pairErrors(columns),
    timeUnit: time.unit,
    timeReference: time.reference,
    timeReason: time.reason,
    exposureDays: table.facts.exposureDays,
    stamp: table.facts.stamp,
    passband: table.facts.passband,
  };
  return { mapping, question: sure ? undefined : questionOf(columns), warnings: time.warnings };
}

function roleByName(column: RawColumn): ColumnAssignment {
  const { name, texts, values } = column;
  const take = (role: ColumnAssignment['role'], reason: string, more: Partial<ColumnAssignment> = {}) => ({
    column: name,
    role,
    reason,
    ...more,
  });
  if (texts !== undefined) return take('ignore', 'holds words');
  if (values.every(Number.isNaN)) return take('ignore', 'empty in every row');
  if (QUALITY_NAME.test(name)) return take('quality', `named ${name}`);
  if (ERROR_NAME.test(name)) return take(isFluxError(name) ? 'flux error' : 'covariate', `named ${name}`);
  if (FLUX_NAME.test(name) && !NOT_FLUX_NAME.test(name)) return fluxAssignment(column, `named ${name}`);
  if (TIME_NAME.test(name)) return take('time', `named ${name}`);
  return take('covariate', 'a number at each time');
}

/** An error of something that is not flux (a position, a background) is a covariate. */
function isFluxError(name: string): boolean {
  return !/centroid|cen_|pos|background|bkg|sky|(^|_)[xy](_|$)/i.test(name);
}

function fluxAssignment(column: RawColumn, reason: string): ColumnAssignment {
  return { column: column.name, role: 'flux', meaning: meaningOf(column.name), unit: fluxUnitOf(column), reason };
}

function meaningOf(name: string): FluxMeaning {
  if (/raw|uncorr|instr/i.test(name)) return 'raw';
  if (/corr|detrend|clean|norm|flat/i.test(name)) return 'corrected';
  return /aper|(^|_)ap\d/i.test(name) ? 'aperture' : 'unknown';
}

export function fluxUnitOf({ name, unit, comment, values }: RawColumn): FluxUnit {
  const said = `${unit ?? ''} ${name}`;
  if (/ppm/i.test(said)) return 'ppm';
  if (/(^|[^a-z])d?mag/i.test(said)) return 'magnitude';
  if (/^\s*(e-?|electrons?)\s*\/\s*s(ec)?\b|electron.*s-1|e-.?s-1/i.test(unit ?? '')) return 'electron/s';
  if (/relative|normali[sz]ed/i.test(`${said} ${comment ?? ''}`)) return 'relative';
  const { median } = summarise(values);
  return median > 0.5 && median < 2 ? 'relative' : 'unknown';
}

/** An error goes with the flux that it names; one that names none goes with every flux that has no own. */
function pairErrors(columns: readonly ColumnAssignment[]): ColumnAssignment[] {
  const fluxes = columns.filter(({ role }) => role === 'flux').map(({ column }) => column);
  return columns.map((assignment) => {
    if (assignment.role !== 'flux error' || assignment.errorOf !== undefined) return assignment;
    const stem = assignment.column
      .toLowerCase()
      .replace(/[_ ]?(error|err|unc(ertainty)?|sigma|std)$|^(e|err|sigma)_/i, '');
    const errorOf = fluxes.find((flux) => flux.toLowerCase() === stem) ?? (fluxes.length === 1 ? fluxes[0] : undefined);
    return { ...assignment, errorOf };
  });
}

/** Names were no help: the most time-like column, then the most flux-like, then an error for it. */
function guessByValues(table: RawTable, named: readonly ColumnAssignment[]): ColumnAssignment[] {
  const guessed = [...named];
  const open = (index: number) => guessed[index]!.role === 'covariate' || guessed[index]!.role === 'time';
  const best = (score: (values: Float64Array) => number, allowed: (index: number) => boolean) => {
    let at = -1;
    let highest = 0;
    for (const [index, { values }] of table.columns.entries()) {
      const value = allowed(index) ? score(values) : 0;
      if (value > highest) {
        highest = value;
        at = index;
      }
    }
    return at;
  };
  const count = (role: ColumnAssignment['role']) => guessed.filter((assignment) => assignment.role === role).length;
  if (count('time') !== 1) {
    const at = best(looksLikeTime, open);
    for (const [index, assignment] of guessed.entries())
      if (assignment.role === 'time') guessed[index] = { ...assignment, role: 'covariate' };
    if (at >= 0)
      guessed[at] = { column: table.columns[at]!.name, role: 'time', reason: 'its values are spaced like times' };
  }
  if (count('flux') === 0) {
    const at = best(looksLikeFlux, (index) => guessed[index]!.role === 'covariate');
    if (at >= 0) guessed[at] = fluxAssignment(table.columns[at]!, 'its values scatter about one level');
  }
  if (count('flux') === 1 && count('flux error') === 0) {
    const flux = table.columns[guessed.findIndex(({ role }) => role === 'flux')]!;
    const at = best(
      (values) => looksLikeError(values, flux.values),
      (index) => guessed[index]!.role === 'covariate',
    );
    if (at >= 0)
      guessed[at] = {
        column: table.columns[at]!.name,
        role: 'flux error',
        errorOf: flux.name,
        reason: 'its values are small and all positive',
      };
  }
  return guessed;
}

function questionOf(columns: readonly ColumnAssignment[]): string {
  const named = (role: ColumnAssignment['role']) => columns.find((assignment) => assignment.role === role)?.column;
  const time = named('time');
  const flux = named('flux');
  if (time === undefined || flux === undefined)
    return `The names of the columns do not say which is ${time === undefined ? 'time' : 'flux'}. Choose it.`;
  return `The names of the columns do not say which is time and which is flux. Judging by its values, ${time} is time and ${flux} is flux. Confirm or correct this.`;
}
