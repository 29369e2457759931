import { readFileSync } from 'node:fs';
import { expect, test } from '@playwright/test';
import { GUTTER_PX, RIGHT_PX } from '../src/plot/frame.ts';
import { BenchPage, savedText } from './bench-page.ts';

const truths = JSON.parse(readFileSync(new URL('../public/demo/truths.json', import.meta.url), 'utf8'));

interface Truth {
  readonly target: string;
  readonly signals: readonly {
    readonly periodDays?: number;
    readonly depthPpm: number;
    readonly durationHours: number;
  }[];
}
const truthOf = (label: string): Truth =>
  (truths.targets as Truth[]).find(({ target }) => target === label) ??
  (() => {
    throw new Error(`no truth of ${label}`);
  })();

test('an analyst works through the demo docket: look, fold, mark, make a case, rule, park, export', async ({
  page,
}) => {
  const errors: string[] = [];
  page.on('pageerror', (error) => errors.push(String(error)));
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(message.text());
  });
  const bench = new BenchPage(page);
  await bench.openDemo();

  await test.step('the best peak is the planet', async () => {
    await page.keyboard.press('p');
    await expect(bench.foldPlot).toHaveAccessibleName(/Fold of SR-001 at/);
    const { periodDays } = truthOf('SR-001').signals[0]!;
    expect(Math.abs((await bench.foldPeriod()) / periodDays! - 1)).toBeLessThan(1e-3);
  });

  await test.step('the period is halved, doubled, nudged, typed and dragged, and each can be undone', async () => {
    const before = await bench.foldPeriod();
    await page.keyboard.press('h');
    expect(await bench.foldPeriod()).toBeCloseTo(before / 2, 4);
    await page.keyboard.press('d');
    expect(await bench.foldPeriod()).toBeCloseTo(before, 4);
    await page.keyboard.press('ArrowRight');
    expect(await bench.foldPeriod()).toBeGreaterThan(before);
    await page.getByLabel('Period in days').fill('3.06');
    await page.keyboard.press('Enter');
    expect(await bench.foldPeriod()).toBeCloseTo(3.06, 5);
    await page.getByLabel('Period in days').blur();
    await page.keyboard.press('p');
    await page.keyboard.press('a');
    await expect(bench.region('Timing').getByText('linear')).toBeVisible();
    const epoch = bench.region('Timing').getByRole('button', { name: /^epoch/ });
    const asFitted = await epoch.getAttribute('aria-label');
    await bench.drag(bench.foldPlot, [0.3, 0.4], [0.4, 0.4]);
    await expect(epoch).not.toHaveAttribute('aria-label', asFitted!);
    await page.keyboard.press('Control+z');
    await expect(epoch).toHaveAttribute('aria-label', asFitted!);
    await page.keyboard.press('Control+Shift+Z');
    await expect(epoch).not.toHaveAttribute('aria-label', asFitted!);
    await page.keyboard.press('Control+z');
  });

  await test.step('raw, trend and prepared flux are shown', async () => {
    for (const view of ['raw', 'trend', 'prepared']) {
      await page.keyboard.press('t');
      await expect(bench.stripPlot).toHaveAccessibleName(new RegExp(`: ${view} flux`));
    }
  });

  await test.step('the strip zooms, pans and fits again', async () => {
    const box = (await bench.stripPlot.boundingBox())!;
    const before = await bench.stripPlot.screenshot();
    await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2);
    await page.mouse.wheel(0, -600);
    await expect.poll(async () => before.equals(await bench.stripPlot.screenshot())).toBe(false);
    const zoomed = await bench.stripPlot.screenshot();
    await bench.drag(bench.stripPlot, [0.6, 0.6], [0.4, 0.6]);
    await expect.poll(async () => zoomed.equals(await bench.stripPlot.screenshot())).toBe(false);
    await page.mouse.dblclick(box.x + box.width / 2, box.y + box.height / 2);
    await page.keyboard.press('Shift+ArrowRight');
    await page.keyboard.press('f');
  });

  await test.step('a dip is marked, noted, changed and deleted', async () => {
    await page.keyboard.press('m');
    await bench.drag(bench.stripPlot, [0.3, 0.5], [0.34, 0.5]);
    await page.getByRole('button', { name: 'artefact', exact: true }).click();
    await page.getByLabel('Note of the mark').fill('ghost');
    await page.keyboard.press('Enter');
    const marks = bench.region('Marks');
    await expect(marks.getByText('ghost')).toBeVisible();
    await marks.getByRole('button', { name: /artefact/ }).click();
    await page.getByRole('button', { name: 'flare', exact: true }).click();
    await page.getByRole('button', { name: /save mark/ }).click();
    await expect(marks.getByRole('button', { name: /flare/ })).toBeVisible();
    await marks.getByRole('button', { name: /flare/ }).click();
    await page.getByRole('button', { name: 'delete', exact: true }).click();
    await expect(marks).toBeHidden();
    await page.keyboard.press('Control+z');
    await expect(marks).toBeVisible();
  });

  await test.step('the case is ruled on by keys alone, and the next unruled target comes up', async () => {
    await page.keyboard.press('1');
    await page.keyboard.press('q');
    await page.keyboard.press('w');
    await page.keyboard.press('l');
    await page.getByLabel('Note', { exact: true }).fill('=clean, twice');
    await page.keyboard.press('Control+Enter');
    await expect(page.getByRole('heading', { level: 1 })).toHaveText('SR-002');
    await expect(page.getByRole('option', { name: 'SR-001' }).getByLabel('worth telescope time')).toBeVisible();
  });

  await test.step('a later ruling supersedes, and the journal keeps both', async () => {
    await bench.select('SR-001');
    await page.keyboard.press('4');
    await page.keyboard.press('q');
    await page.keyboard.press('Enter');
    await bench.select('SR-001');
    const journal = bench.region('Journal');
    await expect(journal.getByText('ruled cannot decide, before worth telescope time')).toBeVisible();
    await expect(journal.getByText('ruled worth telescope time', { exact: true })).toBeVisible();
  });

  await test.step('a case is parked with a reason and a date', async () => {
    await bench.select('SR-003');
    await bench.searched();
    await page.keyboard.press('p');
    await page.keyboard.press('a');
    await page.keyboard.press('k');
    await page.getByLabel('waits for').fill('a second season');
    await page.getByLabel(/until/).fill('2027-01-14');
    await page.keyboard.press('Enter');
    await expect(page.getByText('Parked until 2027-01-14: a second season', { exact: true })).toBeVisible();
    await expect(page.getByRole('option', { name: 'SR-003' }).getByText('to 14 Jan')).toBeVisible();
  });

  await test.step('a single event becomes a case of its mark', async () => {
    await bench.select('SR-006');
    await bench.searched();
    const box = (await bench.stripPlot.boundingBox())!;
    // The documented event at 48.631 on a strip from 12.3 to 67.
    const x = GUTTER_PX + ((48.631 - 12.03) / (67.27 - 12.03)) * (box.width - GUTTER_PX - RIGHT_PX);
    await page.keyboard.press('m');
    await bench.drag(bench.stripPlot, [(x - 8) / box.width, 0.5], [(x + 8) / box.width, 0.5]);
    await page.keyboard.press('Enter');
    await page.getByLabel('Note of the mark').waitFor({ state: 'hidden' });
    await page.keyboard.press('Shift+A');
    await expect(bench.region('Timing').getByText('single')).toBeVisible();
  });

  await test.step('the vetting log holds every case, and no formula', async () => {
    const { name, text } = await savedText(page, () => page.keyboard.press('x'));
    expect(name).toMatch(/vetting-log\.csv$/);
    expect(text).toContain('SR-001,1,cannot decide');
    expect(text).toContain('a second season,2027-01-14');
    expect(text).toContain("'=clean");
    expect(text.split('\r\n').length).toBeGreaterThan(24);
    const json = await savedText(page, () => page.keyboard.press('Shift+X'));
    expect(JSON.parse(json.text).rows.length).toBeGreaterThanOrEqual(24);
  });

  expect(errors).toEqual([]);
});

test('a cancelled search ends at once and does not come back by itself', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await page.keyboard.press('Shift+R');
  // A grid this fine takes long enough to be cancelled.
  await page.getByLabel('oversampling of the period grid').fill('300');
  await page.keyboard.press('Enter');
  await page.keyboard.press('Escape');
  const cancel = page.getByRole('button', { name: /cancel; flux and cases stay/ });
  await cancel.click();
  await expect(bench.periodogramPlot).toContainText('The search was cancelled.', { timeout: 2000 });
  await page.keyboard.press('Control+z');
  await bench.searched();
});

test('a recipe changed while a search runs drops that search’s answer', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  const trials = bench.region('Periodogram').getByRole('button', { name: /trial periods/ });
  const before = await trials.textContent();
  await page.keyboard.press('Shift+R');
  await page.getByLabel('oversampling of the period grid').fill('200');
  await page.keyboard.press('Enter');
  await page.keyboard.press('Escape');
  await expect(page.getByRole('progressbar')).toBeVisible();
  await page.keyboard.press('Control+z');
  await bench.searched();
  await expect(trials).toHaveText(before!);
});
