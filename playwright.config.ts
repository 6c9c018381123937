import { defineConfig } from '@playwright/test';

/** Second sizes of what another test shows at the first, and what takes longest: `npm run test:e2e` leaves none out. */
const LONG =
  /1024 px @calls|on a tablet (stops|another|the shift)|axe finds at (1024|1440) px|20,000 taps|500 in the list|blank cards|twelve looms stand|phone and on a tablet/;

/**
 * Browser tests against a real server process over the built application. Chromium is the system's own: CHROMIUM_PATH
 * (`npm run test:e2e` finds one), nothing is downloaded.
 */
export default defineConfig({
  testDir: 'test/e2e',
  testMatch: '**/*.spec.ts',
  outputDir: 'test-results/browser',
  globalSetup: './test/e2e/global-setup.ts',
  // Each test has a server, a book and a port of its own, so two run beside each other.
  workers: 2,
  fullyParallel: true,
  // Never again: a test that passes at the second try has found something.
  retries: 0,
  ...(process.env['E2E_SHORT'] === 'yes' && { grepInvert: LONG }),
  forbidOnly: true,
  timeout: 90_000,
  expect: { timeout: 10_000 },
  reporter: [['line']],
  use: {
    // 10-inch tablet.
    viewport: { width: 1024, height: 768 },
    timezoneId: 'Europe/London',
    locale: 'en-GB',
    serviceWorkers: 'allow',
    trace: 'retain-on-failure',
    screenshot: 'only-on-failure',
    launchOptions: {
      executablePath: process.env['CHROMIUM_PATH'] ?? '/usr/bin/chromium',
      args: process.getuid?.() === 0 ? ['--no-sandbox'] : [],
    },
  },
});
