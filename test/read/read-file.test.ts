import fc from 'fast-check';
import { gzipSync, strToU8 } from 'fflate';
import { describe, expect, it } from 'vitest';
import type { FileMapping } from '../../src/core/file-mapping.ts';
import { readFile } from '../../workers/read/read-file.ts';

const bufferOf = (bytes: Uint8Array): ArrayBuffer => new Uint8Array(bytes).buffer;
const read = (fileName: string, bytes: Uint8Array, mapping?: FileMapping) =>
  readFile({ jobId: 'j', fileName, bytes: bufferOf(bytes), mapping });
const readText = (text: string, mapping?: FileMapping) => read('star.csv', strToU8(text), mapping);

async function lightCurveOf(outcome: Promise<Awaited<ReturnType<typeof readFile>>>) {
  const result = await outcome;
  if (result.kind !== 'done' || result.value.kind !== 'light curve') throw new Error(JSON.stringify(result));
  return result.value;
}

async function refusalOf(outcome: Promise<Awaited<ReturnType<typeof readFile>>>): Promise<string> {
  const result = await outcome;
  if (result.kind !== 'failed') throw new Error('was read');
  return result.error.sentence;
}

const ROWS = Array.from({ length: 40 }, (_, i) => ({
  time: 2459000.5 + i / 48,
  flux: 1 + 1e-4 * Math.sin(3 * i * i),
  error: 2e-4,
}));
const csv = (header: string, rows = ROWS, separator = ',') =>
  [header, ...rows.map(({ time, flux, error }) => [time.toFixed(6), flux.toFixed(7), error].join(separator))].join(
    '\n',
  );

describe('text light curves', () => {
  it('takes time, flux and error by name, and counts Julian dates from a whole thousand', async () => {
    const { lightCurve, mapping } = await lightCurveOf(readText(csv('bjd_tdb,flux,flux_err')));
    expect(lightCurve.timeReference).toEqual({ zeroJd: 2459000, scale: 'TDB', frame: 'barycentric' });
    expect(lightCurve.time[0]).toBe(0.5);
    expect(lightCurve.fluxColumns).toHaveLength(1);
    expect(lightCurve.fluxColumns[0]).toMatchObject({ name: 'flux', unit: 'relative' });
    expect(lightCurve.fluxColumns[0]!.error![0]).toBe(2e-4);
    expect(mapping.columns.every(({ reason }) => reason !== '')).toBe(true);
  });

  it.each([
    ['semicolons', csv('bjd_tdb;flux;flux_err', ROWS, ';')],
    ['tabs', csv('bjd_tdb\tflux\tflux_err', ROWS, '\t')],
    ['ragged whitespace', csv('bjd_tdb   flux flux_err', ROWS, '   ')],
    ['a header in a comment', csv('# bjd_tdb flux flux_err', ROWS, ' ')],
    ['a byte order mark and CRLF', `\ufeff${csv('bjd_tdb,flux,flux_err').replaceAll('\n', '\r\n')}`],
    ['quotes', csv('"bjd_tdb","flux","flux_err"')],
    ['spaces after commas', csv('bjd_tdb, flux, flux_err', ROWS, ', ')],
  ])('reads the same light curve from %s', async (_, text) => {
    const plain = await lightCurveOf(readText(csv('bjd_tdb,flux,flux_err')));
    const other = await lightCurveOf(readText(text));
    expect(other.lightCurve).toEqual(plain.lightCurve);
  });

  it('leaves out a column that is empty in every row', async () => {
    const text = ['time,flux,flux_unc', '2281.9, 0.9998,', '2281.92, 1.0001,', '2281.94, 0.9999,'].join('\n');
    const { lightCurve, warnings } = await lightCurveOf(readText(text));
    expect(lightCurve.fluxColumns[0]!.error).toBeUndefined();
    expect(lightCurve.timeReference.zeroJd).toBeUndefined();
    expect(warnings.join(' ')).toContain('zero of time is not stated');
  });

  it('warns of a column of Julian dates that holds none', async () => {
    const text = ['BJD_TDB,rel_flux', '-0.04,1.0', '0.01,0.5', '0.04,1.0'].join('\n');
    const { lightCurve, warnings } = await lightCurveOf(readText(text));
    expect(lightCurve.timeReference).toMatchObject({ zeroJd: undefined, scale: 'TDB' });
    expect(warnings[0]).toContain('not Julian dates');
  });

  it('reads the zero of time from a comment', async () => {
    const text = `# time = BJD_TDB - 2457000, middle of exposure\n# exposure_s = 120\ntime,flux\n1325.1,1\n1325.2,1\n1325.3,1`;
    const { lightCurve } = await lightCurveOf(readText(text));
    expect(lightCurve.timeReference).toEqual({ zeroJd: 2457000, scale: 'TDB', frame: 'barycentric' });
    expect(lightCurve).toMatchObject({ stamp: 'middle', exposureDays: 120 / 86400 });
  });

  it('names the line that has too few columns', async () => {
    const text = csv('bjd_tdb,flux,flux_err').split('\n');
    text[7] = '2459000.6,1.0';
    expect(await refusalOf(readText(text.join('\n')))).toBe(
      'star.csv was not read. Line 8 has 2 columns, the header names 3. Correct the line, or the header.',
    );
  });

  it('asks which column is which when names say nothing, and reads the same once told', async () => {
    const asked = await readText(csv('alpha,beta,gamma'));
    if (asked.kind !== 'done' || asked.value.kind !== 'question') throw new Error('not asked');
    const roles = asked.value.mapping.columns.map(({ column, role }) => `${column}: ${role}`);
    expect(roles).toEqual(['alpha: time', 'beta: flux', 'gamma: flux error']);
    const told = await lightCurveOf(readText(csv('alpha,beta,gamma'), asked.value.mapping));
    const plain = await lightCurveOf(readText(csv('bjd_tdb,flux,flux_err')));
    expect(told.lightCurve.time).toEqual(plain.lightCurve.time);
    expect(told.lightCurve.fluxColumns[0]!.flux).toEqual(plain.lightCurve.fluxColumns[0]!.flux);
  });

  it('refuses a mapping whose columns are not there', async () => {
    const { mapping } = await lightCurveOf(readText(csv('bjd_tdb,flux,flux_err')));
    expect(await refusalOf(readText(csv('when,flux,flux_err'), mapping))).toContain('no column named bjd_tdb');
  });

  it('does not care for the order of rows and columns', async () => {
    const plain = await lightCurveOf(readText(csv('bjd_tdb,flux,flux_err')));
    await fc.assert(
      fc.asyncProperty(fc.shuffledSubarray(ROWS, { minLength: ROWS.length }), fc.boolean(), async (rows, turned) => {
        const text = turned
          ? [
              'flux_err,flux,bjd_tdb',
              ...rows.map((row) => `${row.error},${row.flux.toFixed(7)},${row.time.toFixed(6)}`),
            ].join('\n')
          : csv('bjd_tdb,flux,flux_err', rows);
        const { lightCurve } = await lightCurveOf(readText(text));
        expect(lightCurve).toEqual(plain.lightCurve);
      }),
      { numRuns: 30 },
    );
  });

  it('reads a table of stars as such', async () => {
    const result = await readText('target,ra_deg,dec_deg,teff_k,radius_rsun\nA 1,10,-5,5800,1.1\nA 2,11,-6,,0.4');
    expect(result).toMatchObject({
      kind: 'done',
      value: {
        kind: 'stars',
        rows: [
          { label: 'A 1', star: { raDeg: 10, decDeg: -5, teffK: 5800, radiusSolar: 1.1 } },
          { label: 'A 2', star: { raDeg: 11, decDeg: -6, radiusSolar: 0.4 } },
        ],
      },
    });
  });
});

describe('files that are something else', () => {
  it.each([
    ['an empty file', [], 'The file is empty'],
    ['a picture', [0x89, 0x50, 0x4e, 0x47, 1, 2, 3], 'a PNG picture'],
    ['unknown bytes', [1, 0, 2, 0, 3], 'neither FITS nor text'],
  ])('says what was found in %s', async (_, bytes, words) => {
    expect(await refusalOf(read('thing.fits', Uint8Array.from(bytes)))).toContain(words);
  });

  it('never throws on any bytes', async () => {
    await fc.assert(
      fc.asyncProperty(fc.uint8Array({ maxLength: 400 }), fc.boolean(), async (bytes, zipped) => {
        const outcome = await read('any', zipped ? gzipSync(bytes) : bytes);
        if (outcome.kind === 'failed') expect(outcome.error.detail).toBeUndefined();
      }),
      { numRuns: 300 },
    );
  });

  it('unpacks gzip of several members with zeros after them', async () => {
    const text = csv('bjd_tdb,flux,flux_err');
    const half = Math.floor(text.length / 2);
    const members = [gzipSync(strToU8(text.slice(0, half))), gzipSync(strToU8(text.slice(half))), new Uint8Array(64)];
    const zipped = new Uint8Array(members.reduce((sum, { length }) => sum + length, 0));
    let at = 0;
    for (const member of members) {
      zipped.set(member, at);
      at += member.length;
    }
    const { lightCurve } = await lightCurveOf(read('star.csv.gz', zipped));
    expect(lightCurve.time).toHaveLength(ROWS.length);
  });
});
