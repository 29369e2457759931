import { useCandling, useView } from '../store/use-candling.ts';
import type { DocketOrder } from '../store/view-store.ts';

/** Heads of the docket's columns: a press sorts by one, another turns it round, a third gives the docket's own order. */
export function DocketHeads() {
  const { view } = useCandling();
  const miniature = useView((state) => state.miniature);
  return (
    <div className="docket-heads">
      <span />
      <Head by="label" words="target" startsDescending={false} />
      <button
        type="button"
        className="wide-only"
        title={`show the ${miniature === 'fold' ? 'whole series' : 'fold'} instead`}
        onClick={() => view.setState({ miniature: miniature === 'fold' ? 'strip' : 'fold' })}
      >
        {miniature}
      </button>
      <Head by="period" words="period / d" className="wide-only right" startsDescending={false} />
      <Head by="S/N" words="S/N" className="right" startsDescending />
    </div>
  );
}

function Head(props: {
  readonly by: DocketOrder['by'];
  readonly words: string;
  readonly className?: string;
  readonly startsDescending: boolean;
}) {
  const { by, words, className, startsDescending } = props;
  const { view } = useCandling();
  const order = useView((state) => state.docketOrder);
  const isSorted = order.by === by;
  const turn = () => {
    if (!isSorted) return { by, descending: startsDescending };
    return order.descending === startsDescending ? { by, descending: !startsDescending } : UNSORTED;
  };
  const way = isSorted ? (order.descending ? ', largest first' : ', smallest first') : '';
  return (
    <button
      type="button"
      className={className}
      aria-label={`Sort by ${words}${way}`}
      aria-pressed={isSorted}
      onClick={() => view.setState({ docketOrder: turn() })}
    >
      {words}
      {isSorted && <SortSign descending={order.descending} />}
    </button>
  );
}

const UNSORTED = { by: 'docket', descending: false } as const;

function SortSign({ descending }: { readonly descending: boolean }) {
  return (
    <svg className="sort-sign" viewBox="0 0 8 8" aria-hidden="true">
      <path d={descending ? 'M1 2.5h6L4 6.5z' : 'M1 5.5h6L4 1.5z'} />
    </svg>
  );
}
