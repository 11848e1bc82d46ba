// npm test: installs what is missing, then runs every check in stages and sums the runners' own reports.
//   --only STAGE   one stage while developing (static, build, unit, web, api, browser, faults)
//   --full         the long forms (docs in DEVELOPERS.md)
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { demandNode, ensureInstalled, root } from '../server/install.mjs';

const { values: options } = parseArgs({
  options: { only: { type: 'string' }, full: { type: 'boolean', default: false } },
});
const reports = join(root, 'out/reports');
const env = { ...process.env, NG_CLI_ANALYTICS: 'false', RISEBACK_TEST_FULL: options.full ? '1' : '' };

/** Counts of one runner's report: vitest's and Playwright's JSON reporters. */
const vitestCounts = (report) => ({
  passed: report.numPassedTests,
  failed: report.numFailedTests + failedSuites(report),
});
/** A spec file that does not even load has no failed test in it. */
const failedSuites = (report) =>
  report.testResults.filter((file) => file.status === 'failed' && file.assertionResults.length === 0).length;
const playwrightCounts = ({ stats }) => ({ passed: stats.expected + stats.flaky, failed: stats.unexpected });

const stages = [
  { name: 'static', run: () => staticChecks() },
  { name: 'build', run: () => plain('node', ['server/build.mjs']) },
  { name: 'unit', run: () => vitest('unit', ['libs', 'server/src', 'tests/validation', 'tests/properties']) },
  {
    name: 'web',
    run: () =>
      counted(
        'web',
        [
          'npx',
          'ng',
          'test',
          '--no-watch',
          '--reporters=default',
          '--reporters=json',
          `--output-file=${report('web')}`,
        ],
        vitestCounts,
      ),
  },
  { name: 'api', run: () => vitest('api', ['tests/api']) },
  {
    name: 'browser',
    run: () =>
      counted(
        'browser',
        ['npx', 'playwright', 'test', '--config=tests/browser/playwright.config.ts'],
        playwrightCounts,
      ),
  },
  { name: 'faults', run: () => vitest('faults', ['tests/faults']) },
];

const chosen = options.only === undefined ? stages : stages.filter(({ name }) => name === options.only);
if (chosen.length === 0) {
  process.stderr.write(`No stage is called ${options.only}; there are ${stages.map(({ name }) => name).join(', ')}.\n`);
  process.exit(2);
}

demandNode();
await timed('install', () => ensureInstalled((line) => process.stdout.write(`${line}\n`)));
rmSync(reports, { recursive: true, force: true });
mkdirSync(reports, { recursive: true });
// The system browser installs beside the static checks: one waits for the network, the other for the processor.
const browser = options.only === undefined || options.only === 'browser' ? ensureBrowser() : Promise.resolve(true);

const total = { passed: 0, failed: 0 };
for (const stage of chosen) {
  if (stage.name === 'browser' && !(await browser)) {
    total.failed += 1;
    process.stdout.write('✗ the browser could not be installed\n');
    continue;
  }
  const counts = await timed(stage.name, stage.run);
  total.passed += counts.passed;
  total.failed += counts.failed;
}
process.stdout.write(`\n${total.passed} passed, ${total.failed} failed\n`);
process.exitCode = total.failed === 0 && total.passed > 0 ? 0 : 1;

async function staticChecks() {
  // side by side; each lane takes about as long as the other
  const lanes = [
    [['npx', 'eslint', '.']],
    [
      ['npx', 'prettier', '--check', '--log-level', 'warn', '.'],
      ['npx', 'tsc', '-p', 'libs'],
      ['npx', 'tsc', '-p', 'server'],
      ['npx', 'tsc', '-p', 'tests'],
    ],
  ];
  const failed = await Promise.all(lanes.map(failuresOf));
  return { passed: 0, failed: failed.reduce((sum, count) => sum + count, 0) };
}

async function failuresOf(checks) {
  let failed = 0;
  for (const [command, ...args] of checks) {
    if ((await execute(command, args)) !== 0) {
      process.stdout.write(`✗ ${args.join(' ')}\n`);
      failed += 1;
    }
  }
  return failed;
}

async function plain(command, args) {
  return { passed: 0, failed: (await execute(command, args)) === 0 ? 0 : 1 };
}

function vitest(name, folders) {
  const command = [
    'npx',
    'vitest',
    'run',
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report(name)}`,
    ...folders,
  ];
  return counted(name, command, vitestCounts);
}

/** A runner whose report is missing, or that ran no test, has failed whatever its exit code says. */
async function counted(name, [command, ...args], countsOf) {
  const code = await execute(command, args);
  if (!existsSync(report(name))) {
    process.stdout.write(`✗ ${name} left no report\n`);
    return { passed: 0, failed: 1 };
  }
  const { passed, failed } = countsOf(JSON.parse(readFileSync(report(name), 'utf8')));
  if (passed + failed === 0) {
    process.stdout.write(`✗ ${name} ran no test\n`);
    return { passed: 0, failed: 1 };
  }
  return { passed, failed: failed === 0 && code !== 0 ? 1 : failed };
}

function report(name) {
  return join(reports, `${name}.json`);
}

/** Debian's chromium, by the system's own package manager; elsewhere RISEBACK_CHROMIUM names one. */
async function ensureBrowser() {
  if (existsSync(process.env.RISEBACK_CHROMIUM ?? '/usr/bin/chromium')) return true;
  if (existsSync('/usr/bin/apt-get')) {
    await execute('apt-get', ['update', '-qq'], 'ignore');
    await execute('apt-get', ['install', '-y', '-qq', 'chromium'], 'ignore');
  }
  return existsSync('/usr/bin/chromium');
}

async function timed(name, work) {
  const start = performance.now();
  process.stdout.write(`\n=== ${name}\n`);
  const result = await work();
  process.stdout.write(`=== ${name}: ${((performance.now() - start) / 1_000).toFixed(1)} s\n`);
  return result;
}

function execute(command, args, stdio = 'inherit') {
  return new Promise((resolve) => {
    const child = spawn(command, args, { cwd: root, env, stdio: ['ignore', stdio, stdio] });
    child.on('error', () => resolve(127));
    child.on('close', (code) => resolve(code ?? 1));
  });
}
