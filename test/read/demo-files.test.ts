import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { LightCurve } from '../../src/core/light-curve.ts';
import { readFile } from '../../workers/read/read-file.ts';

const FOLDER = new URL('../../public/demo/', import.meta.url);
const NAMES = readdirSync(FOLDER).filter((name) => /^SR-.*\.(fits|csv)$/.test(name));

async function readDemo(fileName: string) {
  const bytes = new Uint8Array(readFileSync(new URL(fileName, FOLDER))).buffer;
  const outcome = await readFile({ jobId: 'j', fileName, bytes });
  if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
  return outcome.value;
}

async function curveOf(fileName: string): Promise<LightCurve> {
  const value = await readDemo(fileName);
  if (value.kind !== 'light curve') throw new Error(value.kind);
  return value.lightCurve;
}

describe('the demo docket, an invented survey with documented forms', () => {
  it.each(NAMES)('reads %s without a question, its times in the survey’s span', async (name) => {
    const value = await readDemo(name);
    if (value.kind !== 'light curve') throw new Error(`${value.kind}: ${JSON.stringify(value).slice(0, 300)}`);
    const { timeReference, time } = value.lightCurve;
    expect(value.label).toBe(name.slice(0, 6));
    expect(timeReference).toEqual({ zeroJd: 2459000, scale: 'TDB', frame: 'barycentric' });
    expect(time[0]).toBeGreaterThan(12.2);
    expect(time.at(-1)).toBeLessThan(67.1);
    expect([...time].every((value, i) => i === 0 || value >= time[i - 1]!)).toBe(true);
  });

  it('keeps both fluxes of a FITS table and what they mean', async () => {
    const { fluxColumns, covariates, exposureDays, stamp, passband, hasQuality } = await curveOf('SR-001.fits');
    expect(fluxColumns.map(({ name, meaning, unit }) => [name, meaning, unit])).toEqual([
      ['FLUX_RAW', 'raw', 'electron/s'],
      ['FLUX_CORR', 'corrected', 'electron/s'],
    ]);
    expect(fluxColumns.every(({ error }) => error !== undefined)).toBe(true);
    expect(Object.keys(covariates)).toEqual(['CENTROID_X', 'CENTROID_Y', 'BACKGROUND']);
    expect(exposureDays).toBeCloseTo(1200 / 86400, 12);
    expect({ stamp, passband, hasQuality }).toEqual({ stamp: 'middle', passband: 'Sable R', hasQuality: true });
  });

  it('pairs each flux with the error named after it', async () => {
    const { fluxColumns } = await curveOf('SR-003.fits');
    const [raw, corrected] = fluxColumns;
    expect(corrected!.unit).toBe('relative');
    expect(raw!.error![0]! / corrected!.error![0]!).toBeGreaterThan(100);
  });

  it('knows magnitudes and ppm', async () => {
    expect((await curveOf('SR-023.csv')).fluxColumns[0]!.unit).toBe('magnitude');
    expect((await curveOf('SR-019.csv')).fluxColumns[0]!.unit).toBe('ppm');
  });

  it('leaves out rows without a time and says so', async () => {
    const value = await readDemo('SR-012.fits');
    expect(value.kind === 'light curve' && value.warnings.join(' ')).toContain('7 of 3043 rows have no time');
  });

  it('says nothing of an exposure that the file does not state', async () => {
    expect(await curveOf('SR-016.csv')).toMatchObject({
      exposureDays: undefined,
      stamp: 'unknown',
      passband: 'unknown',
      hasQuality: false,
    });
  });

  it('finds the two long gaps and the two pauses', async () => {
    expect((await curveOf('SR-001.fits')).segmentStarts).toHaveLength(4);
  });

  it('reads the stars table', async () => {
    const value = await readDemo('stars.csv');
    if (value.kind !== 'stars') throw new Error(value.kind);
    expect(value.rows).toHaveLength(23);
    expect(value.rows[0]).toMatchObject({
      label: 'SR-001',
      star: { teffK: 5880, radiusSolar: 1.07, densityCgs: 1.208 },
    });
  });
});
