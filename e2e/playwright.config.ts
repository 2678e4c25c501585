import { defineConfig } from '@playwright/test';

const report = process.env.BOLTWALK_E2E_REPORT;

/** Debian's Chromium: no browser is downloaded. It works offline and asks nobody for anything. */
const chromium = {
  executablePath: '/usr/bin/chromium',
  args: [
    '--no-sandbox',
    '--disable-gpu',
    '--disable-quic',
    '--no-first-run',
    '--disable-background-networking',
    '--disable-component-update',
    '--disable-sync',
    '--disable-dev-shm-usage',
  ],
};

export default defineConfig({
  testDir: '.',
  testMatch: '**/*.e2e.ts',
  outputDir: process.env.BOLTWALK_E2E_OUTPUT ?? '../test-results',
  globalSetup: '../tests/support/globalDatabase.ts',
  reporter: report ? [['list'], ['json', { outputFile: report }]] : [['list']],
  // One at a time: the figures and the waits are those of one tablet, not of a machine shared by several.
  workers: 1,
  fullyParallel: false,
  retries: 0,
  forbidOnly: Boolean(process.env.CI),
  timeout: 120_000,
  expect: { timeout: 10_000 },
  use: {
    viewport: { width: 1280, height: 800 },
    launchOptions: chromium,
    trace: 'retain-on-failure',
    screenshot: 'only-on-failure',
  },
});
