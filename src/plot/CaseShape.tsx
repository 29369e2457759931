import type { ReactNode } from 'react';

/** The eight shapes of cases as drawn on the plots, for chips and lists. */
const SHAPES: readonly ReactNode[] = [
  <circle key="1" r="4.2" />,
  <rect key="2" x="-4" y="-4" width="8" height="8" />,
  <path key="3" d="M0-4.8L4.6 3.6H-4.6Z" />,
  <path key="4" d="M0-5L5 0 0 5-5 0Z" />,
  <path key="5" d="M0 4.8L4.6-3.6H-4.6Z" />,
  <path key="6" d="M-5 0L-2.5-4.3H2.5L5 0 2.5 4.3H-2.5Z" />,
  <path key="7" d="M-5 0H5M0-5V5" />,
  <path key="8" d="M0-5L1.4-1.6 5-1.4 2.2 1 3.1 4.6 0 2.6-3.1 4.6-2.2 1-5-1.4-1.4-1.6Z" />,
];

/** @param caseNumber from 1; past eight the shapes repeat, hollow */
export function CaseShape({ caseNumber, sizePx = 12 }: { readonly caseNumber: number; readonly sizePx?: number }) {
  const index = (caseNumber - 1) % SHAPES.length;
  const colour = `var(--case-${index + 1})`;
  return (
    <svg width={sizePx} height={sizePx} viewBox="-6 -6 12 12" aria-hidden="true" style={{ flex: 'none' }}>
      <g fill={caseNumber > SHAPES.length ? 'none' : colour} stroke={colour} strokeWidth="1.4">
        {SHAPES[index]}
      </g>
    </svg>
  );
}
