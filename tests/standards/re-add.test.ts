import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { runLedger } from '#server/cli/ledger.ts';
import { EXPORT_FORMAT, EXPORT_VERSION, type HouseholdFacts } from '#shared/facts/household.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';

// Common practice, no source: the position by entry, by cycle, by book and as printed is one figure. The script that re-adds shares no code with the product.
const ROOT = resolve(import.meta.dirname, '../..');
const SCRIPT = join(ROOT, 'tests/support/re-add.mjs');
let folder = '';

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'gablebook-re-add-'));
});

afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

function exportOf(facts: HouseholdFacts): object {
  return {
    format: EXPORT_FORMAT,
    version: EXPORT_VERSION,
    exportedAt: `${BUILT_TODAY}T12:00:00Z`,
    today: BUILT_TODAY,
    facts,
    documentBytes: {},
  };
}

function ledger(file: string) {
  return spawnSync('npm', ['run', '--silent', 'ledger', '--', file], {
    cwd: ROOT,
    encoding: 'utf8',
    maxBuffer: 1 << 28,
  });
}

/** The same program inside this process: quicker, for what it refuses. */
function refused(args: string[]): { code: number; out: string; err: string } {
  const out: string[] = [];
  const err: string[] = [];
  const code = runLedger(args, { write: (text) => out.push(text) }, { write: (text) => err.push(text) });
  return { code, out: out.join(''), err: err.join('') };
}

function write(name: string, content: string): string {
  const file = join(folder, name);
  writeFileSync(file, content);
  return file;
}

describe('the printed ledger', () => {
  test('adds to one figure by entry, by cycle, by book and as printed; a cent moved in one entry is found', () => {
    const run = ledger(write('household.json', JSON.stringify(exportOf(buildHousehold({ cycles: 16 })))));
    expect(run.stderr).toBe('');
    expect(run.status).toBe(0);
    const sums = JSON.parse(execFileSync('node', [SCRIPT, write('ledger.json', run.stdout)], { encoding: 'utf8' }));
    expect(sums.faults).toEqual([]);
    expect(sums.byEntry).not.toBe(0);
    expect([sums.byCycle, sums.byBook, sums.position]).toEqual([sums.byEntry, sums.byEntry, sums.byEntry]);

    const moved = JSON.parse(run.stdout);
    moved.books.billAvoided[1].amountCents += 1;
    const check = spawnSync('node', [SCRIPT, write('moved.json', JSON.stringify(moved))], { encoding: 'utf8' });
    expect(check.status).toBe(1);
    expect(JSON.parse(check.stdout).faults.length).toBeGreaterThan(0);
  }, 60_000);

  test('a refusal ends the program with exit code 2, its reason on standard error and nothing printed', () => {
    const run = ledger(write('text.csv', 'service_from,service_to'));
    expect([run.status, run.stdout]).toEqual([2, '']);
    expect(run.stderr).toMatch(/not JSON/);
  }, 60_000);

  test.each([
    ['a missing file', null, /cannot be opened/],
    ['another format', '{"format":"other","version":1}', /not a household export/],
    ['another version', JSON.stringify({ format: EXPORT_FORMAT, version: 9 }), /version 9/],
    [
      'a field that is wrong',
      JSON.stringify({
        ...exportOf(buildHousehold({ cycles: 1 })),
        facts: { ...buildHousehold(), costs: [{ id: 'x' }] },
      }),
      /facts\.costs\[0\]\.on/,
    ],
  ])('%s is refused with its reason', (_, content, reason) => {
    const file = content === null ? join(folder, 'none.json') : write('refused.json', content);
    const { code, out, err } = refused([file]);
    expect([code, out]).toEqual([2, '']);
    expect(err).toMatch(reason);
  });

  test('without a file it says how it is used', () => {
    const { code, err } = refused([]);
    expect(code).toBe(2);
    expect(err).toMatch(/^Usage/);
  });
});
