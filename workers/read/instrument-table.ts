import type { InstrumentSpan } from '../../src/contract/read-contract.ts';
import type { RawTable } from './raw-table.ts';

const START = /^(t(ime)?_?)?(start|begin|from)(_?(jd|time|bjd))?$/i;
const END = /^(t(ime)?_?)?(end|stop|until|to)(_?(jd|time|bjd))?$/i;
const NOTE = /^(note|what|event|kind|comment|reason|label)$/i;

/**
 * Times of the instrument (dumps, slews, safe modes): a column of starts and one of ends, and perhaps one of words.
 * Rows without two numbers, or that end before they start, are left out and counted. Undefined where the table is none.
 */
export function readInstrumentTimes(
  table: RawTable,
): { readonly spans: readonly InstrumentSpan[]; readonly leftOut: number } | undefined {
  const starts = table.columns.find(({ name }) => START.test(name))?.values;
  const ends = table.columns.find(({ name }) => END.test(name))?.values;
  if (starts === undefined || ends === undefined) return undefined;
  const notes = table.columns.find(({ name, texts }) => NOTE.test(name) && texts !== undefined)?.texts;
  const all = Array.from(starts, (start, row) => ({ start, end: ends[row]!, note: notes?.[row] ?? '' }));
  const spans = all.filter(({ start, end }) => Number.isFinite(start) && Number.isFinite(end) && start <= end);
  return { spans: spans.sort((a, b) => a.start - b.start), leftOut: all.length - spans.length };
}
