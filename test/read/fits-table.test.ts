import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readFitsTable } from '../../workers/read/fits-table.ts';
import { readFile } from '../../workers/read/read-file.ts';
import { writeFits } from '../demo/fits-writer.mjs';

const FOLDER = new URL('../reference/read/', import.meta.url);
const bytesOf = (name: string) => new Uint8Array(readFileSync(new URL(name, FOLDER)));
// Values that astropy 5.2.1 wrote, and that a reader must return: recorded beside the files.
const EXPECTED = JSON.parse(readFileSync(new URL('fixtures.json', FOLDER), 'utf8'));
const values = (bytes: Uint8Array, name: string, file = 'x.fits') => {
  const column = readFitsTable(bytes, file).columns.find((candidate) => candidate.name === name)!;
  return [...column.values].map((value) => (Number.isNaN(value) ? null : value));
};

describe('FITS binary tables written by astropy 5.2.1', () => {
  it.each(['TIME', 'FLUX', 'QUALITY', 'COUNTS'])('returns column %s exactly', (name) => {
    expect(values(bytesOf('bintable.fits'), name)).toEqual(EXPECTED['bintable.fits'][name]);
  });

  it('scales a column, and tests for null before scaling (FITS Standard 4.0, section 7.3.2)', () => {
    const expected: (number | null)[] = EXPECTED['scaled.fits'].TEMP;
    for (const [i, value] of values(bytesOf('scaled.fits'), 'TEMP').entries()) {
      if (expected[i] === null) expect(value).toBeNull();
      else expect(value).toBeCloseTo(expected[i]!, 12);
    }
  });

  it('reads the zero of time from JDREFI and JDREFF', async () => {
    const bytes = bytesOf('bintable.fits');
    const outcome = await readFile({ jobId: 'j', fileName: 'bintable.fits', bytes: bytes.buffer as ArrayBuffer });
    if (outcome.kind !== 'done' || outcome.value.kind !== 'light curve') throw new Error(JSON.stringify(outcome));
    const { lightCurve } = outcome.value;
    expect(lightCurve.timeReference).toEqual({ zeroJd: 2457000, scale: 'TDB', frame: 'barycentric' });
    expect([...lightCurve.time].map((time) => time + 2457000)).toEqual(EXPECTED['bintable.fits'].JD_TDB);
  });
});

describe('FITS binary tables of every column form', () => {
  const FILE = 'forms.fits';
  const truth = JSON.parse(readFileSync(new URL('forms.json', FOLDER), 'utf8')) as Record<string, (string | null)[]>;

  it.each(Object.keys(truth))('returns column %s bit for bit, as written by astropy', (name) => {
    const column = readFitsTable(bytesOf(FILE), FILE).columns.find((candidate) => candidate.name === name)!;
    const bits = new DataView(new ArrayBuffer(8));
    const found = [...column.values].map((value, row) => {
      if (column.texts !== undefined) return column.texts[row];
      if (Number.isNaN(value)) return null;
      bits.setFloat64(0, value);
      return bits.getBigUint64(0).toString(16).padStart(16, '0');
    });
    expect(found).toEqual(truth[name]);
  });

  it('says which columns are no series of single values', () => {
    const { warnings } = readFitsTable(bytesOf(FILE), FILE);
    expect(warnings.join('\n')).toMatch(/Column VECTOR holds 3 values/);
    expect(warnings.join('\n')).toMatch(/Column COMPLEX holds complex numbers/);
    expect(warnings.join('\n')).toMatch(/Column LIST holds arrays of varying length/);
    expect(warnings.join('\n')).toMatch(/Column WIDE: \d integers are beyond 2\^53/);
  });
});

describe('damaged FITS files', () => {
  const whole = writeFits({
    tables: [
      {
        name: 'LC',
        columns: [
          { name: 'TIME', format: 'D', values: Float64Array.from({ length: 2000 }, (_, i) => i) },
          { name: 'FLUX', format: 'E', values: Float64Array.from({ length: 2000 }, () => 1) },
        ],
      },
    ],
  });

  it('reads the rows that are there and counts those that are missing', () => {
    const { columns, warnings } = readFitsTable(whole.subarray(0, whole.length - 5760), 'cut.fits');
    expect(columns[0]!.values.length).toBeLessThan(2000);
    expect(columns[0]!.values.length).toBeGreaterThan(1400);
    expect(warnings[0]).toMatch(/breaks off: \d+ of 2000 rows are there/);
  });

  it('never throws, wherever it is cut', async () => {
    for (let cut = 0; cut < 12000; cut += 97) {
      const bytes = new Uint8Array(whole.subarray(0, cut)).buffer;
      const outcome = await readFile({ jobId: 'j', fileName: 'cut.fits', bytes });
      if (outcome.kind === 'failed') {
        expect(outcome.error.sentence).toContain('cut.fits was not read.');
        expect(outcome.error.detail).toBeUndefined();
      }
    }
  });
});
