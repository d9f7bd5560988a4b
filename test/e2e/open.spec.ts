// Owns what a newcomer meets: the first example, moving, solved, with nothing fetched from elsewhere.
// Must not know how the bench draws or computes.
import { expect, test } from './bench.ts';

test('the first example moves within two seconds of opening and solves itself', async ({ bench, page }) => {
  await page.reload();
  await expect(bench.sheet).toBeVisible();
  const began = Date.now();
  const still = await bench.fieldPixels();
  await expect.poll(() => bench.fieldPixels(), { intervals: [20], timeout: 10_000 }).not.toBe(still);
  test.info().annotations.push({ type: 'time to a moving wave', description: `${Date.now() - began} ms` });
  await bench.waitForEnd();
  await expect(bench.title).toHaveValue('Cooling slot in a cabinet door');
});

test('the page is isolated from other origins, so that memory can be shared', async ({ page, bench }) => {
  await bench.waitForEnd();
  expect(await page.evaluate(() => crossOriginIsolated)).toBe(true);
});

test('nothing is fetched from another origin, and nothing but the program’s own files', async ({ bench, page }) => {
  await bench.waitForEnd();
  await bench.openExample('Vent cell below cutoff');
  await bench.waitForEnd();
  const origin = new URL(page.url()).origin;
  for (const address of bench.requests) {
    const url = new URL(address);
    expect(url.protocol === 'blob:' || url.protocol === 'data:' || url.origin === origin, address).toBe(true);
    if (url.origin === origin) expect(url.pathname).toMatch(/^\/(|icon\.svg|assets\/.*|examples\/.*\.json)$/);
  }
});

test('with the connection cut after loading, every example still opens and runs', async ({ bench, page }) => {
  await bench.waitForEnd();
  await page.waitForLoadState('networkidle');
  await page.context().setOffline(true);
  for (const title of ['Vent cell below cutoff', 'Two irises in an R 100 guide', 'Bent dielectric rod at 24 to 40 GHz']) {
    await bench.openExample(title);
    await bench.waitForEnd();
  }
  // With its reference known the run takes all threads: their program must have come with the page.
  await bench.runStrip.getByRole('button', { name: 'Run', exact: true }).click();
  await bench.waitForEnd();
  const cores = await page.evaluate(() => navigator.hardwareConcurrency);
  await expect(bench.runStrip).toContainText(cores > 1 ? /on \d threads/ : 'cell/s');
  await page.context().setOffline(false);
});
