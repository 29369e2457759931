import { formatNumber } from '../core/number-format.ts';
import { RulingSign } from '../plot/RulingSign.tsx';
import { RULING_KINDS, type Target } from '../session/document.ts';
import { countSitting } from '../session/selectors.ts';

const FILLS = ['solid', 'hatched', 'mid', 'barred'] as const;

/** How far the sitting is: what was ruled, what waits, what is left. */
export function SittingLine({ targets }: { readonly targets: readonly Target[] }) {
  const { total, parked, left, byRuling } = countSitting(targets);
  const share = (count: number) => ({ width: `${(100 * count) / Math.max(1, total)}%` });
  return (
    <div className="sitting">
      <p className="small">
        {formatNumber(total - parked - left)} ruled, <span className="wide-only">{formatNumber(parked)} parked, </span>
        {formatNumber(left)} left
      </p>
      <div className="sitting-bar" aria-hidden="true">
        {RULING_KINDS.map((kind, index) => (
          <i key={kind} className={FILLS[index]} style={share(byRuling[kind])} />
        ))}
        <i className="parked" style={share(parked)} />
        <i className="left" style={share(left)} />
      </div>
      <ul className="sitting-counts small wide-only">
        {[...RULING_KINDS, 'parked' as const].map((kind) => (
          <li key={kind}>
            <RulingSign kind={kind} named />
            <span className="number">{formatNumber(kind === 'parked' ? parked : byRuling[kind])}</span>
          </li>
        ))}
      </ul>
    </div>
  );
}
