import { formatNumber } from '../core/number-format.ts';
import { useBench, useCandling, useView } from '../store/use-candling.ts';

/** The target's marks; pressing one shows it on the strip and opens it. */
export function MarkList() {
  const { actions, view } = useCandling();
  const marks = useBench().target?.marks ?? [];
  const selected = useView((state) => state.selectedMarkId);
  if (marks.length === 0) return null;
  return (
    <section className="sheet-section" aria-label="Marks">
      <h3>
        Marks <small>{formatNumber(marks.length)}, start / d</small>
      </h3>
      <ul className="mark-list">
        {marks.map((mark) => (
          <li key={mark.id} className={mark.id === selected ? 'at' : undefined}>
            <i className={`swatch ${mark.kind}`} aria-hidden="true" />
            <button
              type="button"
              className="link"
              onClick={() => view.setState({ selectedMarkId: mark.id, markDraft: { ...mark, markId: mark.id } })}
            >
              {mark.kind}, <span className="number">{formatNumber(mark.interval.start, 3)}</span>
            </button>
            <span className="quiet">{mark.note}</span>
            <span className="spread" />
            <button
              type="button"
              className="link quiet"
              aria-label={`delete the mark at ${formatNumber(mark.interval.start, 3)}`}
              onClick={() => actions.deleteMark(mark.id)}
            >
              delete
            </button>
          </li>
        ))}
      </ul>
    </section>
  );
}
