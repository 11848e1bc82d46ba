import { defineConfig } from '@playwright/test';

/** While developing, RISEBACK_TEST_PORT names a server that is already up; tests then run one after the other. */
const running = process.env['RISEBACK_TEST_PORT'];
/** Each worker has a server and a database of its own, so that no test meets the people and sessions of another. */
const ports = running === undefined ? [4390, 4391] : [Number(running)];
// this file is read in every worker too, where Playwright says which one it is
const port = ports[Number(process.env['TEST_PARALLEL_INDEX'] ?? 0)] ?? ports[0];

/** Debian's chromium drives the built application. */
const config = defineConfig({
  testDir: '.',
  testMatch: '**/*.spec.ts',
  outputDir: '../../out/browser',
  timeout: 90_000,
  workers: ports.length,
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
  webServer: ports.map((served) => ({
    command: 'node tests/browser/serve.mjs',
    cwd: '../..',
    env: { PORT: String(served) },
    url: `http://localhost:${String(served)}/readyz`,
    timeout: 240_000,
    reuseExistingServer: running !== undefined,
    gracefulShutdown: { signal: 'SIGTERM' as const, timeout: 15_000 },
  })),
});

export default config;
