// `npm run mutate`: how many small faults put into the folders below the tests notice.
//   --all            every mutant, not a sample
//   --sample=200     how many, as many in each folder
//   --seed=1         which ones
//   --only=text      only files whose path contains the text
//   --list           the mutants, without running them
//   --workers=2      how many at a time
// Works in a copy of the project, so that nothing here is touched. Properties run fewer times there (PROPERTY_RUNS), so the score is a lower bound.
import { fork } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, readFileSync, realpathSync, rmSync, symlinkSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { mutantsOf } from './mutants.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const options = new Map(process.argv.slice(2).map((word) => word.replace(/^--/, '').split('=')));
const say = (line) => process.stdout.write(`${line}\n`);

const COPIED = ['shared', 'server', 'src', 'tests', 'fixtures', 'package.json', 'tsconfig.json', 'vite.config.ts'];
const FOLDERS = ['shared/settlement', 'shared/reconcile', 'shared/books', 'shared/position', 'shared/try'];
/** The tests that state the rules of a folder: the quick ones first, and the rest only for a mutant they do not notice. */
const STAGES = {
  'shared/settlement': [
    ['tests/unit/settlement'],
    ['tests/standards/netmetering', 'tests/standards/published', 'tests/standards/settlement'],
  ],
  'shared/reconcile': [
    ['tests/unit/reconcile'],
    ['tests/unit/ledger', 'tests/standards/error-fixtures', 'tests/standards/re-add'],
  ],
  'shared/books': [
    ['tests/unit/books'],
    [
      'tests/standards/apr',
      'tests/standards/credit',
      'tests/standards/financial',
      'tests/standards/loan',
      'tests/standards/mortgage',
      'tests/unit/ledger/other-money',
      'tests/unit/sample/ledger',
    ],
  ],
  'shared/position': [
    ['tests/unit/position'],
    ['tests/standards/economics', 'tests/standards/netposition', 'tests/standards/re-add', 'tests/unit/sample/ledger'],
  ],
  'shared/try': [['tests/unit/try'], ['tests/unit/screens/try']],
};
const WORKERS = Number(options.get('workers') ?? 2);
const LEAST_LIMIT_MS = 20_000;

const copies = mkdtempSync(join(realpathSync(tmpdir()), 'gablebook-mutation-'));
process.on('exit', () => rmSync(copies, { recursive: true, force: true }));
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => process.exit(1));

function filesUnder(folder, ending) {
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && entry.name.endsWith(ending))
    .map((entry) => join(entry.parentPath, entry.name).slice(root.length + 1))
    .sort();
}

/** Test files whose path begins with one of the prefixes. */
function testsOf(prefixes) {
  return [...filesUnder('tests/unit', '.test.ts'), ...filesUnder('tests/standards', '.test.ts')].filter((file) =>
    prefixes.some((prefix) => file.startsWith(prefix)),
  );
}

/** A small repeatable generator (mulberry32), so that a seed always names the same mutants of the same sources. */
function randomFrom(seed) {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

function shuffled(items, random) {
  const mixed = [...items];
  for (let at = mixed.length - 1; at > 0; at -= 1) {
    const other = Math.floor(random() * (at + 1));
    [mixed[at], mixed[other]] = [mixed[other], mixed[at]];
  }
  return mixed;
}

function mutantsIn(folder) {
  return filesUnder(folder, '.ts')
    .filter((file) => file.includes(options.get('only') ?? ''))
    .flatMap((file) => {
      const original = readFileSync(join(root, file), 'utf8');
      return mutantsOf(file, original).map((mutant) => ({
        ...mutant,
        folder,
        file,
        original,
        line: original.slice(0, mutant.start).split('\n').length,
      }));
    });
}

/** A copy of the project with a warmed test process in it; a run that takes too long ends it, and the next one starts anew. */
class Worker {
  constructor(number) {
    this.home = join(copies, String(number));
    for (const name of COPIED) cpSync(join(root, name), join(this.home, name), { recursive: true });
    symlinkSync(join(root, 'node_modules'), join(this.home, 'node_modules'), 'dir');
    this.child = null;
  }

  async start() {
    this.child = fork(join(this.home, 'tests/mutation/runner.mjs'), [], {
      cwd: this.home,
      env: { ...process.env, PROPERTY_RUNS: '40' },
      stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
    });
    await this.answer(120_000);
  }

  answer(limitMs) {
    const { child } = this;
    return new Promise((done) => {
      const finish = (value) => {
        clearTimeout(timer);
        child.off('message', finish);
        child.off('exit', gone);
        done(value);
      };
      const gone = () => finish({ by: 'a run that ended the test process' });
      const timer = setTimeout(() => finish(null), limitMs);
      child.on('message', finish);
      child.on('exit', gone);
    });
  }

  /** What noticed the mutant; null where nothing did; `timeout` where the run did not end. */
  async run(mutant, stages, limitMs) {
    if (this.child === null || this.child.exitCode !== null || this.child.killed) await this.start();
    const file = mutant === null ? null : join(this.home, mutant.file);
    const original = mutant?.original ?? '';
    const text = mutant === null ? '' : original.slice(0, mutant.start) + mutant.text + original.slice(mutant.end);
    this.child.send({
      file,
      text,
      original,
      stages: stages.map((files) => files.map((name) => join(this.home, name))),
    });
    const answer = await this.answer(limitMs);
    if (answer !== null) return answer.by;
    this.stop();
    cpSync(join(root, 'shared'), join(this.home, 'shared'), { recursive: true });
    if (file !== null) (await import('node:fs')).writeFileSync(file, original);
    return 'timeout';
  }

  stop() {
    this.child?.kill('SIGKILL');
    this.child = null;
  }
}

const found = FOLDERS.map(mutantsIn).filter((mutants) => mutants.length > 0);
const size = Number(options.get('sample') ?? 200);
const seed = Number(options.get('seed') ?? 1);
const random = randomFrom(seed);
const chosen = options.has('all')
  ? found.flat()
  : found.flatMap((mutants) => shuffled(mutants, random).slice(0, Math.round(size / found.length)));
const all = found.reduce((sum, mutants) => sum + mutants.length, 0);
say(`${chosen.length} of ${all} mutants${options.has('all') ? '' : `, seed ${seed}`}`);
if (options.has('list')) {
  for (const { file, line, what } of chosen) say(`${file}:${line}  ${what}`);
  process.exit(0);
}

const stages = Object.fromEntries(Object.entries(STAGES).map(([folder, of]) => [folder, of.map(testsOf)]));
const workers = Array.from({ length: WORKERS }, (_, number) => new Worker(number));
const limits = {};
for (const folder of FOLDERS.filter((one) => chosen.some((mutant) => mutant.folder === one))) {
  const began = Date.now();
  const by = await workers[0].run(null, stages[folder], 300_000);
  if (by !== null) {
    say(`Nothing was measured: without any mutant a test of ${folder} fails (${by}).`);
    workers[0].stop();
    process.exit(1);
  }
  limits[folder] = Math.max(LEAST_LIMIT_MS, 4 * (Date.now() - began));
  say(`tests of ${folder}: ${Math.round((Date.now() - began) / 100) / 10} s`);
}

const survived = [];
const timedOut = [];
let done = 0;
const queue = [...chosen];
const began = Date.now();
await Promise.all(
  workers.map(async (worker) => {
    for (let mutant = queue.shift(); mutant; mutant = queue.shift()) {
      let by = await worker.run(mutant, stages[mutant.folder], limits[mutant.folder]);
      // A busy machine must not count as a run without end.
      if (by === 'timeout') by = await worker.run(mutant, stages[mutant.folder], 3 * limits[mutant.folder]);
      done += 1;
      if (by === null) survived.push(mutant);
      if (by === 'timeout') timedOut.push(mutant);
      if (by === null) say(`survived  ${mutant.file}:${mutant.line}  ${mutant.what}`);
      if (options.has('verbose') && by !== null)
        say(`killed    ${mutant.file}:${mutant.line}  ${mutant.what}  by ${by}`);
      if (done % 50 === 0)
        say(`${done} of ${chosen.length}, ${survived.length} survived, ${Math.round((Date.now() - began) / 1000)} s`);
    }
    worker.stop();
  }),
);

const noticed = (of, left) =>
  `${of - left} of ${of} noticed (${Math.round(((of - left) / Math.max(of, 1)) * 1000) / 10} %)`;
say('');
for (const folder of FOLDERS.filter((one) => chosen.some((mutant) => mutant.folder === one))) {
  const of = chosen.filter((mutant) => mutant.folder === folder).length;
  say(`${folder}: ${noticed(of, survived.filter((mutant) => mutant.folder === folder).length)}`);
}
say(`together: ${noticed(chosen.length, survived.length)}, of them ${timedOut.length} because the run did not end`);
for (const { file, line, what } of timedOut) say(`did not end  ${file}:${line}  ${what}`);
process.exit(0);
