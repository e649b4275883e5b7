import { defineConfig } from '@playwright/test'

/** Browser tests: Debian's Chromium against the built application, which `tests/browser/application.global.ts` starts. */
export default defineConfig({
  testDir: 'tests/browser',
  globalSetup: './tests/browser/application.global.ts',
  outputDir: 'test-results',
  workers: 1,
  fullyParallel: false,
  forbidOnly: true,
  timeout: 90_000,
  expect: { timeout: 15_000 },
  use: {
    actionTimeout: 15_000,
    baseURL: process.env['TIERLIGHT_TEST_ADDRESS'],
    viewport: { width: 1280, height: 900 },
    locale: 'en-GB',
    timezoneId: 'Europe/Berlin',
    screenshot: 'only-on-failure',
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
})
