// Owns the life of a run on the screen: hold, one step, back to the start, pace, the field shown.
// Must not know how runs are carried out.
import { expect, test } from './bench.ts';

test('a held run stands still, takes single steps, and goes on to its end', async ({ bench, page }) => {
  await bench.waitForEnd();
  const strip = bench.runStrip;
  await bench.holdAfter(20, '200 steps a second');
  const held = await bench.step();
  await page.waitForTimeout(300);
  expect(await bench.step()).toBe(held);
  for (const more of [1, 2, 3]) {
    await strip.getByRole('button', { name: 'one step' }).click();
    await expect.poll(() => bench.step()).toBe(held + more);
  }
  await strip.getByLabel('Pace').selectOption({ label: 'full speed' });
  await strip.getByRole('button', { name: 'Resume' }).click();
  await bench.waitForEnd();
});

test('back to t = 0 clears the field, and one step from there is step 1', async ({ bench }) => {
  await bench.waitForEnd();
  await bench.runStrip.getByRole('button', { name: 'back to t = 0' }).click();
  await expect.poll(() => bench.step()).toBe(0);
  await bench.runStrip.getByRole('button', { name: 'one step' }).click();
  await expect.poll(() => bench.step()).toBe(1);
});

test('the field components offered are those of the section, and each paints another picture', async ({ bench }) => {
  await bench.waitForEnd();
  const strip = bench.runStrip;
  await bench.holdAfter(250, '600 steps a second');
  const pictures = new Set<string>();
  for (const field of ['Hz', 'Ex', 'Ey', '|E| dB', '|H| dB']) {
    const before = await bench.fieldPixels();
    const choice = strip.getByRole('radio', { name: field, exact: true });
    const chosenAlready = await choice.isChecked();
    await strip.getByText(field, { exact: true }).click();
    await expect(choice).toBeChecked();
    if (!chosenAlready) await expect.poll(() => bench.fieldPixels()).not.toBe(before);
    pictures.add(await bench.fieldPixels());
  }
  expect(pictures.size).toBe(5);
  await strip.getByText('off', { exact: true }).click();
  await expect.poll(async () => pictures.has(await bench.fieldPixels())).toBe(false);
});

test('turning E from across the slot to along it changes the question, the fields and the answer', async ({ bench }) => {
  await bench.waitForEnd();
  await bench.brief.getByRole('button', { name: 'along', exact: true }).click();
  await expect(bench.brief).toContainText('below cutoff');
  await expect(bench.runStrip.getByRole('radio', { name: 'Ez', exact: true })).toBeVisible();
  await bench.run();
});

test('after a finished run the curve follows edits, and ends where a fresh run ends', async ({ bench, page }) => {
  await bench.waitForEnd();
  const readings = async (): Promise<string> => (await bench.readings.locator('tbody').allInnerTexts()).join(' ');
  const before = await readings();
  await bench.brief.getByRole('button', { name: 'Value of w: 4 mm' }).click();
  await page.keyboard.type('9 mm');
  await page.keyboard.press('Enter');
  await expect.poll(readings).not.toBe(before);
  await bench.waitForEnd();
  const followed = await readings();
  await bench.run();
  expect(await readings()).toBe(followed);
  await bench.runStrip.getByLabel('follow edits').setChecked(false, { force: true });
  await bench.brief.getByRole('button', { name: /^Value of w:/ }).click();
  await page.keyboard.type('14 mm');
  await page.keyboard.press('Enter');
  await expect(bench.runStrip.getByText('the job has changed since')).toBeVisible();
  expect(await readings()).toBe(followed);
});

test('the speed of the machine is measured on a page of its own, and the job runs on after it', async ({ bench, page }) => {
  await bench.waitForEnd();
  await bench.command('Speed of this machine');
  const rows = page.getByRole('dialog').getByRole('row');
  await expect(page.getByText(/^Measured\./)).toBeVisible({ timeout: 30_000 });
  expect(await rows.count()).toBeGreaterThanOrEqual(5);
  await expect(rows.nth(1)).toContainText(/cell\/s/);
  await page.getByRole('button', { name: 'Close' }).click();
  await bench.run();
});
