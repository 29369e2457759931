import type { ReactNode } from 'react';
import { numberLabel } from '../plot/number-label.ts';
import { useBench, useCandling, useDocument, useView } from '../store/use-candling.ts';
import { FoldPane } from './FoldPane.tsx';
import { MarkForm } from './MarkForm.tsx';
import { useNarrow } from './narrow.ts';
import { PeriodogramPane } from './PeriodogramPane.tsx';
import { RoundsPane } from './RoundsPane.tsx';
import { StripPane } from './StripPane.tsx';
import { TargetLine } from './TargetLine.tsx';
import './bench.css';

/** The plots of the selected target, one over another, sharing the selected case. */
export function Bench({ chips }: { readonly chips: ReactNode }) {
  const { arrangement, periodogramHidden } = useView((state) => state);
  const narrow = useNarrow();
  return (
    <main className={`bench ${arrangement}`} aria-label="Bench" data-region="bench" tabIndex={-1}>
      <TargetLine chips={chips} />
      <Notices />
      {arrangement === 'search' ? (
        <div className="panes">
          <PeriodogramPane />
          <StripPane />
          <MarkForm />
          <div className="fold-row">
            <FoldPane />
            <RoundsPane />
          </div>
        </div>
      ) : (
        <div className="panes">
          <StripPane />
          <MarkForm />
          <FoldPane />
          {(periodogramHidden ?? narrow) ? <PeriodogramLine /> : <PeriodogramPane />}
        </div>
      )}
    </main>
  );
}

/** The periodogram folded to a line with its best peak. */
function PeriodogramLine() {
  const { view } = useCandling();
  const best = useBench().search?.peaks[0];
  return (
    <section aria-label="Periodogram" className="periodogram-line">
      <header className="pane-head">
        <h2>Periodogram</h2>
        {best && (
          <span>
            best {numberLabel(best.periodDays, 5)} d, SDE {numberLabel(best.sde, 1)}
          </span>
        )}
        <span className="spread" />
        <button type="button" className="recipe-words" onClick={() => view.setState({ periodogramHidden: false })}>
          <kbd>Y</kbd> show
        </button>
      </header>
    </section>
  );
}

function Notices() {
  const candling = useCandling();
  const { readOnly, refusal, saveState } = useDocument((state) => state);
  const notice = useView((state) => state.notice);
  const warnings = useBench().prepared?.warnings ?? [];
  const fileWarnings = useBench().target?.files.flatMap((file) => file.warnings) ?? [];
  return (
    <div className="bench-notices" aria-live="polite">
      {readOnly && (
        <p className="notice">
          <span>Read-only: this session is open for writing in another tab. Nothing can be changed here.</span>
          <span className="spread" />
          <button type="button" className="button compact" onClick={() => void candling.writeHere()}>
            write in this tab
          </button>
        </p>
      )}
      {saveState?.kind === 'not saved' && <p className="notice error">{saveState.sentence}</p>}
      {refusal !== undefined && !readOnly && (
        <p className="notice">
          <span>{refusal}</span>
          <span className="spread" />
          <button
            type="button"
            className="button compact"
            onClick={() => candling.document.setState({ refusal: undefined })}
          >
            close
          </button>
        </p>
      )}
      {notice !== undefined && (
        <p className={`notice ${notice.kind}`}>
          <span>{notice.sentence}</span>
          <span className="spread" />
          <button
            type="button"
            className="button compact"
            onClick={() => candling.view.setState({ notice: undefined })}
          >
            close
          </button>
        </p>
      )}
      {[...fileWarnings, ...warnings].map((sentence) => (
        <p key={sentence} className="notice">
          {sentence}
        </p>
      ))}
    </div>
  );
}
