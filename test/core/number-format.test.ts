import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimalsFor, formatConcise, formatNumber, formatValueWithError } from '../../src/core/number-format.ts';

const plain = (text: string) => text.replaceAll('\u00a0', ' ').replaceAll('\u2212', '-');

describe('printed numbers', () => {
  it.each([
    [1204.6183, 4, '1 204.6183'],
    [7.31842, 5, '7.318 42'],
    [-1086, 0, '-1 086'],
    [999.9999, 0, '1 000'],
    [-0.0001, 2, '0.00'],
    [1234567.1, 1, '1 234 567.1'],
  ])('groups %d', (value, decimals, text) => expect(plain(formatNumber(value, decimals))).toBe(text));

  it('has a dash for what was not computed', () => {
    expect(formatNumber(undefined)).toBe('—');
    expect(formatNumber(Number.NaN)).toBe('—');
  });

  // Two figures of an error whose first digit is 1 to 5, else one; carries are rounded before the digit is looked at.
  it.each([
    [0.00011, 5],
    [0.0009, 4],
    [0.0996, 2],
    [0.0596, 2],
    [0.0544, 3],
    [12.3, 0],
    [57, 0],
    [4321, 0],
  ])('an error of %d needs %d decimals', (error, decimals) => expect(decimalsFor(error)).toBe(decimals));

  it.each([
    [7.31842, 0.00011, '7.318 42', '± 0.000 11'],
    [1204.6183, 0.0009, '1 204.6183', '± 0.0009'],
    [1118.3, 52, '1 118', '± 52'],
    [0.31, 0.0996, '0.31', '± 0.10'],
  ])('prints %d ± %d to one decimal of both', (value, error, left, right) => {
    const shown = formatValueWithError(value, error);
    expect([plain(shown.value), plain(shown.error)]).toEqual([left, right]);
  });

  it('says that an error is not known', () => expect(formatValueWithError(1, undefined, 2).error).toBe('± not known'));

  it.each([
    [7.31842, 0.00011, '7.318 42(11)'],
    [1204.6183, 0.0009, '1 204.6183(9)'],
    [0.31, 0.0996, '0.31(10)'],
    [1118.3, 52, '1 118(52)'],
  ])('writes %d(%d) concisely', (value, error, text) => expect(plain(formatConcise(value, error))).toBe(text));

  it('never prints a value further from itself than half its last digit', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-9, max: 1e3, noNaN: true }),
        (value, error) => {
          const decimals = decimalsFor(error)!;
          const shown = Number(plain(formatValueWithError(value, error).value).replaceAll(' ', ''));
          expect(Math.abs(shown - value)).toBeLessThanOrEqual(0.5000001 * 10 ** -decimals);
        },
      ),
    );
  });
});
