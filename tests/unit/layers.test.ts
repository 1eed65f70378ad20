import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';

/** One import of a file: the file and what it names. */
type Import = { file: string; target: string };

function sources(folder: string): string[] {
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|tsx|mjs)$/.test(entry.name))
    .map((entry) => join(entry.parentPath, entry.name));
}

function importsOf(file: string): Import[] {
  const text = readFileSync(file, 'utf8');
  const found = text.matchAll(/(?:from\s+|import\s+|import\()\s*'([^']+)'/g);
  return [...found].map((match) => ({ file, target: resolve(file, match[1] ?? '') }));
}

/** `#shared/x` and relative paths as paths from the root; packages as they are. */
function resolve(file: string, target: string): string {
  if (target.startsWith('#')) return target.slice(1);
  return target.startsWith('.') ? join(file, '..', target) : target;
}

/** The one screen that may bring decimal.js to the browser. */
const PROJECTS = 'src/features/try/';
const loadsDecimal = (file: string) => importsOf(file).some(({ target }) => target === 'decimal.js');

/** Every file of ours that some files come to by imports, lazy ones too. */
function reachedFrom(files: string[], skipped: (target: string) => boolean): Set<string> {
  const seen = new Set<string>();
  const visit = (file: string) => {
    if (seen.has(file) || !isOwn(file) || skipped(file)) return;
    seen.add(file);
    for (const { target } of importsOf(file)) if (/\.(ts|tsx)$/.test(target)) visit(target);
  };
  for (const file of files) visit(file);
  return seen;
}

const isOwn = (target: string) => /^(shared|server|src|tests|fixtures)\//.test(target);
const offenders = (imports: Import[], allowed: (one: Import) => boolean) =>
  imports.filter((one) => !allowed(one)).map((one) => `${one.file} → ${one.target}`);

describe('who may import whom', () => {
  const shared = sources('shared');
  const server = sources('server');
  const src = sources('src');

  it('looks at the files it judges', () => {
    expect(shared.length).toBeGreaterThan(20);
    expect(server.length).toBeGreaterThan(20);
    expect(src.length).toBeGreaterThan(20);
    expect(shared.flatMap(importsOf).length).toBeGreaterThan(100);
    expect(
      offenders([{ file: 'shared/x.ts', target: 'react' }], (one) => one.target.startsWith('shared/')),
    ).toHaveLength(1);
  });

  it('shared imports shared, zod, decimal.js and suncalc only', () => {
    const packages = ['zod/mini', 'decimal.js', 'suncalc'];
    expect(
      offenders(shared.flatMap(importsOf), ({ target }) => target.startsWith('shared/') || packages.includes(target)),
    ).toEqual([]);
  });

  it('shared reads no clock and no chance', () => {
    const guilty = shared.filter((file) => /Date\.now\(|new Date\(\)|Math\.random\(/.test(readFileSync(file, 'utf8')));
    expect(guilty).toEqual([]);
  });

  it('the client never imports the server, nor the server the client', () => {
    expect(offenders(src.flatMap(importsOf), ({ target }) => !target.startsWith('server/'))).toEqual([]);
    expect(offenders(server.flatMap(importsOf), ({ target }) => !target.startsWith('src/'))).toEqual([]);
  });

  it('the client loads no decimal.js, save on the screen that projects in the browser', () => {
    const outside = src.filter((file) => !file.startsWith(PROJECTS));
    const seen = reachedFrom(outside, (target) => target.startsWith(PROJECTS));
    expect(seen.size).toBeGreaterThan(outside.length);
    expect([...seen].filter(loadsDecimal)).toEqual([]);
    expect([...reachedFrom([`${PROJECTS}try-page.tsx`], () => false)].some(loadsDecimal)).toBe(true);
  });

  it('nothing reaches the screen that projects in the browser but one lazy route', () => {
    const outside = src.filter((file) => !file.startsWith(PROJECTS));
    const reaching = outside.flatMap(importsOf).filter(({ target }) => target.startsWith(PROJECTS));
    expect(reaching).toEqual([{ file: 'src/app/router.tsx', target: `${PROJECTS}try-page.tsx` }]);
    expect(readFileSync('src/app/router.tsx', 'utf8')).toContain("await import('#src/features/try/try-page.tsx')");
  });

  it('routes know http, services and shared, never the database', () => {
    const routes = server.filter((file) => file.startsWith('server/routes/')).flatMap(importsOf);
    expect(routes.length).toBeGreaterThan(5);
    expect(offenders(routes, ({ target }) => !/^server\/(db|importers|sample)\//.test(target))).toEqual([]);
  });

  it('services and the database never know express', () => {
    const inner = server.filter((file) => /^server\/(services|db|importers)\//.test(file)).flatMap(importsOf);
    expect(inner.length).toBeGreaterThan(5);
    expect(offenders(inner, ({ target }) => target !== 'express' && !/^server\/(routes|http)\//.test(target))).toEqual(
      [],
    );
  });

  it('importers know shared and parser packages only', () => {
    const importers = server.filter((file) => file.startsWith('server/importers/')).flatMap(importsOf);
    expect(
      offenders(importers, ({ target }) => !isOwn(target) || /^(shared|server\/importers)\//.test(target)),
    ).toEqual([]);
  });

  it('one file alone knows lucia', () => {
    const knows = server.filter((file) => importsOf(file).some(({ target }) => target === 'lucia'));
    expect(knows).toEqual(['server/auth/sessions.ts']);
  });

  it('a feature imports itself, ui, lib and shared; app composes', () => {
    const features = src.filter((file) => file.startsWith('src/features/'));
    const guilty = features.flatMap((file) => {
      const own = `src/features/${file.split('/')[2]}/`;
      return offenders(
        importsOf(file),
        ({ target }) => !isOwn(target) || target.startsWith(own) || /^(src\/(ui|lib)|shared)\//.test(target),
      );
    });
    expect(guilty).toEqual([]);
    const parts = src.filter((file) => /^src\/(ui|lib)\//.test(file)).flatMap(importsOf);
    expect(offenders(parts, ({ target }) => !/^src\/(features|app)\//.test(target))).toEqual([]);
  });
});
