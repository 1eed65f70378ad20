import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
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

function write(name: string, content: string): string {
  const file = join(folder, name);
  writeFileSync(file, content);
  return file;
}

describe('the printed ledger', () => {
  test('adds to one figure by entry, by cycle, by book and as printed', () => {
    const run = ledger(write('household.json', JSON.stringify(exportOf(buildHousehold({ cycles: 16 })))));
    expect(run.stderr).toBe('');
    expect(run.status).toBe(0);
    const printed = write('ledger.json', run.stdout);
    const sums = JSON.parse(execFileSync('node', [SCRIPT, printed], { encoding: 'utf8' }));
    expect(sums.faults).toEqual([]);
    expect(sums.byEntry).not.toBe(0);
    expect([sums.byCycle, sums.byBook, sums.position]).toEqual([sums.byEntry, sums.byEntry, sums.byEntry]);
  }, 60_000);

  test('a cent moved in one entry is found by the script', () => {
    const run = ledger(write('again.json', JSON.stringify(exportOf(buildHousehold({ cycles: 3 })))));
    const value = JSON.parse(run.stdout);
    value.books.billAvoided[1].amountCents += 1;
    const check = spawnSync('node', [SCRIPT, write('moved.json', JSON.stringify(value))], { encoding: 'utf8' });
    expect(check.status).toBe(1);
    expect(JSON.parse(check.stdout).faults.length).toBeGreaterThan(0);
  }, 60_000);

  test.each([
    ['no file', 'usage', null, /Usage/],
    ['not JSON', 'text.json', 'service_from,service_to', /not JSON/],
    ['another format', 'other.json', '{"format":"other","version":1}', /not a household export/],
    ['another version', 'v9.json', JSON.stringify({ format: EXPORT_FORMAT, version: 9 }), /version 9/],
    [
      'a field that is wrong',
      'field.json',
      JSON.stringify({
        ...exportOf({ ...buildHousehold({ cycles: 1 }), costs: [{ id: 'x' }] } as unknown as HouseholdFacts),
      }),
      /facts\.costs\[0\]\.on/,
    ],
  ])(
    '%s is refused with exit code 2 and a reason, and nothing is printed',
    (_, name, content, reason) => {
      const run = content === null ? ledger('') : ledger(write(name, content));
      expect(run.status).toBe(2);
      expect(run.stdout).toBe('');
      if (content !== null) expect(run.stderr).toMatch(reason);
    },
    60_000,
  );
});
