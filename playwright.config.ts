import { defineConfig } from '@playwright/test';
import { findChromium } from './src/cli/lib-chromium';

// A fixed port of its own; another one lets two checkouts test at the same time.
const port = Number(process.env.E2E_PORT ?? 4398);
const chromium = await findChromium();

export default defineConfig({
  testDir: 'tests/e2e',
  outputDir: 'test-results',
  fullyParallel: false,
  workers: 2,
  retries: 0,
  forbidOnly: Boolean(process.env.CI),
  timeout: 45_000,
  globalTimeout: 7 * 60_000,
  expect: { timeout: 10_000 },
  reporter: 'list',
  use: {
    // localhost and not 127.0.0.1: the session cookie is Secure, and browsers trust localhost without TLS.
    baseURL: `http://localhost:${port}`,
    trace: 'off',
    locale: 'en-US',
    timezoneId: 'America/Chicago',
    browserName: 'chromium',
    launchOptions: chromium,
  },
  webServer: {
    command: 'node tests/helpers/serve-e2e.mjs',
    env: { E2E_PORT: String(port) },
    url: `http://localhost:${port}/api/health`,
    reuseExistingServer: false,
    timeout: 4 * 60_000,
    gracefulShutdown: { signal: 'SIGTERM', timeout: 10_000 },
    stdout: 'pipe',
    stderr: 'pipe',
  },
});
