/** What came of a number that the analyst typed. */
export type Typed =
  | { readonly kind: 'number'; readonly value: number }
  | { readonly kind: 'refused'; readonly sentence: string };

/** Reads a number as it is printed here or anywhere: digits in groups, either minus sign, an exponent. */
export function readTyped(text: string, mustBePositive: boolean): Typed {
  const plain = text.replace(/\s/g, '').replace(/\u2212/g, '-');
  const value = plain === '' ? Number.NaN : Number(plain);
  if (Number.isFinite(value) && (value > 0 || !mustBePositive)) return { kind: 'number', value };
  return { kind: 'refused', sentence: `Type a number${mustBePositive ? ' over 0' : ''}, with a point for decimals.` };
}

/** A number as a field opens with it: more digits than are printed, fewer than rounding noise. */
export function openTyped(value: number): string {
  return String(Number(value.toPrecision(12)));
}
