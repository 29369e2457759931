import type { RulingKind } from './document.ts';

/** A reason that stands beside its letter in the ruling form. */
export interface Reason {
  readonly key: string;
  readonly text: string;
}

const TEXTS: Readonly<Record<RulingKind, readonly string[]>> = {
  'worth telescope time': [
    'flat-bottomed dip',
    'same depth in every event',
    'no second eclipse seen',
    'duration fits the star',
    'seen in raw flux too',
    'rare: worth a look despite doubts',
  ],
  'stellar mimic': [
    'second eclipse seen',
    'odd and even events differ in depth',
    'deep and V-shaped',
    'light moves in the dip',
    'flux varies at the same period',
    'implied radius is that of a star',
  ],
  'not astrophysical': [
    'other targets dip at the same times',
    'at the edge of a segment',
    'sudden loss of sensitivity',
    'background or scattered light',
    'one or two points only',
    'made by the detrending',
  ],
  'cannot decide': [
    'too few events',
    'too shallow for this noise',
    'gaps cover the events',
    'star parameters not known',
    'period is ambiguous',
    'blended with another signal',
  ],
};

const LETTERS = ['q', 'w', 'e', 'r', 't', 'y'];

export function reasonsFor(kind: RulingKind): readonly Reason[] {
  return TEXTS[kind].map((text, index) => ({ key: LETTERS[index]!, text }));
}
