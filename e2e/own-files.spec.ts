import { expect, test } from '@playwright/test';
import { writeFits } from '../test/demo/fits-writer.mjs';
import { BenchPage } from './bench-page.ts';

/** An invented star with a box dip: period 2.731 d, epoch 1.3 d, 2.9 h, 1 per cent. */
const PERIOD = 2.731;

function series() {
  let state = 12345;
  const uniform = () => {
    // Park & Miller (1988): portable, so that the files are the same everywhere.
    state = (16807 * state) % 2147483647;
    return state / 2147483647;
  };
  const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  return Array.from({ length: 1400 }, (_, i) => {
    const time = 2460100.25 + i / 48;
    const phase = ((((i / 48 + 0.25 - 1.3) / PERIOD + 0.5) % 1) + 1) % 1;
    const inside = Math.abs(phase - 0.5) * PERIOD < 0.06;
    return { time, flux: 1 - (inside ? 0.01 : 0) + 0.0008 * normal(), error: 0.0008 };
  });
}

const ROWS = series();
const csvOf = (header: string, rows: typeof ROWS) =>
  [header, ...rows.map(({ time, flux, error }) => `${time.toFixed(6)},${flux.toFixed(6)},${error}`)].join('\n');
const asFile = (name: string, content: string | Uint8Array) => ({
  name,
  mimeType: 'application/octet-stream',
  buffer: Buffer.from(content as string),
});

function shuffled<T>(rows: readonly T[]): T[] {
  const copy = [...rows];
  let state = 7;
  for (let i = copy.length - 1; i > 0; i -= 1) {
    state = (16807 * state) % 2147483647;
    const j = state % (i + 1);
    [copy[i], copy[j]] = [copy[j]!, copy[i]!];
  }
  return copy;
}

async function bestPeriod(bench: BenchPage, label: string): Promise<number> {
  await bench.select(label);
  await bench.searched();
  await bench.page.keyboard.press('p');
  await expect(bench.foldPlot).toHaveAccessibleName(new RegExp(`Fold of ${label}`));
  return bench.foldPeriod();
}

test('a CSV and a FITS file of other column names are read, searched, and give the documented period', async ({
  page,
}) => {
  const bench = new BenchPage(page);
  await page.goto('./');
  const fits = writeFits({
    tables: [
      {
        name: 'SERIES',
        columns: [
          { name: 'BJD', format: 'D', unit: 'd', values: Float64Array.from(ROWS, ({ time }) => time - 2460000) },
          { name: 'RELATIVE_FLUX', format: 'E', values: Float64Array.from(ROWS, ({ flux }) => flux) },
          { name: 'SIGMA_RELATIVE_FLUX', format: 'E', values: Float64Array.from(ROWS, ({ error }) => error) },
        ],
        cards: [
          { key: 'OBJECT', value: 'own-fits' },
          { key: 'JDREF', value: 2460000, real: true },
          { key: 'TIMESYS', value: 'UTC' },
        ],
      },
    ],
  });
  await bench.openFiles([asFile('own-csv.csv', csvOf('HJD,brightness,sigma', ROWS)), asFile('own.fits', fits)]);
  await expect(bench.rows).toHaveCount(2);
  for (const label of ['own-csv', 'own-fits']) {
    const period = await bestPeriod(bench, label);
    expect(Math.abs(period / PERIOD - 1)).toBeLessThan(2e-3);
  }
});

test('shuffled rows change nothing; columns without telling names are asked about and then give the same period', async ({
  page,
}) => {
  const bench = new BenchPage(page);
  await page.goto('./');
  await bench.openFiles([
    asFile('plain.csv', csvOf('bjd_tdb,flux,flux_err', ROWS)),
    asFile('shuffled.csv', csvOf('bjd_tdb,flux,flux_err', shuffled(ROWS))),
    asFile('renamed.csv', csvOf('alpha,beta,gamma', shuffled(ROWS))),
  ]);
  const form = page.getByRole('dialog', { name: 'Columns of renamed.csv' });
  await expect(form.getByText(/alpha is time and beta is flux/)).toBeVisible();
  await expect(form.getByLabel('alpha is')).toHaveValue('time');
  await page.keyboard.press('Enter');
  await expect(bench.rows).toHaveCount(3);
  const periods: number[] = [];
  for (const label of ['plain', 'shuffled', 'renamed']) periods.push(await bestPeriod(bench, label));
  expect(periods[1]).toBe(periods[0]);
  expect(periods[2]).toBeCloseTo(periods[0]!, 5);
});

test('a file that cannot be read says why by name, and the others load', async ({ page }) => {
  const bench = new BenchPage(page);
  await page.goto('./');
  const ragged = csvOf('bjd_tdb,flux,flux_err', ROWS).split('\n');
  ragged[1203] = '2460100.5,1.0';
  await bench.openFiles([
    asFile('good.csv', csvOf('bjd_tdb,flux,flux_err', ROWS)),
    asFile('ragged.csv', ragged.join('\n')),
    asFile('picture.fits', Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10])),
  ]);
  await expect(bench.rows).toHaveCount(1);
  await expect(page.getByText('ragged.csv was not read. Line 1204 has 2 columns, the header names 3.')).toBeVisible();
  await expect(page.getByText('picture.fits was not read. It is a PNG picture.')).toBeVisible();
  await page.getByRole('button', { name: 'Dismiss ragged.csv' }).click();
  await expect(page.getByText('ragged.csv was not read.')).toBeHidden();
});

test('columns that were guessed wrong are corrected after loading', async ({ page }) => {
  const bench = new BenchPage(page);
  await page.goto('./');
  const text = csvOf('bjd_tdb,flux,flux_err', ROWS);
  await bench.openFiles([asFile('star.csv', text)]);
  await bench.searched();
  await page.keyboard.press('g');
  await page.getByRole('button', { name: 'Columns of the file' }).click();
  const form = page.getByRole('dialog', { name: 'Columns of star.csv' });
  await form.getByLabel('flux_err is').first().selectOption('ignore');
  await page.getByRole('button', { name: /Read with these columns/ }).click();
  await expect(form).toBeHidden();
  await expect(page.getByText(/errors estimated from the point-to-point scatter/)).toBeVisible();
});
