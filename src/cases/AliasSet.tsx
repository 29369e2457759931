import type { Timing } from '../core/ephemeris.ts';
import { formatNumber } from '../core/number-format.ts';
import { useBench, useCandling } from '../store/use-candling.ts';

/** The periods that still fit all the events, with their weights; one is shown, and one may be kept. */
export function AliasSet({ timing }: { readonly timing: Extract<Timing, { kind: 'alias set' }> }) {
  const { actions } = useCandling();
  const { ephemeris } = useBench();
  const longest = Math.max(...timing.periods.map(({ periodDays }) => periodDays));
  return (
    <table className="peaks alias-set">
      <thead>
        <tr>
          <th scope="col">
            <span className="visually-hidden">of the longest</span>
          </th>
          <th scope="col">period /&nbsp;d</th>
          <th scope="col">weight</th>
          <th scope="col">
            <span className="visually-hidden">keep</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {timing.periods.map(({ periodDays, weight }) => (
          <tr key={periodDays} className={ephemeris?.periodDays === periodDays ? 'at' : undefined}>
            <td className="symbol">{aliasName(longest / periodDays)}</td>
            <td>
              <button type="button" className="link number" onClick={() => actions.showAlias(periodDays)}>
                {formatNumber(periodDays, 5)}
                <span className="visually-hidden"> days: fold at this period</span>
              </button>
            </td>
            <td>{formatNumber(weight * 100, weight < 0.1 ? 1 : 0)} %</td>
            <td>
              <button
                type="button"
                className="link"
                aria-label={`Keep only ${formatNumber(periodDays, 5)} days`}
                onClick={() => actions.keepAlias(periodDays)}
              >
                keep only this
              </button>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function aliasName(ratio: number): string {
  const whole = Math.round(ratio);
  if (Math.abs(ratio - whole) > 0.01 * ratio) return '';
  return whole === 1 ? 'P' : `P/${whole}`;
}
