import { expect, type Locator, type Page } from '@playwright/test';

/** The parts of the screen that journeys go through. */
export class BenchPage {
  constructor(readonly page: Page) {}

  readonly region = (name: string): Locator => this.page.getByRole('region', { name, exact: true });

  get rows(): Locator {
    return this.page.getByRole('listbox', { name: 'Targets' }).getByRole('option');
  }

  get stripPlot(): Locator {
    return this.region('Strip').getByRole('img', { name: /^Strip/ });
  }

  get foldPlot(): Locator {
    return this.region('Fold').getByRole('img', { name: /^Fold/ });
  }

  get periodogramPlot(): Locator {
    return this.region('Periodogram').getByRole('img');
  }

  async openDemo(): Promise<void> {
    await this.page.goto('./');
    await this.page.getByRole('button', { name: /Try the demo docket/ }).click();
    await expect(this.rows).toHaveCount(24);
    await this.searched();
  }

  async openFiles(files: readonly { name: string; mimeType: string; buffer: Buffer }[]): Promise<void> {
    const chooser = this.page.waitForEvent('filechooser');
    await this.page.keyboard.press('o');
    await (await chooser).setFiles([...files]);
  }

  async select(label: string): Promise<void> {
    await this.page.getByRole('option', { name: label }).click();
    await expect(this.page.getByRole('heading', { level: 1, name: label })).toBeVisible();
  }

  /** Waits until the periodogram of the selected target is there. */
  async searched(): Promise<void> {
    const periodogram = this.region('Periodogram');
    const plot = periodogram.getByRole('img', { name: /strongest peak/ });
    // In a narrow window the periodogram is a line of words.
    await expect(plot.or(periodogram.getByText(/^best [\d.]+/))).toBeVisible({ timeout: 60_000 });
  }

  async saved(): Promise<void> {
    await expect(this.page.locator('[data-save="saved"]')).toBeVisible();
  }

  /** The period that the fold shows, in days. */
  async foldPeriod(): Promise<number> {
    const name = await this.foldPlot.getAttribute('aria-label');
    const found = /at ([\d.\s\u00a0]+) days/.exec(name ?? '');
    return Number(found?.[1]?.replace(/[\s\u00a0]/g, ''));
  }

  async drag(plot: Locator, from: readonly [number, number], to: readonly [number, number], release = true) {
    const box = (await plot.boundingBox())!;
    const at = ([x, y]: readonly [number, number]) => [box.x + x * box.width, box.y + y * box.height] as const;
    await this.page.mouse.move(...at(from));
    await this.page.mouse.down();
    await this.page.mouse.move(...at([(from[0] + to[0]) / 2, (from[1] + to[1]) / 2]), { steps: 4 });
    await this.page.mouse.move(...at(to), { steps: 4 });
    if (release) await this.page.mouse.up();
  }
}

/** What the page saves on request, as text. */
export async function savedText(page: Page, act: () => Promise<void>): Promise<{ name: string; text: string }> {
  const download = page.waitForEvent('download');
  await act();
  const file = await download;
  const stream = await file.createReadStream();
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(chunk as Buffer);
  return { name: file.suggestedFilename(), text: Buffer.concat(chunks).toString('utf8') };
}
