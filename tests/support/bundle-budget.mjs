// First route's JavaScript, gzipped, against its budget; charts must not be in it. Reads the manifest of the build.
import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';

const BUDGET_BYTES = 140 * 1000;
const CHART_BUDGET_BYTES = 65 * 1000;
const CSS_BUDGET_BYTES = 15 * 1000;
const manifest = JSON.parse(readFileSync('dist/.vite/manifest.json', 'utf8'));

/** All chunks that a module pulls in by static imports. */
function withStatics(key, seen = new Set()) {
  if (seen.has(key)) return seen;
  seen.add(key);
  for (const next of manifest[key].imports ?? []) withStatics(next, seen);
  return seen;
}

const gzipped = (file) => gzipSync(readFileSync(`dist/${file}`), { level: 9 }).length;
const kb = (bytes) => `${Math.round(bytes / 100) / 10} kB`;
const entry = Object.keys(manifest).find((key) => manifest[key].isEntry);
const page = Object.keys(manifest).find((key) => key.endsWith('features/position/position-page.tsx'));
if (!entry || !page) throw new Error('the manifest names no entry or no position page');
const first = withStatics(page, withStatics(entry));
const faults = [];
const check = (name, bytes, budget) => {
  process.stdout.write(`  ${name}: ${kb(bytes)} of ${kb(budget)} gzipped\n`);
  if (bytes > budget) faults.push(name);
};

check(
  'first route, JavaScript',
  [...first].reduce((sum, key) => sum + gzipped(manifest[key].file), 0),
  BUDGET_BYTES,
);
const css = new Set([...first].flatMap((key) => manifest[key].css ?? []));
check(
  'first route, CSS',
  [...css].reduce((sum, file) => sum + gzipped(file), 0),
  CSS_BUDGET_BYTES,
);
const holdsChart = (key) => readFileSync(`dist/${manifest[key].file}`, 'utf8').includes('registerables');
if ([...first].some(holdsChart)) faults.push('the chart library is in the first route');
const chart = Object.keys(manifest).filter((key) => manifest[key].isDynamicEntry && /chart/i.test(key));
if (chart.length === 0) faults.push('there is no lazy chart chunk');
for (const key of chart) {
  const own = [...withStatics(key)].filter((one) => !first.has(one));
  check(
    `chart chunk ${key}`,
    own.reduce((sum, one) => sum + gzipped(manifest[one].file), 0),
    CHART_BUDGET_BYTES,
  );
}
if (faults.length > 0) {
  process.stdout.write(`  over budget: ${faults.join('; ')}\n`);
  process.exit(1);
}
