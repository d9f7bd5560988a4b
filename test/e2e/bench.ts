// Owns how the browser tests handle the bench: by its roles, labels and words, as a person would.
// Must not know what any test asserts.
import { readFile } from 'node:fs/promises';
import { expect, test as base } from '@playwright/test';
import type { Download, Locator, Page } from '@playwright/test';

export class Bench {
  readonly page: Page;
  readonly sheet: Locator;
  readonly runStrip: Locator;
  readonly brief: Locator;
  readonly readings: Locator;
  readonly title: Locator;
  /** What the page complained of: uncaught errors, console errors, breaches of the content security policy. */
  readonly complaints: string[] = [];
  /** Address of every request since the page was opened. */
  readonly requests: string[] = [];

  constructor(page: Page) {
    this.page = page;
    this.sheet = page.getByRole('application', { name: 'Sheet' });
    this.runStrip = page.getByRole('region', { name: 'Run', exact: true });
    this.brief = page.getByLabel('Brief', { exact: true });
    this.readings = page.getByRole('region', { name: 'Readings' });
    this.title = page.getByLabel('Title of the job');
    page.on('pageerror', (error) => this.complaints.push(String(error)));
    page.on('console', (message) => {
      if (message.type() === 'error' || message.type() === 'warning') this.complaints.push(message.text());
    });
    page.on('request', (request) => this.requests.push(request.url()));
  }

  async open(): Promise<void> {
    // Without the pickers of the file system, which no test can click, files come and go as downloads and uploads.
    await this.page.addInitScript(() => {
      Reflect.deleteProperty(window, 'showOpenFilePicker');
      Reflect.deleteProperty(window, 'showSaveFilePicker');
    });
    await this.page.goto('/');
    await expect(this.sheet).toBeVisible();
  }

  async startEmptyJob(): Promise<void> {
    await this.command('Begin an empty job');
    await expect(this.title).toHaveValue('Untitled');
  }

  async openExample(title: string): Promise<void> {
    await this.page.getByRole('button', { name: 'examples' }).click();
    await this.page.getByRole('menuitem', { name: title }).click();
    await expect(this.title).toHaveValue(title);
  }

  /** By the finder of commands, as a person who knows what they want. */
  async command(label: string): Promise<void> {
    await this.page.keyboard.press('Control+k');
    await this.page.getByPlaceholder('What shall be done?').fill(label);
    await this.page.getByRole('option', { name: label }).first().click();
    await expect(this.page.getByPlaceholder('What shall be done?')).toBeHidden();
  }

  /** Starts the run and waits for its end, reference run included. */
  async run(): Promise<void> {
    await this.runStrip.getByRole('button', { name: 'Run', exact: true }).click();
    await this.waitForEnd();
  }

  /** Runs from t = 0 at a pace an eye can follow, and holds soon after a step. */
  async holdAfter(step: number, pace: string): Promise<void> {
    await this.runStrip.getByRole('button', { name: 'back to t = 0' }).click();
    await expect.poll(() => this.step()).toBe(0);
    await this.runStrip.getByLabel('Pace').selectOption({ label: pace });
    await this.runStrip.getByRole('button', { name: 'Run', exact: true }).click();
    await expect.poll(() => this.step(), { intervals: [20] }).toBeGreaterThan(step);
    await this.runStrip.getByRole('button', { name: 'Hold' }).click();
    await expect(this.runStrip.getByRole('button', { name: 'Resume' })).toBeVisible();
  }

  async waitForEnd(): Promise<void> {
    await expect(this.runStrip.getByText(/ended/)).toBeVisible({ timeout: 45_000 });
    await expect(this.runStrip.getByText('the job has changed since')).toBeHidden();
    await expect(this.page.getByText('The reference run is under way.')).toHaveCount(0, { timeout: 45_000 });
  }

  /** The time step the run strip stands at. */
  async step(): Promise<number> {
    const words = await this.runStrip.locator('.run-strip-words').innerText();
    const match = /step ([\d\u00a0]+)/.exec(words);
    return match === null ? 0 : Number(match[1]?.replaceAll('\u00a0', ''));
  }

  /** Pixels of the page at a place of the sheet in millimetres, found by reading the coordinates under the pointer. */
  async pixelsAt(xMillimetres: number, yMillimetres: number): Promise<{ x: number; y: number }> {
    const box = await this.sheet.boundingBox();
    if (box === null) throw new Error('The sheet is not on the screen.');
    const [low, high] = [0.35, 0.65].map((share) => ({ x: box.x + share * box.width, y: box.y + share * box.height }));
    if (low === undefined || high === undefined) throw new Error('Unreachable.');
    const [atLow, atHigh] = [await this.readPlace(low), await this.readPlace(high)];
    const along = (value: number, from: number, to: number, a: number, b: number): number =>
      a + ((value - from) * (b - a)) / (to - from);
    return {
      x: along(xMillimetres, atLow.x, atHigh.x, low.x, high.x),
      y: along(yMillimetres, atLow.y, atHigh.y, low.y, high.y),
    };
  }

  async clickAt(xMillimetres: number, yMillimetres: number, button: 'left' | 'right' = 'left'): Promise<void> {
    const { x, y } = await this.pixelsAt(xMillimetres, yMillimetres);
    await this.page.mouse.click(x, y, { button });
  }

  async moveTo(xMillimetres: number, yMillimetres: number): Promise<void> {
    const { x, y } = await this.pixelsAt(xMillimetres, yMillimetres);
    await this.page.mouse.move(x, y);
  }

  /** From the menu that opens at a place of the sheet. */
  async addAt(thing: string, xMillimetres: number, yMillimetres: number): Promise<void> {
    await this.clickAt(xMillimetres, yMillimetres, 'right');
    await this.page.getByRole('menuitem', { name: thing, exact: true }).click();
    await expect(this.page.getByRole('menu')).toBeHidden();
  }

  private async readPlace(at: { x: number; y: number }): Promise<{ x: number; y: number }> {
    await this.page.mouse.move(at.x, at.y);
    const readout = this.sheet.locator('.sheet-readout');
    await expect(readout).toHaveText(/x .*\d.* y .*\d/);
    const numbers = (await readout.innerText()).replaceAll('−', '-').match(/-?\d+(?:\.\d+)?/g) ?? [];
    return { x: Number(numbers[0]), y: Number(numbers[1]) };
  }

  /** Chooses from the export menu and gives the text of what is downloaded. */
  async export(item: string): Promise<{ text: string; name: string }> {
    await this.page.getByRole('button', { name: 'export' }).click();
    const [download] = await Promise.all([
      this.page.waitForEvent('download'),
      this.page.getByRole('menuitem', { name: item }).click(),
    ]);
    return { text: await textOf(download), name: download.suggestedFilename() };
  }

  async dropFile(name: string, text: string): Promise<void> {
    const transfer = await this.page.evaluateHandle(
      ([fileName, contents]) => {
        const made = new DataTransfer();
        made.items.add(new File([contents ?? ''], fileName ?? '', { type: 'application/json' }));
        return made;
      },
      [name, text],
    );
    await this.sheet.dispatchEvent('dragover', { dataTransfer: transfer });
    await this.sheet.dispatchEvent('drop', { dataTransfer: transfer });
  }

  /** The picture of the field, coarsely: changes when the wave moves. */
  async fieldPixels(): Promise<string> {
    return this.sheet
      .locator('canvas')
      .first()
      .evaluate((canvas) => {
        if (!(canvas instanceof HTMLCanvasElement)) throw new Error('The field is not a canvas.');
        // Read from a copy: reading the canvas itself would move it out of the memory it is painted in.
        const copy = new OffscreenCanvas(96, 64).getContext('2d', { willReadFrequently: true });
        if (copy === null) throw new Error('There is no second canvas to be had.');
        copy.drawImage(canvas, 0, 0, 96, 64);
        return copy.getImageData(0, 0, 96, 64).data.join();
      });
  }
}

async function textOf(download: Download): Promise<string> {
  return readFile(await download.path(), 'utf8');
}

export const test = base.extend<{ bench: Bench }>({
  bench: async ({ page }, provide) => {
    const bench = new Bench(page);
    await bench.open();
    await provide(bench);
    expect(bench.complaints, 'the page complained').toEqual([]);
  },
});

export { expect } from '@playwright/test';
