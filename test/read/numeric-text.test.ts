import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readNumber } from '../../workers/read/numeric-text.ts';

describe('numbers in text', () => {
  it('reads every double back bit for bit', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const text = Object.is(value, -0) ? '-0' : String(value);
        expect(Object.is(readNumber(text), value)).toBe(true);
      }),
      { numRuns: 5000 },
    );
  });

  it('rounds as the platform does, whatever the form', () => {
    const digits = fc.string({ unit: fc.constantFrom(...'0123456789'), minLength: 1, maxLength: 25 });
    fc.assert(
      fc.property(fc.constantFrom('', '-', '+'), digits, digits, (sign, whole, fraction) => {
        const text = `${sign}${whole}.${fraction}`;
        expect(Object.is(readNumber(text), Number(text))).toBe(true);
      }),
      { numRuns: 5000 },
    );
  });

  it.each([
    ['1.5D+03', 1500],
    ['  2.5 ', 2.5],
    ['.5', 0.5],
    ['7.', 7],
    ['-0', -0],
  ])('reads %s', (text, value) => expect(Object.is(readNumber(text), value)).toBe(true));

  it.each(['', 'nan', 'NaN', '--', 'null', ' '])('takes "%s" for missing', (text) =>
    expect(readNumber(text)).toBeNaN(),
  );

  it.each(['abc', '1.2.3', '0x10', '1e', '12 h'])('does not take "%s" for a number', (text) =>
    expect(readNumber(text)).toBeUndefined(),
  );
});
