// Owns how the browser tests run: against the built page, served with the headers a real host would send.
// Must not know what they test.
import { defineConfig } from '@playwright/test';

const PORT = Number(process.env.GUIDEWALL_TEST_PORT ?? 4417);
const chromium = process.env.CHROMIUM_PATH;

export default defineConfig({
  testDir: 'e2e',
  outputDir: '../test-results/playwright',
  // Each page runs a solver: two at once would measure each other.
  workers: 1,
  timeout: 60_000,
  expect: { timeout: 15_000 },
  forbidOnly: process.env.CI !== undefined,
  reporter: [['list'], ['json', { outputFile: '../test-results/playwright.json' }]],
  use: {
    baseURL: `http://localhost:${PORT}`,
    viewport: { width: 1440, height: 900 },
    trace: 'retain-on-failure',
    ...(chromium === undefined ? {} : { launchOptions: { executablePath: chromium } }),
  },
  webServer: {
    command: `node node_modules/vite/bin/vite.js preview --port ${PORT} --strictPort`,
    cwd: '..',
    port: PORT,
  },
});
