// Owns editing the job in its sentences: each value in place, refused with a reason when it is none.
// Must not know how values are parsed or kept.
import { expect, test } from './bench.ts';

test('a value is edited where it stands, the sheet follows, and one undo takes it back', async ({ bench, page }) => {
  await bench.waitForEnd();
  await bench.brief.getByRole('button', { name: 'Value of w: 4 mm' }).click();
  await page.keyboard.type('0.5 in');
  await page.keyboard.press('Enter');
  await expect(bench.brief.getByRole('button', { name: 'Value of w: 0.5 in' })).toBeVisible();
  await page.getByRole('button', { name: 'undo' }).click();
  await expect(bench.brief.getByRole('button', { name: 'Value of w: 4 mm' })).toBeVisible();
});

test('a value that does not read is refused with the mend, and the job stays as it was', async ({ bench, page }) => {
  await bench.waitForEnd();
  const before = (await bench.export('The job as a file')).text;
  await bench.brief.getByRole('button', { name: 'Value of w: 4 mm' }).click();
  await page.keyboard.type('4 parsecs');
  await page.keyboard.press('Enter');
  await expect(bench.brief.getByRole('alert')).toContainText('parsecs');
  await page.keyboard.press('Escape');
  await expect(bench.brief.getByRole('button', { name: 'Value of w: 4 mm' })).toBeVisible();
  expect((await bench.export('The job as a file')).text).toBe(before);
});

test('a named value is renamed where it stands, and what uses it follows in one undo step', async ({ bench, page }) => {
  await bench.waitForEnd();
  const before = (await bench.export('The job as a file')).text;
  await bench.brief.getByRole('button', { name: 'Name: w' }).click();
  await page.keyboard.type('opening');
  await page.keyboard.press('Enter');
  await expect(bench.brief.getByRole('button', { name: 'Value of opening: 4 mm' })).toBeVisible();
  const renamed = (await bench.export('The job as a file')).text;
  expect(renamed).toContain('opening/2');
  expect(renamed).not.toContain('w/2');
  await page.getByRole('button', { name: 'undo' }).click();
  expect((await bench.export('The job as a file')).text).toBe(before);
});
