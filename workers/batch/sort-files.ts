import type { Outcome } from '../../src/contract/outcome.ts';
import type { StarRow } from '../../src/contract/read-contract.ts';
import type { StarParameters } from '../../src/core/light-curve.ts';
import { stableKey } from '../../src/core/stable-key.ts';
import type { InstrumentTable } from '../../src/session/document.ts';
import { type FoundFile, isExpected } from './find-files.ts';
import type { Identified } from './identify-file.ts';

/** What the files turned out to be, each list in the order of the files. */
export interface SortedFiles {
  readonly curves: readonly (FoundFile & { readonly label: string; readonly sha256: string })[];
  /** Later rows go before earlier ones. */
  readonly stars: readonly StarRow[];
  /** The last one, as where files are dropped one after another. */
  readonly instrumentTable: InstrumentTable | undefined;
  /** Files that the session depends on. */
  readonly used: readonly FoundFile[];
  readonly failures: readonly { readonly fileName: string; readonly sentence: string }[];
  /** What is no table and need not be, and copies. */
  readonly skipped: readonly { readonly fileName: string; readonly why: string }[];
}

export function sortFiles(files: readonly FoundFile[], contents: readonly Outcome<Identified>[]): SortedFiles {
  const sorted = {
    curves: [] as SortedFiles['curves'][number][],
    stars: [] as StarRow[],
    instrumentTable: undefined as InstrumentTable | undefined,
    used: [] as FoundFile[],
    failures: [] as SortedFiles['failures'][number][],
    skipped: [] as SortedFiles['skipped'][number][],
  };
  const seen = new Map<string, string>();
  const takeCurve = (file: FoundFile, { label, sha256 }: Extract<Identified, { kind: 'light curve' }>): void => {
    const { fileName } = file;
    const before = seen.get(sha256);
    if (before !== undefined) sorted.skipped.push({ fileName, why: `has the same contents as ${before}` });
    else sorted.curves.push({ ...file, label, sha256 });
    seen.set(sha256, before ?? fileName);
  };
  for (const [index, file] of files.entries()) {
    const { fileName } = file;
    const content = contents[index]!;
    if (content.kind !== 'done') {
      const sentence = content.kind === 'failed' ? content.error.sentence : `${fileName} was not read.`;
      if (isExpected(file)) sorted.failures.push({ fileName, sentence });
      else sorted.skipped.push({ fileName, why: `is no table. ${sentence}` });
      continue;
    }
    sorted.used.push(file);
    const { value } = content;
    if (value.kind === 'light curve') takeCurve(file, value);
    else if (value.kind === 'stars') sorted.stars.push(...value.rows);
    else sorted.instrumentTable = tableOf(fileName, value.spans);
  }
  return sorted;
}

/** Times beyond this are full Julian dates. */
const LEAST_JULIAN = 2_000_000;

function tableOf(fileName: string, spans: InstrumentTable['spans']): InstrumentTable {
  return { id: stableKey({ spans }), fileName, isJulian: spans.every(({ start }) => start > LEAST_JULIAN), spans };
}

/** Parameters by label, whatever its capitals and spaces; of rows for one label the last that gives a value rules. */
export function findStar(rows: readonly StarRow[], label: string): StarParameters | undefined {
  const own = rows.filter((row) => bare(row.label) === bare(label));
  if (own.length === 0) return undefined;
  const known = own.flatMap(({ star }) => Object.entries(star).filter(([, value]) => value !== undefined));
  return Object.fromEntries(known);
}

const bare = (label: string): string => label.toLowerCase().replace(/\s+/g, '');
