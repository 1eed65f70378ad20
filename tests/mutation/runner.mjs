// One warmed vitest inside a copy of the project. The parent sends `{ file, text, original, stages }`; the answer is which test noticed, if any.
import { writeFileSync } from 'node:fs';
import { createVitest } from 'vitest/node';

const vitest = await createVitest(
  'test',
  {
    watch: false,
    run: true,
    bail: 1,
    isolate: false,
    fileParallelism: false,
    maxWorkers: 1,
    pool: 'threads',
    reporters: [{}],
    passWithNoTests: true,
    testTimeout: 60_000,
    coverage: { enabled: false },
  },
  { server: { watch: null }, logLevel: 'silent' },
);
await vitest.standalone();

/** The test that failed first, or null where all pass. */
async function run(files) {
  const specs = files.flatMap((file) => vitest.getModuleSpecifications(file));
  if (specs.length === 0) throw new Error(`no tests in ${files.join(' ')}`);
  const { testModules, unhandledErrors } = await vitest.runTestSpecifications(specs, false);
  for (const module of testModules) {
    for (const test of module.children.allTests('failed')) return test.fullName;
    if (module.state() === 'failed') return `${module.relativeModuleId} (cannot be loaded)`;
  }
  return unhandledErrors.length > 0 ? 'an error outside every test' : null;
}

process.on('message', async ({ file, text, original, stages }) => {
  let by = null;
  try {
    if (file !== null) {
      writeFileSync(file, text);
      vitest.invalidateFile(file);
    }
    for (const stage of stages) {
      by = await run(stage);
      if (by !== null) break;
    }
  } catch (error) {
    by = `a run that could not end: ${error}`;
  }
  if (file !== null) {
    writeFileSync(file, original);
    vitest.invalidateFile(file);
  }
  process.send({ by });
});
process.send({ ready: true });
