import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { BenchPage } from './bench-page.ts';

async function expectNothingFound(page: Page, screen: string): Promise<void> {
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
    .analyze();
  const found = violations.map(
    ({ id, nodes }) => `${screen}: ${id} at ${nodes.map(({ target }) => target).join(' | ')}`,
  );
  expect(found).toEqual([]);
}

for (const theme of ['dark', 'light'] as const)
  test(`axe finds nothing on any screen, ${theme}`, async ({ page }) => {
    await page.emulateMedia({ colorScheme: theme });
    const bench = new BenchPage(page);
    await page.goto('./');
    await expect(page.getByRole('heading', { name: 'Open light curves to begin' })).toBeVisible();
    await expectNothingFound(page, 'first run');
    await bench.openDemo();
    await expectNothingFound(page, 'trial');
    await page.keyboard.press('p');
    await page.keyboard.press('a');
    await expectNothingFound(page, 'case');
    await page.keyboard.press('1');
    await expectNothingFound(page, 'ruling form');
    await page.keyboard.press('q');
    await page.keyboard.press('Escape');
    for (const [key, dialog] of [
      ['k', 'Park case 1'],
      ['g', 'Recipe of SR-001'],
      ['Shift+R', 'Search of SR-001'],
      ['Shift+H', 'Make a case by hand'],
      ['w', 'Session'],
      ['Shift+?', 'All keys'],
      ['Control+k', 'All commands'],
    ] as const) {
      await page.keyboard.press(key);
      await expect(page.getByRole('dialog', { name: dialog })).toBeVisible();
      await expectNothingFound(page, dialog);
      await page.keyboard.press('Escape');
      await expect(page.getByRole('dialog', { name: dialog })).toBeHidden();
    }
    await page.keyboard.press('m');
    await bench.drag(bench.stripPlot, [0.3, 0.5], [0.36, 0.5]);
    await expectNothingFound(page, 'mark form');
    await page.keyboard.press('Enter');
    await page.keyboard.press('b');
    await expectNothingFound(page, 'search arrangement');
    await page.keyboard.press('b');
    await bench.openFiles([
      { name: 'broken.csv', mimeType: 'text/csv', buffer: Buffer.from('a,b\n1,2\n3') },
      {
        name: 'asked.csv',
        mimeType: 'text/csv',
        buffer: Buffer.from(Array.from({ length: 20 }, (_, i) => `${i * 0.02},${1 + (i % 3) * 1e-3}`).join('\n')),
      },
    ]);
    await expect(page.getByRole('dialog', { name: 'Columns of asked.csv' })).toBeVisible();
    await expectNothingFound(page, 'columns');
    await page.keyboard.press('Escape');
    await expect(page.getByText(/broken\.csv was not read/)).toBeVisible();
    await expectNothingFound(page, 'unread file');
    await page.setViewportSize({ width: 1024, height: 700 });
    await expectNothingFound(page, 'narrow');
  });

test('everything on the way to a ruling is reached by keys', async ({ page }) => {
  const bench = new BenchPage(page);
  await page.goto('./');
  await expect(page.getByRole('heading', { name: 'Open light curves to begin' })).toBeVisible();
  await page.keyboard.press('d');
  await bench.searched();
  await page.keyboard.press('F6');
  await expect(bench.region('Docket')).toBeFocused();
  await page.keyboard.press('ArrowDown');
  await expect(page.getByRole('heading', { level: 1 })).toHaveText('SR-002');
  await page.keyboard.press('ArrowUp');
  await bench.searched();
  await page.keyboard.press('Control+k');
  await page.keyboard.type('strongest');
  await page.keyboard.press('Enter');
  await page.keyboard.press('a');
  await page.keyboard.press('3');
  await page.keyboard.press('w');
  await page.keyboard.press('Enter');
  await expect(page.getByRole('option', { name: 'SR-001' }).getByLabel('not astrophysical')).toBeVisible();
});
