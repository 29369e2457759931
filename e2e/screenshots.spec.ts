import { expect, test } from '@playwright/test';
import { BenchPage } from './bench-page.ts';

/** Pictures of the product: `npm run screenshots` puts them in e2e/screenshots; the README shows one of them. */
const FOLDER = process.env.SCREENSHOTS;

const SIZES = [
  { width: 1440, height: 900 },
  { width: 1024, height: 700 },
] as const;

for (const theme of ['dark', 'light'] as const)
  for (const size of SIZES)
    test(`the bench fits ${size.width} x ${size.height}, ${theme}`, async ({ page }) => {
      await page.emulateMedia({ colorScheme: theme });
      await page.setViewportSize(size);
      const bench = new BenchPage(page);
      const shoot = async (name: string) => {
        if (FOLDER !== undefined)
          await page.screenshot({ path: `${FOLDER}/${name}-${theme}-${size.width}x${size.height}.png` });
      };
      await page.goto('./');
      await expect(page.getByRole('heading', { name: 'Open light curves to begin' })).toBeVisible();
      await shoot('empty');
      await bench.openDemo();
      await page.keyboard.press('Shift+S');
      await expect(page.getByText(/Sweep:/)).toHaveCount(0, { timeout: 100_000 });
      await bench.select('SR-014');
      await bench.searched();
      await page.keyboard.press('p');
      await page.keyboard.press('a');
      await page.keyboard.press('1');
      for (const key of ['q', 'w', 'e', 'l']) await page.keyboard.press(key);
      await shoot('ruling');
      await page.keyboard.press('Enter');
      await bench.select('SR-014');
      await shoot('bench');
      // Nothing may be cut off: the page itself never scrolls.
      const overflow = await page.evaluate(() => [
        document.documentElement.scrollWidth - innerWidth,
        document.documentElement.scrollHeight - innerHeight,
      ]);
      expect(overflow).toEqual([0, 0]);
      for (const name of ['Timing', 'Ruling']) await expect(bench.region(name)).toBeInViewport();
    });
