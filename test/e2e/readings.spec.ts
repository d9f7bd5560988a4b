// Owns reading the answer: the curve, the table of spot frequencies, runs laid over each other.
// Must not know how curves are computed or drawn.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Bench } from './bench.ts';
import { expect, test } from './bench.ts';

interface Summary {
  readonly probes: readonly {
    readonly name: string;
    readonly listed: readonly { readonly frequencyHertz: number; readonly h: { readonly Hz: { readonly db: number } } }[];
  }[];
}

function summaryOfCommandLine(job: string): Summary {
  const folder = mkdtempSync(join(tmpdir(), 'guidewall-'));
  const cli = spawnSync(process.execPath, ['dist/cli/guidewall.mjs', 'run', job, '--out', folder, '--quiet']);
  expect(cli.status).toBe(0);
  const summary: Summary = JSON.parse(readFileSync(join(folder, 'summary.json'), 'utf8'));
  return summary;
}

async function spotReadings(bench: Bench): Promise<number[]> {
  const cells = await bench.readings.locator('tbody td.num').allInnerTexts();
  return cells.map((text) => Number(text.replace('−', '-')));
}

test('the insertion ratio read from the table is the one the command line gives, at every probe', async ({ bench }) => {
  await bench.waitForEnd();
  const { probes } = summaryOfCommandLine('public/examples/cabinet-door-slot.json');
  expect(probes).toHaveLength(2);
  await bench.readings.getByRole('button', { name: 'insertion ratio' }).click();
  await bench.readings.getByRole('button', { name: 'Hz', exact: true }).click();
  for (const { name, listed } of probes) {
    await bench.readings.getByRole('combobox').first().selectOption(name);
    await expect(bench.readings.locator('tbody td.num')).toHaveCount(3);
    expect(await spotReadings(bench)).toEqual(listed.map(({ h }) => Number(h.Hz.db.toFixed(2))));
  }
});

test('a spot frequency typed into the table becomes part of the job', async ({ bench }) => {
  await bench.waitForEnd();
  await bench.readings.getByLabel('Add a spot frequency').fill('3 GHz');
  await bench.readings.getByLabel('Add a spot frequency').press('Enter');
  await expect(bench.readings.getByRole('row', { name: '3 GHz' })).toBeVisible();
  expect(JSON.parse((await bench.export('The job as a file')).text).band.listed).toContain('3 GHz');
});

test('each quantity draws a curve of its own', async ({ bench }) => {
  await bench.waitForEnd();
  const curve = bench.readings.locator('canvas').first();
  const pictures = new Set<string>();
  for (const quantity of ['level', 'spectrum', 'insertion ratio']) {
    await bench.readings.getByRole('button', { name: quantity, exact: true }).click();
    await expect.poll(async () => pictures.has((await curve.screenshot()).toString('base64')), { message: quantity }).toBe(false);
    pictures.add((await curve.screenshot()).toString('base64'));
  }
  expect(pictures.size).toBe(3);
});

test('a kept run is renamed, laid over the next one, and removed', async ({ bench, page }) => {
  await bench.waitForEnd();
  const book = page.getByRole('region', { name: 'Run book' });
  await book.getByRole('button', { name: /keep this run/ }).click();
  const name = book.getByLabel(/^Name of the run/);
  await name.fill('Slot of 4 mm');
  await name.press('Enter');
  await bench.brief.getByRole('button', { name: 'Value of w: 4 mm' }).click();
  await page.keyboard.type('20 mm');
  await page.keyboard.press('Enter');
  await bench.run();
  const overlay = book.getByLabel('Draw Slot of 4 mm over the run on show');
  await overlay.setChecked(true, { force: true });
  await expect(bench.readings.getByRole('columnheader', { name: 'Slot of 4 mm' })).toBeVisible();
  const [now, kept] = [await spotReadings(bench), 6];
  expect(now).toHaveLength(kept);
  // Row by row: this run, then the kept one. A slot five times as wide lets more through at the lowest spot.
  expect(now[0]).toBeGreaterThan(now[1] ?? Number.NaN);
  await book.getByRole('button', { name: 'Remove Slot of 4 mm' }).click();
  await expect(bench.readings.getByRole('columnheader', { name: 'Slot of 4 mm' })).toBeHidden();
});

test('a cursor is dragged along the curve, and a piece zoomed into stays in sight when the theme changes', async ({
  bench,
  page,
}) => {
  await bench.waitForEnd();
  const over = bench.readings.locator('.u-over').first();
  const box = (await over.boundingBox())!;
  const middle = box.y + box.height / 2;
  const frequency = async (): Promise<number> => {
    const text = await bench.readings.locator('.cursor-words').first().innerText();
    return Number.parseFloat(text);
  };
  await page.mouse.click(box.x + box.width * 0.25, middle);
  const first = await frequency();
  await page.mouse.move(box.x + box.width * 0.25, middle);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width * 0.6, middle, { steps: 4 });
  await page.mouse.up();
  const dragged = await frequency();
  expect(dragged).toBeGreaterThan(first + 1);

  await page.mouse.move(box.x + box.width * 0.9, middle);
  for (let turn = 0; turn < 4; turn++) await page.mouse.wheel(0, -300);
  const left = { x: box.x + 12, y: middle };
  await page.mouse.click(left.x, left.y);
  const zoomed = await frequency();
  expect(zoomed).toBeGreaterThan(first);
  await page.getByRole('button', { name: 'Turn to dark' }).click();
  await page.mouse.click(left.x, left.y);
  expect(await frequency()).toBeCloseTo(zoomed, 1);
});
