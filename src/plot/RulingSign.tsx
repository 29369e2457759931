import type { ReactNode } from 'react';

/** Where a case or target stands; each sign is a light curve in miniature. */
export type SignKind =
  | 'worth telescope time'
  | 'stellar mimic'
  | 'not astrophysical'
  | 'cannot decide'
  | 'parked'
  | undefined;

const STROKE = <path d="M3.2 10.8L14.8 .2" />;

const SIGNS: Readonly<Record<NonNullable<SignKind>, ReactNode>> = {
  'worth telescope time': <path d="M0 2.5H4.5L5.5 9H12.5L13.5 2.5H18" />,
  'stellar mimic': (
    <>
      <path d="M0 2.5H4L9 9.5 14 2.5H18" />
      {STROKE}
    </>
  ),
  'not astrophysical': (
    <>
      <path d="M0 5.5H18" />
      {STROKE}
    </>
  ),
  'cannot decide': <path d="M1 5.5H17.2" strokeWidth="2.1" strokeLinecap="round" strokeDasharray="0 4" />,
  parked: (
    <>
      <path d="M0 2.5H3L4 8.5H9" />
      <path d="M11.5 .8H15.2V10.2H11.5" />
    </>
  ),
};

/** With a name where no word stands beside it; decoration where one does. */
export function RulingSign({ kind, named = false }: { readonly kind: SignKind; readonly named?: boolean }) {
  const sign = kind === undefined ? <circle cx="9" cy="5.5" r="1.15" fill="currentColor" stroke="none" /> : SIGNS[kind];
  if (!named)
    return (
      <svg className="ruling-sign" viewBox="0 0 18 11" aria-hidden="true">
        {sign}
      </svg>
    );
  return (
    <svg className="ruling-sign" viewBox="0 0 18 11" role="img" aria-label={kind ?? 'no ruling yet'}>
      {sign}
    </svg>
  );
}
