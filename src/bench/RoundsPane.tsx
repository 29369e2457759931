import { type MaskedSignal, MOST_ROUNDS } from '../core/box-search-settings.ts';
import { isSameSignal } from '../core/same-signal.ts';
import { CaseShape } from '../plot/CaseShape.tsx';
import { numberLabel } from '../plot/number-label.ts';
import type { BenchSelection } from '../store/bench-selection.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { SearchFields } from './SearchFields.tsx';

/** The rounds of the iterated search, each with the signals of those above masked. */
export function RoundsPane() {
  const { actions, targetResults } = useCandling();
  const bench = useBench();
  const { target, search } = bench;
  if (target === undefined) return null;
  const masked = target.search.masked ?? [];
  return (
    <section className="rounds-pane" aria-label="Rounds">
      <header className="pane-head">
        <h2>Rounds</h2>
        <span className="quiet">each with those above masked</span>
      </header>
      <div className="rounds-scroll">
        <table className="peaks rounds">
          <thead>
            <tr>
              <th scope="col">
                <span className="visually-hidden">round</span>
              </th>
              <th scope="col">period /&nbsp;d</th>
              <th scope="col">box depth /&nbsp;ppm</th>
              <th scope="col">SDE</th>
              <th scope="col">S/N</th>
              <th scope="col">becomes</th>
            </tr>
          </thead>
          <tbody>
            {masked.map((signal, index) => (
              <Round key={signal.periodDays} round={index + 1} signal={signal} isMasked />
            ))}
            {search?.peaks[0] && <Round round={masked.length + 1} signal={search.peaks[0]} isMasked={false} />}
          </tbody>
        </table>
        <HoldBack bench={bench} />
        <SearchFields />
      </div>
      <div className="sheet-actions rounds-actions">
        <button type="button" className="button" onClick={() => targetResults.searchAgain(target)}>
          <kbd>R</kbd> search again
        </button>
        <button
          type="button"
          className="button"
          disabled={search?.peaks[0] === undefined || masked.length + 1 >= MOST_ROUNDS}
          onClick={() => actions.nextRound()}
        >
          <kbd>U</kbd> one more round
        </button>
        <button type="button" className="button" onClick={() => actions.estimateFalseAlarms()}>
          <kbd>Q</kbd> false alarms
        </button>
      </div>
    </section>
  );
}

function Round(props: { readonly round: number; readonly signal: MaskedSignal; readonly isMasked: boolean }) {
  const { round, signal, isMasked } = props;
  const { actions } = useCandling();
  const { target, prepared, ephemeris } = useBench();
  const spanDays = prepared?.spanDays ?? 0;
  const claimed = target?.cases.find(
    ({ timing }) => timing.kind === 'linear' && isSameSignal(timing, signal, spanDays),
  );
  const isShown = ephemeris !== undefined && isSameSignal(ephemeris, signal, spanDays);
  return (
    <tr className={isShown ? 'at' : undefined}>
      <td>
        {round} {claimed && <CaseShape caseNumber={claimed.number} sizePx={10} />}
      </td>
      <td>
        <button
          type="button"
          className="link number"
          onClick={() =>
            claimed === undefined ? actions.showSignal(signal, isMasked) : actions.selectCase(claimed.id)
          }
        >
          {numberLabel(signal.periodDays, 5)}
          <span className="visually-hidden"> days: fold at the signal of round {round}</span>
        </button>
      </td>
      <td>{signal.boxDepth === undefined ? '–' : numberLabel(signal.boxDepth * 1e6)}</td>
      <td>{signal.sde === undefined ? '–' : numberLabel(signal.sde, 1)}</td>
      <td>{signal.signalToNoise === undefined ? '–' : numberLabel(signal.signalToNoise, 1)}</td>
      <td>
        {claimed !== undefined ? (
          `case ${claimed.number}`
        ) : isMasked ? (
          <button type="button" className="link" onClick={() => actions.backToRound(round)}>
            unmask from here
          </button>
        ) : (
          'nothing yet'
        )}
      </td>
    </tr>
  );
}

function HoldBack({ bench: { search } }: { readonly bench: BenchSelection }) {
  const { actions } = useCandling();
  if (search?.holdBack === undefined) return null;
  return (
    <p className="notice">
      <span>{search.holdBack}</span>
      <span className="spread" />
      <button type="button" className="button compact" onClick={() => actions.nextRound(true)}>
        search on anyway
      </button>
    </p>
  );
}
