import type { TimeReference } from './light-curve.ts';

const FRAMES = { barycentric: 'BJD', heliocentric: 'HJD', geocentric: 'JD', unknown: 'JD' } as const;

export interface TimeWords {
  /** "BJD" and "TDB" for a subscript; the scale is undefined where the file does not say. */
  readonly name: string;
  readonly scale: string | undefined;
  /** "2 459 000" after a minus sign; undefined where time is a full Julian date. */
  readonly zero: string | undefined;
}

/** How an axis names its time; undefined zero and scale are said, never filled in. */
export function timeWords({ zeroJd, scale, frame }: TimeReference): TimeWords {
  if (zeroJd === undefined) return { name: 'days from an unknown zero', scale: undefined, zero: undefined };
  const zero = zeroJd === 0 ? undefined : String(zeroJd).replace(/\B(?=(\d{3})+(?!\d))(?<!\.\d*)/g, '\u00a0');
  return { name: FRAMES[frame], scale: scale === 'unknown' ? undefined : scale, zero };
}

/** One line for axis titles and screen readers: "BJD TDB − 2 459 000 / d". */
export function timeTitle(reference: TimeReference): string {
  const { name, scale, zero } = timeWords(reference);
  if (reference.zeroJd === undefined) return name;
  return `${name}${scale === undefined ? ', scale not stated' : ` ${scale}`}${zero === undefined ? '' : ` \u2212 ${zero}`} / d`;
}
