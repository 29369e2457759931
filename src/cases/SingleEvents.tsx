import { formatNumber } from '../core/number-format.ts';
import { useBench, useCandling, useView } from '../store/use-candling.ts';

/** Dips that stand alone, by a matched filter; one press goes there. Asked for, as few targets need them. */
export function SingleEvents() {
  const { actions } = useCandling();
  const { target, singles, prepared } = useBench();
  const source = useView((state) => state.trialSource);
  if (target === undefined || prepared === undefined) return null;
  if (singles === undefined)
    return (
      <section className="sheet-section" aria-label="Single events">
        <h3>
          Single events <span className="spread" />
          <button type="button" className="link" onClick={() => actions.findSingles()}>
            <kbd>S</kbd> look for them
          </button>
        </h3>
      </section>
    );
  const factor = prepared.fluxUnit === 'sigma' ? 1 : 1e6;
  return (
    <section className="sheet-section" aria-label="Single events">
      <h3>
        Single events <small>matched filter, box and trapezoid, against local noise</small>
      </h3>
      {singles.events.length === 0 ? (
        <p className="quiet">No single dip stands out{target.search.masked?.length ? ' of what is not masked' : ''}.</p>
      ) : (
        <table className="peaks singles">
          <thead>
            <tr>
              <th scope="col">time /&nbsp;d</th>
              <th scope="col">depth /&nbsp;{factor === 1 ? 'σ' : 'ppm'}</th>
              <th scope="col">hours</th>
              <th scope="col">S/N</th>
              <th scope="col">points</th>
              <th scope="col">shape</th>
            </tr>
          </thead>
          <tbody>
            {singles.events.map((event, index) => (
              <tr
                key={event.timeDays}
                className={source?.kind === 'single event' && source.rank === index + 1 ? 'at' : undefined}
              >
                <td>
                  <button type="button" className="link number" onClick={() => actions.pickSingle(event, index + 1)}>
                    {formatNumber(event.timeDays, 3)}
                    <span className="visually-hidden"> days: show this dip</span>
                  </button>
                </td>
                <td>{formatNumber(event.depth * factor)}</td>
                <td>{formatNumber(event.durationDays * 24, 1)}</td>
                <td>{formatNumber(event.signalToNoise, 1)}</td>
                <td>
                  {event.pointsInside}
                  {event.coverage < 0.9 && <span className="quiet"> ({formatNumber(event.coverage * 100)} %)</span>}
                </td>
                <td>
                  {event.isAtEdge ? <span title="artefacts live at the ends of runs">at an edge</span> : event.shape}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </section>
  );
}
