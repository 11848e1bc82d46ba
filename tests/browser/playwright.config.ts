import { defineConfig } from '@playwright/test';

/** While developing, RISEBACK_TEST_PORT names a server that is already up. */
const running = process.env['RISEBACK_TEST_PORT'];
const port = Number(running ?? 4390);

/** Debian's chromium drives the built application on a database of its own. */
const config = defineConfig({
  testDir: '.',
  testMatch: '**/*.spec.ts',
  outputDir: '../../out/browser',
  timeout: 90_000,
  workers: 1,
  // a shared machine may stall a browser once; what passes at the second try is reported as flaky
  retries: process.env['CI'] === undefined ? 0 : 1,
  reporter: [['list'], ['json', { outputFile: '../../out/reports/browser.json' }]],
  use: {
    baseURL: `http://localhost:${String(port)}`,
    viewport: { width: 1440, height: 900 },
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: process.env['RISEBACK_CHROMIUM'] ?? '/usr/bin/chromium',
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
  webServer: {
    command: 'node tests/browser/serve.mjs',
    cwd: '../..',
    env: { PORT: String(port) },
    url: `http://localhost:${String(port)}/readyz`,
    timeout: 240_000,
    reuseExistingServer: running !== undefined,
    gracefulShutdown: { signal: 'SIGTERM', timeout: 15_000 },
  },
});

export default config;
