import { defineConfig } from '@playwright/test';

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
