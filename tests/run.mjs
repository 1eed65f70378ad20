// `npm test`: everything, in order, on a fresh machine. Plain Node without dependencies, since it may have to install them first.
import { spawn, spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');
process.chdir(root);
const scratch = mkdtempSync(join(tmpdir(), 'gablebook-test-'));
const only = process.argv.slice(2);
const totals = { passed: 0, failed: 0 };
const broken = [];

/** Runs a command to its end; its output goes through. */
function run(command, args, env = {}) {
  return new Promise((done) => {
    const child = spawn(command, args, { stdio: ['ignore', 'inherit', 'inherit'], env: { ...process.env, ...env } });
    child.on('error', (error) => {
      process.stderr.write(`${command}: ${error.message}\n`);
      done(127);
    });
    child.on('close', (code) => done(code ?? 1));
  });
}

/** A step that counts as one test: it passes with exit code 0. */
async function step(name, command, args) {
  process.stdout.write(`\n— ${name}\n`);
  const code = await run(command, args);
  count(name, code === 0 ? 1 : 0, code === 0 ? 0 : 1);
}

/** A vitest project; its own counts are taken from its report. A project that ran no test has failed. */
async function project(name) {
  process.stdout.write(`\n— ${name}\n`);
  const report = join(scratch, `${name}.json`);
  const code = await run('npx', [
    'vitest',
    'run',
    '--project',
    name,
    '--reporter=dot',
    '--reporter=json',
    `--outputFile.json=${report}`,
  ]);
  if (!existsSync(report)) return count(name, 0, 1);
  const { numPassedTests, numFailedTests, numTotalTests, numFailedTestSuites } = JSON.parse(
    readFileSync(report, 'utf8'),
  );
  const failed =
    numFailedTests > 0 ? numFailedTests : code === 0 && numTotalTests > 0 && numFailedTestSuites === 0 ? 0 : 1;
  count(name, numPassedTests, failed);
}

function count(name, passed, failed) {
  totals.passed += passed;
  totals.failed += failed;
  if (failed > 0) broken.push(name);
  process.stdout.write(`  ${name}: ${passed} passed, ${failed} failed\n`);
}

/** Installs the packages of the lock file when they are not here or are older than it. */
function install() {
  const marker = join('node_modules', '.package-lock.json');
  if (existsSync(marker) && existsSync(join('node_modules', '.bin', 'vitest'))) return true;
  process.stdout.write('Installing the packages named in package-lock.json (about two minutes) …\n');
  return spawnSync('npm', ['ci', '--no-audit', '--no-fund'], { stdio: 'inherit' }).status === 0;
}

/** Where a Chromium is: CHROMIUM_PATH, Debian's places, or installed from Debian now. Null, and says what is missing, if none can be had. */
function chromium() {
  const found = [
    process.env.CHROMIUM_PATH,
    '/usr/bin/chromium',
    '/usr/bin/chromium-browser',
    '/usr/bin/google-chrome',
  ].find((path) => path && existsSync(path));
  if (found) return found;
  if (existsSync('/usr/bin/apt-get') && process.getuid?.() === 0) {
    process.stdout.write('Installing Chromium from Debian …\n');
    const quiet = { stdio: 'ignore', env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } };
    spawnSync('apt-get', ['update', '-qq'], quiet);
    spawnSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], quiet);
    if (existsSync('/usr/bin/chromium')) return '/usr/bin/chromium';
  }
  process.stdout.write(
    'The journeys need Chromium, and none was found. Install it (Debian: apt-get install chromium) or set CHROMIUM_PATH to one.\n',
  );
  return null;
}

const wants = (name) => only.length === 0 || only.includes(name);

if (!install()) {
  process.stdout.write(
    'The packages could not be installed, so nothing was tested. See the lines above.\n\n0 passed, 1 failed\n',
  );
  process.exit(1);
}
if (wants('types')) await step('types', 'npx', ['tsc', '-p', 'tsconfig.json']);
if (wants('lint')) await step('lint', 'npx', ['biome', 'check', '--error-on-warnings', '.']);
if (wants('unit')) await project('unit');
if (wants('standards')) await project('standards');
if (wants('api')) await project('api');
if (wants('build') || wants('browser')) await step('build', 'npx', ['vite', 'build', '--logLevel', 'warn']);
if (wants('budget')) await step('budget', 'node', ['tests/support/bundle-budget.mjs']);
if (wants('browser')) {
  const browser = chromium();
  if (browser) {
    process.env.CHROMIUM_PATH = browser;
    await project('browser');
  } else {
    count('browser (Chromium is missing)', 0, 1);
  }
}
rmSync(scratch, { recursive: true, force: true });
if (broken.length > 0) process.stdout.write(`\nFailed: ${broken.join(', ')}\n`);
process.stdout.write(`\n${totals.passed} passed, ${totals.failed} failed\n`);
process.exit(totals.failed === 0 ? 0 : 1);
