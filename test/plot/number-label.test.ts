import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { numberLabel } from '../../src/plot/number-label.ts';

const G = '\u00a0';

describe('numberLabel', () => {
  it.each([
    [0, 0, '0'],
    [999, 0, '999'],
    [1200, 0, `1${G}200`],
    [-2000, 0, `\u22122${G}000`],
    [41280, 0, `41${G}280`],
    [1234567.5, 1, `1${G}234${G}567.5`],
    [7.31842, 5, `7.318${G}42`],
    [1204.6183, 4, `1${G}204.6183`],
    [0.00011, 5, `0.000${G}11`],
    [-0.004, 2, '0.00'],
    [Number.NaN, 2, '—'],
  ])('%d to %d decimals', (value, decimals, label) => {
    expect(numberLabel(value, decimals)).toBe(label);
  });
  it('can be read back', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e9, max: 1e9, noNaN: true }),
        fc.integer({ min: 0, max: 8 }),
        (value, decimals) => {
          const read = Number(numberLabel(value, decimals).replaceAll(G, '').replace('\u2212', '-'));
          expect(Math.abs(read - value)).toBeLessThanOrEqual(0.5 * 10 ** -decimals + 1e-6);
        },
      ),
    );
  });
});
