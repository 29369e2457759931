import { readFileSync } from 'node:fs';
import { expect, type Page, test } from '@playwright/test';
import { BenchPage, savedText } from './bench-page.ts';

interface Truth {
  readonly target: string;
  readonly rotationDays?: number;
  readonly signals: readonly { readonly periodDays?: number }[];
}
const truths: readonly Truth[] = JSON.parse(
  readFileSync(new URL('../public/demo/truths.json', import.meta.url), 'utf8'),
).targets;
const truthOf = (label: string): Truth => truths.find(({ target }) => target === label)!;

const peaksOf = (bench: BenchPage) => bench.region('Peaks of the search').getByRole('row');

/** The period in the first row of a table of peaks. */
async function firstPeriod(bench: BenchPage, region: string): Promise<number> {
  const button = bench
    .region(region)
    .getByRole('button', { name: /days: fold at/ })
    .first();
  return Number((await button.textContent())!.replace(/[^\d.]/g, ''));
}

async function choose(page: Page, bench: BenchPage, label: string): Promise<void> {
  await bench.select(label);
  await bench.searched();
  await page.keyboard.press('p');
}

test('a second planet is found in the second round, undone and done again', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await choose(page, bench, 'SR-007');
  const [first, second] = truthOf('SR-007')
    .signals.map(({ periodDays }) => periodDays!)
    .sort((a, b) => a - b);
  await page.keyboard.press('b');
  const rounds = bench.region('Rounds');
  await expect(rounds.getByRole('row')).toHaveCount(2);
  const strongest = await firstPeriod(bench, 'Peaks of the search');
  await page.keyboard.press('u');
  await expect(
    bench.region('Periodogram').getByText(/^round 2, [\d\s\u00a0]+ points of 1 signal masked/),
  ).toBeVisible();
  await expect(rounds.getByRole('row')).toHaveCount(3);
  const next = await firstPeriod(bench, 'Peaks of the search');
  const found = [strongest, next].sort((a, b) => a - b);
  expect(Math.abs(found[0]! / first! - 1)).toBeLessThan(2e-3);
  expect(Math.abs(found[1]! / second! - 1)).toBeLessThan(2e-3);
  await page.keyboard.press('p');
  await page.keyboard.press('a');
  await expect(page.getByText('From box search, round 2, peak 1.')).toBeVisible();
  await page.keyboard.press('Control+z');
  await page.keyboard.press('Control+z');
  await expect(bench.region('Periodogram').getByText('round 1, nothing masked')).toBeVisible();
});

test('the next round is held back where two stars eclipse, and may be asked for anyway', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await choose(page, bench, 'SR-008');
  await page.keyboard.press('b');
  await page.keyboard.press('u');
  await expect(bench.region('Rounds').getByText(/second dip at phase|Every other event/)).toBeVisible();
  await expect(bench.region('Periodogram').getByText('round 1, nothing masked')).toBeVisible();
  await page.getByRole('button', { name: 'search on anyway' }).click();
  await expect(bench.region('Periodogram').getByText(/^round 2/)).toBeVisible();
});

test('the other periods of a signal stand under it with their reasons, and one may be promoted', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  const before = await peaksOf(bench).count();
  await bench
    .region('Peaks of the search')
    .getByRole('button', { name: /other periods of signal 1/ })
    .click();
  expect(await peaksOf(bench).count()).toBeGreaterThan(before + 4);
  await expect(bench.region('Peaks of the search').getByText(/Its period is 2\/1 of/)).toBeVisible();
  const double = peaksOf(bench).filter({ hasText: '2P' }).first();
  await double.getByRole('button', { name: /fold at this peak/ }).click();
  await page.keyboard.press('a');
  await expect(page.getByText(/From box search, round 1, peak 1, its 2P/)).toBeVisible();
});

test('a rotation is read off the Lomb-Scargle periodogram', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await choose(page, bench, 'SR-004');
  await page.keyboard.press('l');
  const plot = bench.periodogramPlot;
  await expect(plot).toHaveAccessibleName(/Lomb-Scargle periodogram: strongest sine at/, { timeout: 30_000 });
  const words = (await plot.getAttribute('aria-label'))!;
  const period = Number(/at ([\d.]+) days/.exec(words.replace(/[\s\u00a0]/g, ' '))![1]);
  const rotation = truthOf('SR-004').rotationDays!;
  const ratio = [1, 2].map((harmonic) => Math.abs((period * harmonic) / rotation - 1));
  // Its spots come and go, which moves the strongest sine a little.
  expect(Math.min(...ratio)).toBeLessThan(0.06);
});

test('a single transit is found, made a case with its likely period, and a chance is asked for', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await choose(page, bench, 'SR-006');
  await page.keyboard.press('s');
  const singles = bench.region('Single events');
  await singles
    .getByRole('button', { name: /show this dip/ })
    .first()
    .click();
  await page.keyboard.press('a');
  await expect(bench.region('Timing').getByText('single', { exact: true })).toBeVisible();
  await expect(bench.region('Timing').getByText('likely period')).toBeVisible();
  await choose(page, bench, 'SR-001');
  await page.keyboard.press('q');
  await expect(page.getByText('under 0.01 %')).toBeVisible({ timeout: 60_000 });
  await page.keyboard.press('p');
  await page.keyboard.press('a');
  const log = await savedText(page, () => page.keyboard.press('x'));
  expect(log.text.split('\r\n')[0]).toContain('false_alarm_probability');
  expect(log.text).toMatch(/SR-006,1,/);
});

test('the docket is swept, sorted, and given one recipe', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await page.keyboard.press('Shift+S');
  await expect(page.getByText(/Sweep: \d+ of \d+ searched/)).toBeVisible();
  await expect(bench.rows.filter({ hasText: '…' })).toHaveCount(0, { timeout: 90_000 });
  await page.getByRole('button', { name: /^Sort by S\/N/ }).click();
  const strengths = (await bench.rows.allInnerTexts()).map((text) =>
    Number(
      text
        .split('\n')
        .at(-1)!
        .replace(/[^\d.]/g, ''),
    ),
  );
  expect(strengths).toEqual([...strengths].sort((a, b) => b - a));
  await page.keyboard.press('g');
  const recipe = page.getByRole('dialog', { name: /^Recipe of/ });
  await recipe.getByRole('button', { name: 'spline' }).click();
  await recipe.getByRole('button', { name: /Give this recipe to all 24 targets/ }).click();
  await page.keyboard.press('Escape');
  await bench.select('SR-002');
  await expect(bench.region('Strip').getByText(/^spline, time scale 1.5 d/)).toBeVisible();
});

test('a table of times of the instrument is left out of every target', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  const points = async () => {
    const words = (await bench.stripPlot.getAttribute('aria-label'))!;
    return Number(/([\d\s\u00a0]+) points/.exec(words)?.[1]?.replace(/\D/g, '') ?? Number.POSITIVE_INFINITY);
  };
  const before = await points();
  const table = 'start,end,what\n2459020.0,2459022.0,slew\n';
  await bench.openFiles([{ name: 'dumps.csv', mimeType: 'text/csv', buffer: Buffer.from(table) }]);
  await expect.poll(points).toBeLessThan(before - 100);
});
