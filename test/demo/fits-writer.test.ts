import { describe, expect, it } from 'vitest';
import { formatCard, writeFits } from './fits-writer.mjs';

const ascii = (bytes: Uint8Array) => new TextDecoder('ascii').decode(bytes);

describe('a FITS card', () => {
  // FITS 4.0 (2018), section 4.2: strings quoted from column 11, logicals in column 30, numbers right-justified to 30.
  it('has 80 characters in fixed format', () => {
    expect(formatCard({ key: 'SIMPLE', value: true, comment: 'yes' })).toBe(
      `SIMPLE  =                    T / yes${' '.repeat(44)}`,
    );
    expect(formatCard({ key: 'NAXIS1', value: 36 })).toBe(`NAXIS1  =                   36${' '.repeat(50)}`);
    expect(formatCard({ key: 'OBJECT', value: "O'K" })).toBe(`OBJECT  = 'O''K    '${' '.repeat(60)}`);
    expect(formatCard({ key: 'JDREFF', value: 0, real: true })).toHaveLength(80);
  });

  it('writes reals with a decimal point and reads back to the same double', () => {
    for (const value of [0.1, 1e-7, 1.5e22, 1 / 3, -2]) {
      const text = formatCard({ key: 'X', value, real: true }).slice(10, 40).trim();
      expect(text).toContain('.');
      expect(Number(text)).toBe(value);
    }
  });

  it('refuses what does not fit', () => {
    expect(() => formatCard({ key: 'TOOLONGKEY', value: 1 })).toThrow('not a FITS keyword');
    expect(() => formatCard({ key: 'OBJECT', value: 'x'.repeat(80) })).toThrow('80 characters');
    expect(() => formatCard({ key: 'OBJECT', value: 'é' })).toThrow('ASCII');
    expect(() => formatCard({ key: 'X', value: Number.NaN })).toThrow('not finite');
  });
});

describe('a binary table', () => {
  const bytes = writeFits({
    tables: [
      {
        name: 'T',
        columns: [
          { name: 'D', format: 'D', values: [1.5, Number.NaN] },
          { name: 'E', format: 'E', values: [0.25, -3] },
          { name: 'J', format: 'J', values: [7, Number.NaN], nullValue: -1 },
          { name: 'I', format: 'I', values: [10.02, 9.98], scale: 0.01, zero: 10 },
        ],
      },
    ],
  });
  const data = new DataView(bytes.buffer, 2 * 2880);

  it('is big-endian, row by row, in whole blocks', () => {
    expect(bytes.length).toBe(3 * 2880);
    expect(data.getFloat64(0)).toBe(1.5);
    expect(data.getFloat32(8)).toBe(0.25);
    expect(data.getInt32(12)).toBe(7);
    expect(data.getFloat64(18)).toBeNaN();
    expect(data.getFloat32(26)).toBe(-3);
  });

  it('stores scaled numbers and the null value', () => {
    // physical = TZERO + TSCAL * stored (FITS 4.0, section 7.3.2)
    expect(data.getInt16(16)).toBe(2);
    expect(data.getInt16(34)).toBe(-2);
    expect(data.getInt32(30)).toBe(-1);
    expect(ascii(bytes.subarray(2880, 5760))).toContain('TNULL3  =                   -1');
  });

  it('refuses columns of different length, and integers that do not fit', () => {
    const column = (values: number[]) => ({ name: 'I', format: 'I' as const, values });
    const table = (...columns: ReturnType<typeof column>[]) => writeFits({ tables: [{ name: 'T', columns }] });
    expect(() => table(column([1]), column([1, 2]))).toThrow('differ in length');
    expect(() => table(column([1, 40000]))).toThrow('row 2: 40000 does not fit format I');
    expect(() => table(column([Number.NaN]))).toThrow('needs a nullValue');
  });
});
