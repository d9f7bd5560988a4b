// Owns what happens to files: good ones open, broken ones explain themselves and change nothing.
// Must not know how files are parsed.
import { readFileSync } from 'node:fs';
import { expect, test } from './bench.ts';

const GOOD = readFileSync('public/examples/bent-rod.json', 'utf8');

const BROKEN = [
  { what: 'cut short', text: GOOD.slice(0, 200), says: /not JSON/ },
  { what: 'with a key nobody knows', text: GOOD.replace('"title"', '"titel"'), says: /Did you mean "title"/ },
  { what: 'with a length that is none', text: GOOD.replace(/"width": "[^"]*"/, '"width": "12 volts"'), says: /12 volts/ },
  { what: 'from a newer program', text: GOOD.replace('"guidewall": 1', '"guidewall": 99'), says: /newer Guidewall/ },
  { what: 'that is a picture', text: '\u0089PNG\r\n\u001a\n', says: /not JSON/ },
];

for (const { what, text, says } of BROKEN) {
  test(`a job file ${what} gives a readable error and leaves the job alone`, async ({ bench, page }) => {
    await bench.waitForEnd();
    const before = (await bench.export('The job as a file')).text;
    await bench.dropFile('broken.json', text);
    const notice = page.getByRole('alert').filter({ hasText: 'broken.json was not opened' });
    await expect(notice).toContainText(says);
    expect((await bench.export('The job as a file')).text).toBe(before);
  });
}

test('a dropped job file opens, and undo brings the job before it back', async ({ bench, page }) => {
  await bench.waitForEnd();
  const title = await bench.title.inputValue();
  await bench.dropFile('rod.json', GOOD);
  await expect(bench.title).toHaveValue('Bent dielectric rod at 24 to 40 GHz');
  await page.keyboard.press('Control+z');
  await expect(bench.title).toHaveValue(title);
});

test('the sheet is exported as a picture', async ({ bench }) => {
  await bench.waitForEnd();
  const { name, text } = await bench.export('The sheet (PNG)');
  expect(name).toMatch(/-sheet\.png$/);
  expect(text.slice(1, 4)).toBe('PNG');
});
