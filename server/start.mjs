// Starts Gablebook from a fresh checkout: installs, builds, serves. Plain Node, since nothing may be installed yet.
import { spawn, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';

const root = path.resolve(import.meta.dirname ?? '.', '..');
const NEEDED = [20, 19];

function stopWith(text) {
  process.stderr.write(`${text}\n`);
  process.exit(1);
}

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < NEEDED[0] || (major === NEEDED[0] && minor < NEEDED[1])) {
    stopWith(`Gablebook needs Node ${NEEDED.join('.')} or newer; this is ${process.versions.node}.`);
  }
}

/** Runs a command to its end, its output shown. */
function run(command, args, what) {
  const done = spawnSync(command, args, { cwd: root, stdio: 'inherit', shell: process.platform === 'win32' });
  if (done.status !== 0) stopWith(`${what} failed. The lines above say why; put it right and start again.`);
}

function ensureInstalled() {
  const marker = path.join(root, 'node_modules', '.gablebook-installed');
  const lock = createHash('sha256')
    .update(readFileSync(path.join(root, 'package-lock.json')))
    .digest('hex');
  const known = existsSync(marker) ? readFileSync(marker, 'utf8') : null;
  if (known === lock) return;
  // An install of our own lock file that somebody made by hand is as good as ours.
  const hidden = path.join(root, 'node_modules', '.package-lock.json');
  const byHand =
    existsSync(hidden) && statSync(hidden).mtimeMs >= statSync(path.join(root, 'package-lock.json')).mtimeMs;
  if (!(known === null && byHand)) {
    process.stdout.write('Installing what Gablebook is built from; this takes a minute or two the first time.\n');
    run('npm', ['ci', '--no-fund', '--no-audit'], 'The install');
  }
  mkdirSync(path.dirname(marker), { recursive: true });
  writeFileSync(marker, lock);
}

/** The newest change below a file or folder, in milliseconds. */
function newest(target) {
  if (!existsSync(target)) return 0;
  const found = statSync(target);
  if (!found.isDirectory()) return found.mtimeMs;
  return Math.max(0, ...readdirSync(target).map((name) => newest(path.join(target, name))));
}

function ensureBuilt() {
  const sources = ['src', 'shared', 'index.html', 'vite.config.ts', 'package-lock.json'];
  const changed = Math.max(...sources.map((name) => newest(path.join(root, name))));
  const built = path.join(root, 'dist', 'index.html');
  if (existsSync(built) && statSync(built).mtimeMs >= changed) return;
  process.stdout.write('Building the pages.\n');
  run(
    process.execPath,
    [path.join(root, 'node_modules', 'vite', 'bin', 'vite.js'), 'build', '--logLevel', 'warn'],
    'The build',
  );
}

/** Starts a process that stays, and ends with it or ends it. */
function keep(args, others) {
  const child = spawn(process.execPath, args, { cwd: root, stdio: 'inherit' });
  others.push(child);
  child.once('exit', (code) => {
    for (const other of others) if (other !== child && other.exitCode === null) other.kill('SIGTERM');
    process.exitCode ??= code ?? 0;
  });
  return child;
}

function passSignals(children) {
  for (const signal of ['SIGINT', 'SIGTERM']) {
    process.on(signal, () => {
      for (const child of children) if (child.exitCode === null) child.kill(signal);
    });
  }
}

checkNode();
ensureInstalled();
const children = [];
passSignals(children);
const main = path.join(root, 'server', 'main.ts');
if (process.argv.includes('--dev')) {
  const port = process.env.PORT || '4470';
  process.env.PORT = port;
  keep([path.join(root, 'node_modules', 'tsx', 'dist', 'cli.mjs'), 'watch', '--clear-screen=false', main], children);
  keep([path.join(root, 'node_modules', 'vite', 'bin', 'vite.js'), '--clearScreen', 'false'], children);
  process.stdout.write('Open the address that Vite prints (http://127.0.0.1:5173 unless that is taken).\n');
} else {
  ensureBuilt();
  keep(['--import', 'tsx', main], children);
}
