import { existsSync } from 'node:fs';
import process from 'node:process';
import { defineConfig } from '@playwright/test';

const port = Number(process.env['E2E_PORT'] ?? 3187);
const chromium = [
  process.env['CHROMIUM_PATH'],
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
  '/usr/bin/google-chrome',
].find((file): file is string => file !== undefined && existsSync(file));
if (chromium === undefined) {
  throw new Error('Chromium was not found: install it (Debian: "apt-get install chromium") or set CHROMIUM_PATH.');
}

export default defineConfig({
  testDir: '.',
  outputDir: '../../test-results',
  workers: 1,
  forbidOnly: true,
  timeout: 1_500_000,
  expect: { timeout: 45_000 },
  reporter: [['list'], ['./counts-reporter.ts']],
  use: {
    baseURL: `http://127.0.0.1:${port}`,
    trace: 'retain-on-failure',
    locale: 'en-GB',
    timezoneId: 'UTC',
    launchOptions: {
      executablePath: chromium,
      args: [
        '--headless',
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
  webServer: {
    command: 'node --enable-source-maps apps/api/dist/main.js',
    cwd: '../..',
    env: { PORT: String(port), DATA_DIR: 'memory://', DEMO: 'on', RATE_LIMITS: 'off' },
    url: `http://127.0.0.1:${port}/api/v1/health/ready`,
    reuseExistingServer: process.env['E2E_REUSE'] === '1',
    timeout: 180_000,
    stdout: 'ignore',
    stderr: 'pipe',
    gracefulShutdown: { signal: 'SIGTERM', timeout: 5000 },
  },
});
