// Owns the checks of how the bench looks and reads: accessibility rules, and pictures kept for people to judge.
// Must not know how it is styled.
import axe from 'axe-core';
import { expect, test } from './bench.ts';

const SIZES = [
  { name: 'desk', width: 1440, height: 900 },
  { name: 'laptop', width: 1280, height: 720 },
  { name: 'narrow', width: 820, height: 1180 },
];

for (const theme of ['light', 'dark'] as const) {
  test(`the bench keeps the rules of accessibility in the ${theme} theme`, async ({ bench, page }) => {
    await page.emulateMedia({ reducedMotion: 'reduce' });
    await bench.waitForEnd();
    if (theme === 'dark') await page.getByRole('button', { name: 'Turn to dark' }).click();
    // Evaluated by the browser's own tools, which the page's policy on scripts does not bind.
    await page.evaluate(axe.source);
    const violations = await page.evaluate(async () => {
      const { violations: found } = await axe.run({ runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'] });
      return found.map(({ id, help, nodes }) => ({ id, help, nodes: nodes.map(({ html }) => html.slice(0, 200)) }));
    });
    expect(violations).toEqual([]);
  });

  for (const { name, width, height } of SIZES) {
    test(`a picture of the solved example is kept: ${theme}, ${name}`, async ({ bench, page }) => {
      await page.setViewportSize({ width, height });
      if (theme === 'dark') await page.getByRole('button', { name: 'Turn to dark' }).click();
      await bench.waitForEnd();
      await page.waitForTimeout(500);
      const picture = await page.screenshot({ path: `artifacts/bench-${theme}-${name}.png` });
      expect(picture.byteLength).toBeGreaterThan(20_000);
    });
  }
}

for (const theme of ['light', 'dark'] as const) {
  test(`a picture of the wave on its way through the slot is kept: ${theme}`, async ({ bench, page }) => {
    if (theme === 'dark') await page.getByRole('button', { name: 'Turn to dark' }).click();
    await bench.waitForEnd();
    await bench.holdAfter(380, '600 steps a second');
    const picture = await page.screenshot({ path: `artifacts/bench-${theme}-moving.png` });
    expect(picture.byteLength).toBeGreaterThan(20_000);
  });
}

test('the page does not scroll sideways at any of the sizes', async ({ bench, page }) => {
  await bench.waitForEnd();
  for (const { width, height } of SIZES) {
    await page.setViewportSize({ width, height });
    expect(await page.evaluate(() => document.documentElement.scrollWidth), `${width} pixels wide`).toBeLessThanOrEqual(width);
  }
});
