import { useVirtualizer } from '@tanstack/react-virtual';
import { useEffect, useMemo, useRef } from 'react';
import { formatNumber } from '../core/number-format.ts';
import { RulingSign } from '../plot/RulingSign.tsx';
import { type DocketRow, shownRows } from '../store/docket-rows.ts';
import { useCandling, useDocument, useResults, useView } from '../store/use-candling.ts';
import { ChanceWords } from './ChanceWords.tsx';
import { DocketHeads } from './DocketHeads.tsx';
import { miniaturePoints } from './miniature-points.ts';
import { SittingLine } from './SittingLine.tsx';
import './docket.css';

const ROW_PX = 27;

export function Docket() {
  const candling = useCandling();
  const document = useDocument((state) => state.document);
  const summaries = useResults((state) => state.summaries);
  const { filter, docketOrder } = useView((state) => state);
  const rows = useMemo(
    () => shownRows(document, summaries, filter, docketOrder),
    [document, summaries, filter, docketOrder],
  );
  const total = document?.targets.length ?? 0;
  return (
    <section className="docket" aria-label="Docket" data-region="docket" tabIndex={-1}>
      <header className="head-line">
        <h2>Docket</h2>
        <span className="quiet small">
          {total === 0 ? 'no targets' : `${formatNumber(total)} ${total === 1 ? 'target' : 'targets'}`}
        </span>
        <span className="spread" />
        {total > 0 && (
          <button type="button" className="plain" onClick={() => candling.actions.goToNextUnruled()}>
            <kbd>N</kbd> <span className="wide-only">next unruled</span>
          </button>
        )}
      </header>
      <label className="find field">
        <kbd>/</kbd>
        <input
          id="docket-find"
          aria-label="Find in the docket"
          placeholder={total === 0 ? 'find a target' : 'find, or S/N > 10 unruled'}
          value={filter}
          onChange={(event) => candling.view.setState({ filter: event.target.value })}
          onKeyDown={(event) => {
            if (event.key !== 'Escape' && event.key !== 'Enter') return;
            if (event.key === 'Escape') candling.view.setState({ filter: '' });
            event.currentTarget.blur();
          }}
        />
      </label>
      {total === 0 ? (
        <p className="docket-empty">
          Each star you open becomes a target here, with its small fold, best period and ruling.
        </p>
      ) : (
        <>
          <SittingLine targets={document!.targets} />
          <ChanceWords />
          <Unread />
          <DocketHeads />
          <Rows rows={rows} />
          {rows.length === 0 && <p className="docket-empty">No target has these words. Escape clears them.</p>}
        </>
      )}
      {total === 0 && <Unread />}
    </section>
  );
}

function Rows({ rows }: { readonly rows: readonly DocketRow[] }) {
  const { actions } = useCandling();
  const targetId = useView((state) => state.targetId);
  const scroller = useRef<HTMLDivElement>(null);
  const virtual = useVirtualizer({
    count: rows.length,
    getScrollElement: () => scroller.current,
    estimateSize: () => ROW_PX,
    overscan: 12,
    // What a page without a layout yet (and a test) shows first.
    initialRect: { width: 272, height: 600 },
  });
  const at = rows.findIndex(({ target }) => target.id === targetId);
  useEffect(() => {
    if (at >= 0) virtual.scrollToIndex(at);
  }, [at, virtual]);
  const move = (to: number) => {
    const row = rows[Math.max(0, Math.min(rows.length - 1, to))];
    if (row !== undefined) actions.selectTarget(row.target.id);
  };
  return (
    <div
      ref={scroller}
      className="docket-rows"
      role="listbox"
      aria-label="Targets"
      tabIndex={0}
      aria-activedescendant={at >= 0 ? `docket-${targetId}` : undefined}
      onKeyDown={(event) => {
        const step = { ArrowDown: at + 1, ArrowUp: at - 1, Home: 0, End: rows.length - 1 }[event.key];
        if (step === undefined || event.shiftKey) return;
        event.preventDefault();
        move(step);
      }}
    >
      <div role="presentation" style={{ height: virtual.getTotalSize(), position: 'relative' }}>
        {virtual.getVirtualItems().map((item) => {
          const row = rows[item.index]!;
          return (
            <Row
              key={row.target.id}
              row={row}
              topPx={item.start}
              selected={item.index === at}
              onSelect={() => actions.selectTarget(row.target.id)}
            />
          );
        })}
      </div>
    </div>
  );
}

function Row(props: {
  readonly row: DocketRow;
  readonly topPx: number;
  readonly selected: boolean;
  readonly onSelect: () => void;
}) {
  const { row, topPx, selected, onSelect } = props;
  const { target, standing, periodDays, signalToNoise, smallFold, smallStrip, failure } = row;
  const miniature = useView((state) => state.miniature);
  const unsearched = smallFold === undefined && target.cases.length === 0;
  const number = (value: number | undefined, decimals: number) => (unsearched ? '…' : formatNumber(value, decimals));
  return (
    // biome-ignore lint/a11y/useKeyWithClickEvents: keys are the list's, which owns its options
    <div
      id={`docket-${target.id}`}
      className="docket-row"
      role="option"
      tabIndex={-1}
      aria-selected={selected}
      style={{ transform: `translateY(${topPx}px)` }}
      title={failure}
      onClick={onSelect}
    >
      <RulingSign kind={standing} named />
      <span className="label" title={target.label}>
        {target.label}
      </span>
      <span className="wide-only">
        {standing === 'parked' ? (
          <ParkedWords until={row.parkedUntil} />
        ) : (
          <Miniature bins={miniature === 'fold' ? smallFold : smallStrip} />
        )}
      </span>
      <span className="wide-only right number">
        {number(periodDays, periodDays !== undefined && periodDays < 10 ? 4 : 2)}
      </span>
      <span className="right number">{number(signalToNoise, 1)}</span>
    </div>
  );
}

function ParkedWords({ until }: { readonly until: string | undefined }) {
  if (until === undefined) return <span>parked</span>;
  const date = new Date(`${until}T00:00:00Z`);
  const words = date.toLocaleDateString('en-GB', { day: 'numeric', month: 'short', timeZone: 'UTC' });
  return <span className="number">to {words}</span>;
}

const FOLD_WIDTH = 64;
const FOLD_HEIGHT = 23;

function Miniature({ bins }: { readonly bins: readonly number[] | undefined }) {
  if (bins === undefined)
    return (
      <svg className="small-fold" viewBox={`0 0 ${FOLD_WIDTH} ${FOLD_HEIGHT}`} aria-hidden="true">
        <path d={`M2 ${FOLD_HEIGHT / 2}H${FOLD_WIDTH}`} className="dots" />
      </svg>
    );
  return (
    <svg className="small-fold" viewBox={`0 0 ${FOLD_WIDTH} ${FOLD_HEIGHT}`} aria-hidden="true">
      {miniaturePoints(bins, FOLD_WIDTH, FOLD_HEIGHT).map(({ x, y }) => (
        <circle key={x} cx={x} cy={y} r="1" />
      ))}
    </svg>
  );
}

/** Files that were not read: which, why, and what to do. */
function Unread() {
  const { view } = useCandling();
  const unread = useView((state) => state.unread);
  return (
    <div aria-live="polite" className="unread">
      {unread.map((file) => (
        <div className="notice error" key={`${file.fileName} ${file.sentence}`}>
          <p>{file.sentence}</p>
          <button
            type="button"
            className="button compact"
            aria-label={`Dismiss ${file.fileName}`}
            onClick={() => view.setState({ unread: unread.filter((other) => other !== file) })}
          >
            close
          </button>
        </div>
      ))}
    </div>
  );
}
