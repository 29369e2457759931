import type { JournalEntry } from '../session/document.ts';
import { useBench, useDocument } from '../store/use-candling.ts';

const MOST_SHOWN = 40;

/** Who did what to the case (or the target, while no case is selected), newest first. */
export function Journal() {
  const { target, case: chosen } = useBench();
  const journal = useDocument((state) => state.document?.journal);
  if (target === undefined || journal === undefined) return null;
  const own = journal.filter((entry) =>
    chosen === undefined ? entry.targetId === target.id : entry.caseId === chosen.id,
  );
  if (own.length === 0) return null;
  return (
    <section className="sheet-section" aria-label="Journal">
      <h3>
        Journal <small>{chosen === undefined ? target.label : `case ${chosen.number}`}, newest first, UTC</small>
      </h3>
      <ul className="journal small">
        {own
          .toReversed()
          .slice(0, MOST_SHOWN)
          .map((entry) => (
            <Entry key={entry.id} entry={entry} />
          ))}
      </ul>
    </section>
  );
}

function Entry({ entry }: { readonly entry: JournalEntry }) {
  return (
    <li>
      <time dateTime={entry.at} title={entry.at} className="quiet number">
        {entry.at.slice(11, 16)}
      </time>
      <span className="quiet">{entry.analyst}</span>
      <span>{entry.what}</span>
    </li>
  );
}
