import { expect, test } from '@playwright/test';
import { GUTTER_PX, RIGHT_PX } from '../src/plot/frame.ts';
import { BenchPage } from './bench-page.ts';

const numberIn = async (text: Promise<string | null>) =>
  Number((await text)!.replace(/[^\d.\u2212-]/g, '').replace('\u2212', '-'));

test('a mark is moved and sized by dragging, one undo a drag; Escape leaves it where it was', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await page.keyboard.press('m');
  await bench.drag(bench.stripPlot, [0.3, 0.5], [0.36, 0.5]);
  await page.keyboard.press('Enter');
  const mark = bench.region('Marks').getByRole('button', { name: /^dip/ });
  const start = () => numberIn(mark.textContent());
  const first = await start();
  await bench.drag(bench.stripPlot, [0.33, 0.6], [0.43, 0.6]);
  const moved = await start();
  expect(moved).toBeGreaterThan(first + 2);
  await page.keyboard.press('Control+z');
  expect(await start()).toBe(first);
  await page.keyboard.press('Control+Shift+Z');
  // The left side of it, where it is now.
  await bench.drag(bench.stripPlot, [0.4, 0.6], [0.38, 0.6]);
  expect(await start()).toBeLessThan(moved - 0.5);
  const sized = await start();
  await bench.drag(bench.stripPlot, [0.41, 0.6], [0.5, 0.6], false);
  await page.keyboard.press('Escape');
  await page.mouse.up();
  expect(await start()).toBe(sized);
});

test('the duration of a case is set by the foot of its caliper', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await page.keyboard.press('p');
  await page.keyboard.press('a');
  const duration = bench.region('Timing').getByRole('button', { name: /^box duration/ });
  const hours = () => numberIn(duration.textContent());
  const before = await hours();
  const box = (await bench.foldPlot.boundingBox())!;
  // Six durations lie across the plot: the right foot stands half of one right of the middle.
  const across = box.width - GUTTER_PX - RIGHT_PX;
  const foot = (GUTTER_PX + across / 2 + across / 12) / box.width;
  await bench.drag(bench.foldPlot, [foot, 0.06], [foot + 0.04, 0.06]);
  expect(await hours()).toBeGreaterThan(before * 1.1);
  await page.keyboard.press('Control+z');
  expect(await hours()).toBe(before);
});

test('a case is made by hand, its numbers typed over, and undone', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await page.keyboard.press('Shift+H');
  const form = page.getByRole('dialog', { name: 'Make a case by hand' });
  await form.getByLabel(/^period/).fill('3.0517');
  await form.getByLabel(/^mid-event time/).fill('13.417');
  await form.getByLabel(/^duration/).fill('2.9');
  await page.keyboard.press('Enter');
  await expect(page.getByText('Made by hand.')).toBeVisible();
  const period = bench.region('Timing').getByRole('button', { name: /^period/ });
  await period.click();
  await page.getByLabel('period in d', { exact: true }).fill('6.1034');
  await page.keyboard.press('Enter');
  expect(await bench.foldPeriod()).toBeCloseTo(6.1034, 4);
  await page.keyboard.press('Control+z');
  expect(await bench.foldPeriod()).toBeCloseTo(3.0517, 4);
});

test('a click anywhere in the periodogram folds there', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  const box = (await bench.periodogramPlot.boundingBox())!;
  await page.mouse.click(box.x + 0.3 * box.width, box.y + 0.7 * box.height);
  const first = await bench.foldPeriod();
  await page.mouse.click(box.x + 0.9 * box.width, box.y + 0.7 * box.height);
  expect(await bench.foldPeriod()).toBeGreaterThan(5 * first);
});

test('a worker that crashes fails its search with a sentence, and the next search runs in its replacement', async ({
  page,
}) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await page.keyboard.press('Shift+R');
  await page.getByLabel('oversampling of the period grid').fill('300');
  await page.keyboard.press('Enter');
  await page.keyboard.press('Escape');
  await expect(page.getByRole('progressbar')).toBeVisible();
  const searching = page.workers().filter((worker) => worker.url().includes('search'));
  expect(searching.length).toBeGreaterThanOrEqual(2);
  await searching[0]!.evaluate(() => {
    setTimeout(() => {
      throw new Error('torn by the test');
    });
  });
  await expect(bench.periodogramPlot).toContainText('A worker stopped unexpectedly.');
  await page.keyboard.press('Control+z');
  await bench.searched();
});
