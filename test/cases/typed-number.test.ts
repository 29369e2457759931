import { describe, expect, it } from 'vitest';
import { readHandTiming } from '../../src/cases/hand-timing.ts';
import { openTyped, readTyped } from '../../src/cases/typed-number.ts';
import { formatNumber } from '../../src/core/number-format.ts';

describe('a typed number', () => {
  it('is read as it is printed: groups, true minus, exponent', () => {
    for (const value of [7.31842, -1204.6183, 0, 1e-7, 123456.654321])
      expect(readTyped(formatNumber(value, 9), false)).toEqual({ kind: 'number', value });
    expect(readTyped(' 2.5e3 ', true)).toEqual({ kind: 'number', value: 2500 });
  });

  it('is refused with a sentence where it is none', () => {
    for (const text of ['', '  ', 'seven', '7,3184', '1/3', 'Infinity', 'NaN'])
      expect(readTyped(text, false)).toEqual({
        kind: 'refused',
        sentence: 'Type a number, with a point for decimals.',
      });
    for (const text of ['0', '-3', '\u22123'])
      expect(readTyped(text, true)).toMatchObject({ kind: 'refused', sentence: expect.stringContaining('over 0') });
  });

  it('opens with all the digits that matter and no rounding noise', () => {
    expect(openTyped(0.1 + 0.2)).toBe('0.3');
    expect(openTyped(7.31842123456)).toBe('7.31842123456');
  });
});

describe('a timing by hand', () => {
  const fields = { kind: 'linear', period: '7.3184', epoch: '\u22121 204.6', hours: '3' } as const;

  it('is in days', () =>
    expect(readHandTiming(fields)).toEqual({
      kind: 'linear',
      periodDays: 7.3184,
      epochDays: -1204.6,
      durationDays: 0.125,
    }));

  it('of one event needs no period', () =>
    expect(readHandTiming({ ...fields, kind: 'single', period: '' })).toEqual({
      kind: 'single',
      epochDays: -1204.6,
      durationDays: 0.125,
    }));

  it('is none with a field missing or an event longer than the period', () => {
    for (const change of [{ period: '' }, { epoch: '' }, { hours: '0' }, { period: '0.125' }, { period: '-7' }])
      expect(readHandTiming({ ...fields, ...change })).toBeUndefined();
  });
});
