// Owns the main job, done by mouse and keyboard: sketch, run, read, export; the command line agrees; nothing is lost.
// Must not know how the bench keeps or computes anything.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Bench, expect, test } from './bench.ts';

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

test('the sketched job runs, and its exports are those of the command line for the same job', async ({ bench }) => {
  await bench.waitForEnd();
  await sketchSlot(bench);
  await bench.run();
  const series = (await bench.export('Time series (CSV)')).text;
  const spectrum = (await bench.export('Spectrum (CSV)')).text;
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
  expectSameLines(series, readFileSync(join(folder, 'time-series.csv'), 'utf8'));
  expectSameSpectra(spectrum, readFileSync(join(folder, 'spectrum.csv'), 'utf8'));
});

/** The samples are the same to the last digit. */
function expectSameLines(fromPage: string, fromCommandLine: string): void {
  const [lines, expected] = [fromPage.split('\r\n'), fromCommandLine.split('\r\n')];
  expect(lines.length).toBeGreaterThan(200);
  const different = lines.findIndex((line, row) => line !== expected[row]);
  expect({ row: different, line: lines[different] }).toEqual({ row: -1, line: undefined });
  expect(lines.length).toBe(expected.length);
}

/**
 * Sine and cosine of two versions of the JavaScript engine may differ in their last bit (ECMAScript leaves them to the
 * engine), and the sums of a spectrum collect that: at most the number of steps (some thousands) times 2^-53 of the
 * largest E or H, 1e-12 of it; H(f) divides two such sums, and is compared where it stands above its floor.
 */
function expectSameSpectra(fromPage: string, fromCommandLine: string): void {
  const [page, commandLine] = [readCsv(fromPage), readCsv(fromCommandLine)];
  expect(page.head).toEqual(commandLine.head);
  expect(page.rows.length).toBe(201);
  expect(page.rows.length).toBe(commandLine.rows.length);
  page.columns.forEach((name, k) => {
    const alike = [...page.columns.keys()].filter((at) => unitOf(page.columns[at]) === unitOf(name));
    const largest = Math.max(...page.rows.flatMap((row) => alike.map((at) => Math.abs(row[at] ?? 0))));
    const ratio = / H( |$)/.test(name);
    const floorFlag = page.columns.findIndex((other, at) => at >= k && other.endsWith('H below floor'));
    const worst = page.rows.reduce((most, row, at) => {
      if (ratio && row[floorFlag] === 1) return most;
      return Math.max(most, Math.abs((row[k] ?? Number.NaN) - (commandLine.rows[at]?.[k] ?? Number.NaN)));
    }, 0);
    expect(worst, name).toBeLessThanOrEqual(ratio ? 1e-6 : 1e-12 * largest);
  });
}

/** "V/m/Hz" of "Probe 1 Ez re (V/m/Hz)". */
function unitOf(column: string | undefined): string {
  return /\(([^)]*)\)$/.exec(column ?? '')?.[1] ?? '';
}

function readCsv(text: string): { head: string[]; columns: string[]; rows: number[][] } {
  const lines = text.trimEnd().split('\r\n');
  const first = lines.findIndex((line) => line.startsWith('f (Hz)'));
  return {
    head: lines.slice(0, first + 1),
    columns: (lines[first] ?? '').split(','),
    rows: lines.slice(first + 1).map((line) => line.split(',').map(Number)),
  };
}

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

test('a second tab saves nothing while the first is open, and then offers what that held', async ({ bench, page, context }) => {
  const isSaved = (of: Bench) => of.page.getByRole('status').filter({ hasText: /^saved$/ });
  const name = async (of: Bench, title: string): Promise<void> => {
    await of.title.fill(title);
    await of.title.press('Enter');
  };
  await bench.waitForEnd();
  await name(bench, 'In the first tab');
  await expect(isSaved(bench)).toBeVisible();
  const second = new Bench(await context.newPage());
  await second.open();
  await expect(second.page.getByRole('alert')).toContainText('open in another tab');
  await name(second, 'In the second tab');
  await page.reload();
  await expect(bench.title).toHaveValue('In the first tab');
  await name(bench, 'In the first tab again');
  await expect(isSaved(bench)).toBeVisible();
  await page.close();
  await name(second, 'In the second tab again');
  await expect(second.page.getByText('this one saves now')).toBeVisible();
  await expect(isSaved(second)).toBeVisible();
  await second.page.getByRole('button', { name: 'Open what it held' }).click();
  await expect(second.title).toHaveValue('In the first tab again');
  expect(second.complaints).toEqual([]);
});

test('a tool chosen by its command takes digits at once, and a corner is added and taken away at the cursor', async ({
  bench,
}) => {
  const { page } = bench;
  await bench.waitForEnd();
  await bench.startEmptyJob();
  await bench.command('Draw a wall');
  for (const text of ['30', '20']) {
    await page.keyboard.type(text);
    await page.keyboard.press(text === '30' ? 'Tab' : 'Enter');
  }
  await bench.clickAt(90, 20);
  await page.keyboard.press('Enter');
  const points = async (): Promise<number> => (await savedJob(bench)).job.parts[0]!.points.length;
  expect((await savedJob(bench)).job.parts[0]!.points.map(([x]) => Number.parseFloat(x))).toEqual([30, 90]);
  await bench.clickAt(60, 20, 'right');
  await page.getByRole('menuitem', { name: 'add a corner here' }).click();
  expect(await points()).toBe(3);
  await bench.clickAt(60, 20, 'right');
  await page.getByRole('menuitem', { name: 'take this corner away' }).click();
  expect(await points()).toBe(2);
});

test('rows of a spreadsheet paste as parts, in one undo step, and selected parts copy as such rows', async ({ bench, page }) => {
  await bench.waitForEnd();
  await bench.startEmptyJob();
  const rows = 'kind\tmaterial\tx\ty\tradius\ndisc\tair\t30\t20\t4\ndisc\tair\t60\t20\t4\nwall\taluminium\t2\t90\t0\t90\t90';
  const paste = (text: string): Promise<void> =>
    page.evaluate((pasted) => {
      const clipboardData = new DataTransfer();
      clipboardData.setData('text/plain', pasted);
      document.body.dispatchEvent(new ClipboardEvent('paste', { clipboardData, bubbles: true, cancelable: true }));
    }, text);
  await paste(rows);
  await expect(page.getByText('3 parts are pasted.')).toBeVisible();
  expect((await savedJob(bench)).job.parts).toHaveLength(3);
  const copied = await page.evaluate(() => {
    const clipboardData = new DataTransfer();
    document.body.dispatchEvent(new ClipboardEvent('copy', { clipboardData, bubbles: true, cancelable: true }));
    return clipboardData.getData('text/plain');
  });
  expect(copied.split('\n')).toEqual([
    'disc\tair\t30 mm\t20 mm\t4 mm',
    'disc\tair\t60 mm\t20 mm\t4 mm',
    'wall\taluminium\t2 mm\t90 mm\t0 mm\t90 mm\t90 mm',
  ]);
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  expect((await savedJob(bench)).job.parts).toHaveLength(0);
  await paste('disc\tair\t30\t20');
  await expect(page.getByRole('alert')).toContainText('row 1');
  expect((await savedJob(bench)).job.parts).toHaveLength(0);
});
