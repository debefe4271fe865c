import { defineConfig } from '@playwright/test'

/** Debian's Chromium, talking to nobody but the page's own server. */
const launchOptions = {
  executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
  args: [
    '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run',
    '--disable-background-networking', '--disable-component-update', '--disable-sync',
  ],
}

// A file runs on both screens, unless its name ends in `.phone.spec.ts` or `.desk.spec.ts`.
export default defineConfig({
  testDir: 'e2e',
  outputDir: 'test-results',
  workers: 1,
  retries: 0,
  forbidOnly: true,
  timeout: 90_000,
  expect: { timeout: 10_000 },
  reporter: [['list'], ['json', { outputFile: 'reports/e2e.json' }]],
  use: { browserName: 'chromium', launchOptions, trace: 'retain-on-failure', locale: 'en-US', timezoneId: 'America/New_York' },
  projects: [
    { name: 'phone', testIgnore: /\.desk\.spec\.ts$/, use: { viewport: { width: 390, height: 844 }, hasTouch: true, isMobile: true } },
    { name: 'desk', testIgnore: /\.phone\.spec\.ts$/, use: { viewport: { width: 1280, height: 800 } } },
  ],
})
