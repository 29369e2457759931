import { stableKey } from '../../src/core/stable-key.ts';
import type { Case, InstrumentTable, JournalEntry, SessionDocument, Target } from '../../src/session/document.ts';
import { newDocument } from '../../src/session/new-document.ts';
import { readSession } from '../../src/session/read-session.ts';
import { writeSession } from '../../src/session/write-session.ts';
import type { SweepSettings, TargetResult } from './target-result.ts';

export interface SweepRecord {
  readonly name: string;
  readonly app: string;
  /** ISO 8601, UTC: of everything in the session. */
  readonly at: string;
  readonly settings: SweepSettings;
  readonly instrumentTable: InstrumentTable | undefined;
  /** In the order of the session, each of another file. */
  readonly results: readonly TargetResult[];
  /** Sentences of what could not be swept. */
  readonly failures: readonly string[];
}

/** A session of what a sweep found. Its ids are hashes, so that equal sweeps make equal sessions. */
export function buildSession(record: SweepRecord): SessionDocument {
  const { name, app, at, settings, instrumentTable, results } = record;
  const hashes = results.map(({ file }) => file.sha256);
  const id = `sweep ${stableKey({ hashes, settings, at })}`;
  const labels = separateLabels(results.map(({ label }) => label));
  return {
    ...newDocument({ id, name, analyst: '', app, at }),
    targets: results.map((result, index) => targetOf(result, labels[index]!, instrumentTable?.id)),
    instrumentTables: instrumentTable === undefined ? [] : [instrumentTable],
    journal: journalOf(record),
  };
}

/** Why no session could hold a result, so that one strange file does not spoil the session of all the others. */
export function refuseResult(result: TargetResult, settings: SweepSettings): string | undefined {
  const record = { name: 'one', app: '', at: new Date(0).toISOString(), settings, instrumentTable: undefined };
  const document = buildSession({ ...record, results: [result], failures: [] });
  const read = readSession(writeSession(document), result.file.name);
  return read.kind === 'refused' ? read.sentence : undefined;
}

function targetOf(result: TargetResult, label: string, instrumentTable: string | undefined): Target {
  const { file, star, recipe, search, signals } = result;
  return {
    id: file.sha256,
    label,
    files: [file],
    star,
    recipe,
    search,
    instrumentTable,
    modeSet: undefined,
    marks: [],
    cases: signals.map((signal, index) => caseOf(signal, index + 1)),
    lastCaseNumber: signals.length,
  };
}

function caseOf({ round, timing, numbers }: TargetResult['signals'][number], number: number): Case {
  return {
    id: stableKey({ number, round, timing, numbers }),
    number,
    origin: { kind: 'search', rank: 1, round },
    timing,
    numbers,
    rulings: [],
    parked: undefined,
  };
}

/** A label that is taken gets a number, as in a docket that is filled by hand. */
function separateLabels(labels: readonly string[]): readonly string[] {
  const taken = new Set<string>();
  return labels.map((label) => {
    let own = label;
    for (let copy = 2; taken.has(own); copy += 1) own = `${label} (${copy})`;
    taken.add(own);
    return own;
  });
}

function journalOf({ app, at, settings, results, failures }: SweepRecord): readonly JournalEntry[] {
  const { rounds, leastSignalToNoise, leastEvents } = settings;
  const whole = `swept ${results.length} ${results.length === 1 ? 'target' : 'targets'} unattended: cases are the strongest signals of up to ${rounds} ${rounds === 1 ? 'round' : 'rounds'} from S/N ${leastSignalToNoise} with correlated noise and ${leastEvents} events on`;
  const entries = [
    { targetId: undefined, what: whole },
    ...failures.map((sentence) => ({ targetId: undefined, what: `left out: ${sentence}` })),
    ...results.map((result) => ({ targetId: result.file.sha256, what: endingWords(result) })),
  ];
  return entries.map(({ targetId, what }, index) => ({
    id: stableKey({ index, targetId, what, at }),
    at,
    analyst: '',
    app,
    targetId,
    caseId: undefined,
    what,
  }));
}

function endingWords({ signals, roundsSearched, ending }: TargetResult): string {
  const cases = signals.length === 0 ? 'no case' : signals.length === 1 ? '1 case' : `${signals.length} cases`;
  return `swept in ${roundsSearched} ${roundsSearched === 1 ? 'round' : 'rounds'}, ${cases}. ${ending}`;
}
