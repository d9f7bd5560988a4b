// Owns the main job, done by mouse and keyboard: sketch, run, read, export; the command line agrees; nothing is lost.
// Must not know how the bench keeps or computes anything.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Bench } from './bench.ts';
import { expect, test } from './bench.ts';

/** A wall across the beam with a 10 mm slot in it, and a probe behind: by mouse, typed sizes, and the menu at the cursor. */
async function sketchSlot(bench: Bench): Promise<void> {
  const { page } = bench;
  await bench.startEmptyJob();
  await bench.command('Draw a wall');
  await bench.clickAt(90, 20);
  await bench.moveTo(95, 35);
  await page.keyboard.type('20');
  await page.keyboard.press('Tab');
  await page.keyboard.type('90');
  await page.keyboard.press('Enter');
  await page.keyboard.press('Enter');
  await bench.addAt('wall', 90, 50);
  await bench.clickAt(90, 70);
  await page.keyboard.press('Enter');
  await bench.addAt('probe', 130, 40);
}

interface SavedJob {
  readonly parts: readonly { readonly points: readonly (readonly [string, string])[] }[];
  readonly probes: readonly { readonly at: readonly [string, string] }[];
}

async function savedJob(bench: Bench): Promise<{ text: string; job: SavedJob }> {
  const { text } = await bench.export('The job as a file');
  const job: SavedJob = JSON.parse(text);
  return { text, job };
}

test('a wall with a slot and a probe are drawn by mouse and typed sizes, to the typed size exactly', async ({ bench }) => {
  await bench.waitForEnd();
  await sketchSlot(bench);
  const { job } = await savedJob(bench);
  const points = job.parts.map((part) => part.points.map((point) => point.map((text) => Number.parseFloat(text))));
  expect(points).toEqual([
    [
      [90, 20],
      [90, 40],
    ],
    [
      [90, 50],
      [90, 70],
    ],
  ]);
  expect(job.probes.map((probe) => probe.at.map((text) => Number.parseFloat(text)))).toEqual([[130, 40]]);
});

test('the sketched job runs, and its exports are those of the command line to the last digit', async ({ bench }) => {
  await bench.waitForEnd();
  await sketchSlot(bench);
  await bench.run();
  const fromPage = {
    'time-series.csv': (await bench.export('Time series (CSV)')).text,
    'spectrum.csv': (await bench.export('Spectrum (CSV)')).text,
  };
  const folder = mkdtempSync(join(tmpdir(), 'guidewall-'));
  writeFileSync(join(folder, 'job.json'), (await savedJob(bench)).text);
  const cli = spawnSync(
    process.execPath,
    ['dist/cli/guidewall.mjs', 'run', join(folder, 'job.json'), '--out', folder, '--quiet'],
    {
      encoding: 'utf8',
    },
  );
  expect(cli.stderr).toBe('');
  expect(cli.status).toBe(0);
  for (const [name, text] of Object.entries(fromPage)) {
    const lines = text.split('\r\n');
    const expected = readFileSync(join(folder, name), 'utf8').split('\r\n');
    expect(lines.length, `lines of ${name}`).toBeGreaterThan(200);
    const different = lines.findIndex((line, row) => line !== expected[row]);
    expect({ row: different, line: lines[different] }, name).toEqual({ row: -1, line: undefined });
    expect(lines.length, `lines of ${name}`).toBe(expected.length);
  }
});

test('undo takes back every step to the job before, and redo brings every step back', async ({ bench, page }) => {
  await bench.waitForEnd();
  const before = await savedJob(bench);
  await sketchSlot(bench);
  const drawn = await savedJob(bench);
  const undo = page.getByRole('button', { name: 'undo' });
  const redo = page.getByRole('button', { name: 'redo' });
  for (const parts of [2, 2, 1, 0]) {
    // The probe goes first, then wall by wall; the last step back is the job that was there before.
    expect((await savedJob(bench)).job.parts).toHaveLength(parts);
    await page.keyboard.press('Control+z');
  }
  await expect(undo).toBeDisabled();
  expect((await savedJob(bench)).text).toBe(before.text);
  for (let step = 0; step < 4; step++) await page.keyboard.press('Control+Shift+z');
  await expect(redo).toBeDisabled();
  expect((await savedJob(bench)).text).toBe(drawn.text);
});

test('a reload brings back the job as it was left', async ({ bench, page }) => {
  await bench.waitForEnd();
  await sketchSlot(bench);
  await bench.title.fill('Slot to be kept');
  await bench.title.press('Enter');
  const left = await savedJob(bench);
  await expect(page.getByRole('status').filter({ hasText: /^saved$/ })).toBeVisible();
  await page.reload();
  await expect(bench.title).toHaveValue('Slot to be kept');
  expect((await savedJob(bench)).text).toBe(left.text);
});

test('an edit made a moment before the tab is closed is not lost', async ({ bench, page }) => {
  await bench.waitForEnd();
  await bench.title.fill('Typed at the last moment');
  await bench.title.press('Enter');
  await page.reload();
  await expect(bench.title).toHaveValue('Typed at the last moment');
});
