import { availableParallelism } from 'node:os';
import { parseArgs } from 'node:util';
import { DEFAULT_BOX_SEARCH, MOST_ROUNDS } from '../../src/core/box-search-settings.ts';
import type { SweepSettings } from './target-result.ts';

const DEFAULT_ROUNDS = 3;
/**
 * Ours. White noise reaches S/N 6 to 7 somewhere in the tens of thousands of independent trials of a month's data,
 * and correlated noise goes beyond; lower thresholds are for those who look at every case.
 */
const DEFAULT_LEAST_SIGNAL_TO_NOISE = 7.1;
const DEFAULT_LEAST_EVENTS = 2;
const MOST_THREADS = 256;

export interface SweepOptions {
  readonly paths: readonly string[];
  readonly stars: string | undefined;
  readonly out: string;
  readonly threads: number;
  readonly isResumed: boolean;
  /** ISO 8601; undefined: the latest change of a file that was read. */
  readonly date: string | undefined;
  readonly settings: SweepSettings;
}

export type ParsedOptions =
  | { readonly kind: 'sweep'; readonly options: SweepOptions }
  | { readonly kind: 'help' }
  | { readonly kind: 'wrong'; readonly sentence: string };

export const HELP = `Searches light curves without a browser and writes a session that Candling opens.

  npm run sweep -- [options] FILES_OR_FOLDERS --out night.candling.json

  --out FILE              the session to write
  --stars FILE            table of stars; tables of stars in the folders are used too, this one goes before them
  --threads N             as many files at a time (${availableParallelism()} here)
  --shortest-period DAYS  else chosen from star and cadence
  --longest-period DAYS   else half of each file's span
  --oversampling N        trial periods per resolution element (${DEFAULT_BOX_SEARCH.oversampling})
  --rounds N              most rounds of the search, 1 to ${MOST_ROUNDS} (${DEFAULT_ROUNDS})
  --least-snr X           S/N from which a signal becomes a case (${DEFAULT_LEAST_SIGNAL_TO_NOISE})
  --least-events N        events with data that it needs (${DEFAULT_LEAST_EVENTS})
  --resume                goes on with a sweep that was broken off
  --date ISO              the time that the session is given, else SOURCE_DATE_EPOCH, else that of the newest file
  --help                  these lines

Exit code 0: every file was read; 1: some failed, the others were swept; 2: nothing was done.
`;

const OPTIONS = {
  out: { type: 'string' },
  stars: { type: 'string' },
  threads: { type: 'string' },
  'shortest-period': { type: 'string' },
  'longest-period': { type: 'string' },
  oversampling: { type: 'string' },
  rounds: { type: 'string' },
  'least-snr': { type: 'string' },
  'least-events': { type: 'string' },
  date: { type: 'string' },
  resume: { type: 'boolean' },
  help: { type: 'boolean', short: 'h' },
} as const;

class WrongOption extends Error {}

/** @param epoch of SOURCE_DATE_EPOCH, seconds since 1970, where the environment has it */
export function parseOptions(args: readonly string[], epoch: string | undefined): ParsedOptions {
  try {
    const { values, positionals } = parseWords(args);
    if (values.has('help')) return { kind: 'help' };
    const out = values.get('out');
    if (out === undefined) throw new WrongOption('Say where to write the session: --out night.candling.json');
    if (positionals.length === 0) throw new WrongOption('Say which files or folders to sweep.');
    const threads = numberOf(values, 'threads', { most: MOST_THREADS, isWhole: true }) ?? availableParallelism();
    const date = dateOf(values.get('date'), epoch);
    const isResumed = values.has('resume');
    const stars = values.get('stars');
    return {
      kind: 'sweep',
      options: { paths: positionals, stars, out, threads, isResumed, date, settings: settingsOf(values) },
    };
  } catch (cause) {
    if (cause instanceof WrongOption) return { kind: 'wrong', sentence: cause.message };
    throw cause;
  }
}

type Values = ReadonlyMap<string, string>;

/** Not strict, for the sentences of ours. */
function parseWords(args: readonly string[]): { values: Values; positionals: readonly string[] } {
  const { tokens, positionals } = parseArgs({
    args: [...args],
    options: OPTIONS,
    strict: false,
    allowPositionals: true,
    tokens: true,
  });
  const values = new Map<string, string>();
  for (const token of tokens) {
    if (token.kind !== 'option') continue;
    const { name, rawName, value } = token;
    if (!Object.hasOwn(OPTIONS, name)) throw new WrongOption(`There is no option ${rawName}. See --help.`);
    const takesValue = OPTIONS[name as keyof typeof OPTIONS].type === 'string';
    if (takesValue && (value === undefined || value === '')) throw new WrongOption(`${rawName} needs a value.`);
    if (!takesValue && value !== undefined) throw new WrongOption(`${rawName} takes no value.`);
    values.set(name, value ?? '');
  }
  return { values, positionals };
}

function settingsOf(values: Values): SweepSettings {
  const periods = [
    ['shortestPeriodDays', numberOf(values, 'shortest-period')],
    ['longestPeriodDays', numberOf(values, 'longest-period')],
    ['oversampling', numberOf(values, 'oversampling')],
  ] as const;
  return {
    search: Object.fromEntries(periods.filter(([, value]) => value !== undefined)),
    rounds: numberOf(values, 'rounds', { most: MOST_ROUNDS, isWhole: true }) ?? DEFAULT_ROUNDS,
    leastSignalToNoise: numberOf(values, 'least-snr') ?? DEFAULT_LEAST_SIGNAL_TO_NOISE,
    leastEvents: numberOf(values, 'least-events', { isWhole: true }) ?? DEFAULT_LEAST_EVENTS,
  };
}

function numberOf(values: Values, name: string, { most = Number.MAX_VALUE, isWhole = false } = {}): number | undefined {
  const text = values.get(name);
  if (text === undefined) return undefined;
  const value = Number(text);
  if (value > 0 && value <= most && (!isWhole || Number.isInteger(value))) return value;
  const upTo = most === Number.MAX_VALUE ? '' : ` up to ${most}`;
  throw new WrongOption(
    `--${name} needs a ${isWhole ? 'whole' : 'positive'} number${isWhole ? ' from 1' : ''}${upTo}, not ${text}.`,
  );
}

function dateOf(given: string | undefined, epoch: string | undefined): string | undefined {
  if (given === undefined && (epoch === undefined || epoch === '')) return undefined;
  const date = new Date(given ?? Number(epoch) * 1000);
  if (!Number.isNaN(date.getTime())) return date.toISOString();
  throw new WrongOption(
    given === undefined
      ? `SOURCE_DATE_EPOCH should be a number of seconds, not ${epoch}.`
      : `--date needs a date such as 2026-12-01T08:00:00Z, not ${given}.`,
  );
}
