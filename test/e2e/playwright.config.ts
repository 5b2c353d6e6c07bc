import { defineConfig, devices } from '@playwright/test';

/**
 * The browser suite: Debian's Chromium against the built server with the demo laboratory, started by
 * serve.ts on a free port. One worker: the suite tells one story, in order.
 */
export default defineConfig({
  testDir: '.',
  outputDir: '../../test-results/browser',
  workers: 1,
  fullyParallel: false,
  timeout: 240_000,
  expect: { timeout: 30_000 },
  reporter: [['list'], ['json']],
  globalSetup: './serve.ts',
  use: {
    ...devices['Desktop Chrome'],
    viewport: { width: 1280, height: 800 },
    actionTimeout: 30_000,
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
});
