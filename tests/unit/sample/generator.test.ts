import { execFileSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { filesBelow, SAMPLE_FOLDER } from './sample-files.ts';

const MAKE = join(SAMPLE_FOLDER, 'make');
const folder = mkdtempSync(join(tmpdir(), 'sample-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('the sample’s generator', () => {
  it('writes the committed files again, byte for byte, and no others', () => {
    execFileSync(process.execPath, [join(MAKE, 'generate.mjs'), folder]);
    const made = filesBelow(folder);
    expect(made.length).toBeGreaterThan(15);
    expect(made).toEqual(filesBelow(SAMPLE_FOLDER));
    const differing = made.filter(
      (path) => !readFileSync(join(folder, path)).equals(readFileSync(join(SAMPLE_FOLDER, path))),
    );
    expect(differing).toEqual([]);
  }, 30_000);

  it('imports nothing but its own files and Node, so that the ledger is not compared with itself', () => {
    const scripts = readdirSync(MAKE);
    expect(scripts).toContain('bill.mjs');
    const imported = scripts.flatMap((name) =>
      [
        ...readFileSync(join(MAKE, name), 'utf8').matchAll(
          /^import\s(?:.*\sfrom\s)?'([^']+)'|\bimport\(([^)]*)\)|\brequire\(([^)]*)\)/gm,
        ),
      ].map((match) => match[1] ?? match[0]),
    );
    expect(imported.length).toBeGreaterThan(10);
    expect(imported.filter((target) => !/^(\.\/[a-z-]+\.mjs|node:[a-z]+)$/.test(target))).toEqual([]);
  });

  it('keeps its files under three megabytes', () => {
    const sizes = filesBelow(SAMPLE_FOLDER).map((path) => statSync(join(SAMPLE_FOLDER, path)).size);
    expect(sizes.reduce((sum, size) => sum + size, 0)).toBeLessThan(3_000_000);
  });
});
