import type { Interval } from '../core/interval.ts';
import { stableKey } from '../core/stable-key.ts';
import type { InstrumentTable, SessionDocument, Target } from '../session/document.ts';

/** Times beyond this are full Julian dates, not days of a mission or of a season. */
const LEAST_JULIAN = 2_000_000;

export function instrumentTableOf(fileName: string, spans: InstrumentTable['spans']): InstrumentTable {
  const isJulian = spans.every(({ start }) => start > LEAST_JULIAN);
  return { id: stableKey({ spans }), fileName, isJulian, spans };
}

/** The spans of a target's table, in the times of its light curve; none where the zero of those is not known. */
export function instrumentSpansOf(target: Target, document: SessionDocument | undefined): readonly Interval[] {
  const table = document?.instrumentTables.find(({ id }) => id === target.instrumentTable);
  if (table === undefined) return [];
  if (!table.isJulian) return table.spans;
  const zero = target.files[0]?.timeReference.zeroJd;
  if (zero === undefined) return [];
  return table.spans.map(({ start, end }) => ({ start: start - zero, end: end - zero }));
}
