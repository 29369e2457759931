import { formatNumber } from '../core/number-format.ts';
import { isSameSignal } from '../core/same-signal.ts';
import { CaseShape } from '../plot/CaseShape.tsx';
import { useBench, useCandling, useView } from '../store/use-candling.ts';

/** The five best separate peaks of the search; one press folds at a peak. */
export function PeakTable() {
  const { actions } = useCandling();
  const { search, target, prepared } = useBench();
  const rank = useView((state) => state.trialRank);
  if (search === undefined || target === undefined) return null;
  const inSigma = prepared?.fluxUnit === 'sigma';
  return (
    <section className="sheet-section" aria-label="Peaks of the search">
      <h3>
        Peaks <small>box search, strongest first</small>
      </h3>
      {search.peaks.length === 0 ? (
        <p className="quiet">The search found no dip.</p>
      ) : (
        <table className="peaks">
          <thead>
            <tr>
              <th scope="col">
                <span className="visually-hidden">rank</span>
              </th>
              <th scope="col">period /&nbsp;d</th>
              <th scope="col">box depth /&nbsp;{inSigma ? 'σ' : 'ppm'}</th>
              <th scope="col">duration /&nbsp;h</th>
              <th scope="col">SDE</th>
              <th scope="col">S/N</th>
              <th scope="col">events</th>
            </tr>
          </thead>
          <tbody>
            {search.peaks.map((peak, index) => {
              const claimed = target.cases.find(
                ({ timing }) => timing.kind === 'linear' && isSameSignal(timing, peak, prepared?.spanDays ?? 0),
              );
              return (
                <tr key={peak.periodDays} className={rank === index + 1 ? 'at' : undefined}>
                  <td>
                    {index + 1}
                    {claimed && (
                      <span className="claimed" title={`case ${claimed.number}`}>
                        <CaseShape caseNumber={claimed.number} sizePx={10} />
                        <span className="visually-hidden">case {claimed.number}</span>
                      </span>
                    )}
                  </td>
                  <td>
                    <button type="button" className="link number" onClick={() => actions.pickPeak(peak, index + 1)}>
                      {formatNumber(peak.periodDays, 5)}
                      <span className="visually-hidden"> days: fold at this peak</span>
                    </button>
                  </td>
                  <td>{formatNumber(peak.boxDepth * (inSigma ? 1 : 1e6))}</td>
                  <td>{formatNumber(peak.durationDays * 24, 1)}</td>
                  <td>{formatNumber(peak.sde, 1)}</td>
                  <td>{formatNumber(peak.signalToNoise, 1)}</td>
                  <td>{peak.eventCount}</td>
                </tr>
              );
            })}
          </tbody>
        </table>
      )}
    </section>
  );
}
