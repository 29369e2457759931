import { expect, test } from '@playwright/test';
import { BenchPage, savedText } from './bench-page.ts';

async function caseOfBestPeak(bench: BenchPage): Promise<void> {
  await bench.page.keyboard.press('p');
  await bench.page.keyboard.press('a');
  await expect(bench.region('Timing').getByText('linear')).toBeVisible();
  await bench.saved();
}

test('a killed tab comes back where it was, also in the middle of a drag', async ({ context }) => {
  const first = await context.newPage();
  const bench = new BenchPage(first);
  await bench.openDemo();
  await bench.select('SR-008');
  await bench.searched();
  await caseOfBestPeak(bench);
  const epoch = (page: BenchPage) => page.region('Timing').getByRole('button', { name: /^epoch/ });
  const committed = await epoch(bench).getAttribute('aria-label');
  await bench.drag(bench.foldPlot, [0.3, 0.4], [0.45, 0.4], false);
  await expect(epoch(bench)).not.toHaveAttribute('aria-label', committed!);
  // The tab dies with the button still down: no handler of the page runs.
  const devtools = await context.newCDPSession(first);
  await Promise.race([devtools.send('Page.crash').catch(() => undefined), first.waitForEvent('crash')]);
  await first.close();

  const second = await context.newPage();
  const again = new BenchPage(second);
  await second.goto('./');
  await expect(second.getByRole('heading', { level: 1, name: 'SR-008' })).toBeVisible();
  await expect(again.rows).toHaveCount(24);
  await expect(epoch(again)).toHaveAttribute('aria-label', committed!);
  await again.searched();
});

test('a session is exported, and imported where its files are not', async ({ browser, page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  await caseOfBestPeak(bench);
  await page.keyboard.press('2');
  await page.keyboard.press('Enter');
  const { name, text } = await savedText(page, () => page.keyboard.press('Shift+W'));
  expect(name).toMatch(/\.candling\.json$/);
  const document = JSON.parse(text);
  expect(document.targets[0].files[0].sha256).toMatch(/^[0-9a-f]{64}$/);
  expect(document.targets[0].cases[0].rulings[0].kind).toBe('stellar mimic');
  expect(document.app).toMatch(/^\d+\.\d+\.\d+/);

  const elsewhere = await browser.newContext({ baseURL: page.url() });
  const other = await elsewhere.newPage();
  await other.goto('./');
  const chooser = other.waitForEvent('filechooser');
  await other.getByRole('button', { name: /Import a session/ }).click();
  await (await chooser).setFiles({ name, mimeType: 'application/json', buffer: Buffer.from(text) });
  const otherBench = new BenchPage(other);
  await expect(otherBench.rows).toHaveCount(24);
  await expect(other.getByText(/24 files of this session are not on this machine/)).toBeVisible();
  await expect(other.getByRole('option', { name: 'SR-001' }).getByLabel('stellar mimic')).toBeVisible();
  await elsewhere.close();
});

test('a broken or foreign session is refused with a sentence and changes nothing', async ({ page }) => {
  const bench = new BenchPage(page);
  await bench.openDemo();
  const refused = async (name: string, text: string, words: RegExp) => {
    const chooser = page.waitForEvent('filechooser');
    await page.keyboard.press('i');
    await (await chooser).setFiles({ name, mimeType: 'application/json', buffer: Buffer.from(text) });
    await expect(page.getByText(words)).toBeVisible();
    await expect(bench.rows).toHaveCount(24);
    await page.getByRole('button', { name: 'close', exact: true }).click();
  };
  await refused(
    'torn.candling.json',
    '{"format": "candling-se',
    /torn\.candling\.json was not opened\. It is not JSON/,
  );
  await refused('other.json', '{"a": 1}', /no Candling session/);
  await refused('new.candling.json', '{"format":"candling-session","version":99}', /newer Candling/);
});

test('a second tab on the same session is read-only until it takes over', async ({ context }) => {
  const first = await context.newPage();
  const bench = new BenchPage(first);
  await bench.openDemo();
  await bench.saved();
  const second = await context.newPage();
  await second.goto('./');
  await expect(second.getByText(/open for writing in another tab/)).toBeVisible();
  await second.getByRole('button', { name: 'write in this tab' }).click();
  await expect(second.getByText(/open for writing in another tab/)).toBeHidden();
  await expect(first.getByText(/open for writing in another tab/)).toBeVisible();
});

test('the app works without cross-origin isolation too', async ({ page }) => {
  await page.route('**/*', async (route) => {
    const response = await route.fetch();
    const headers = { ...response.headers() };
    delete headers['cross-origin-opener-policy'];
    delete headers['cross-origin-embedder-policy'];
    await route.fulfill({ response, headers });
  });
  const bench = new BenchPage(page);
  await bench.openDemo();
  expect(await page.evaluate(() => globalThis.crossOriginIsolated)).toBe(false);
});

test('the page is isolated and lets nothing in from elsewhere', async ({ page }) => {
  const response = await page.goto('./');
  const policy = response!.headers()['content-security-policy']!;
  expect(policy).toContain("default-src 'self'");
  // WebAssembly may be compiled; nothing else that is unsafe, and nothing from elsewhere.
  expect(policy.replace("'wasm-unsafe-eval'", '')).not.toMatch(/unsafe|https?:/);
  expect(await page.evaluate(() => globalThis.crossOriginIsolated)).toBe(true);
});
