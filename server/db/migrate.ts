import { createHash } from 'node:crypto';
import {
  closeSync,
  existsSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
} from 'node:fs';
import path from 'node:path';
import Sqlite from 'better-sqlite3';
import { migrate } from 'drizzle-orm/better-sqlite3/migrator';
import * as z from 'zod/mini';
import type { Database } from './client.ts';

const BACKUPS_KEPT = 5;

const journalSchema = z.object({ entries: z.array(z.object({ idx: z.int(), tag: z.string() })) });

type Known = { tag: string; hash: string };

function knownMigrations(folder: string): Known[] {
  const journal = journalSchema.parse(JSON.parse(readFileSync(path.join(folder, 'meta', '_journal.json'), 'utf8')));
  return journal.entries.map((entry) => ({
    tag: entry.tag,
    hash: createHash('sha256')
      .update(readFileSync(path.join(folder, `${entry.tag}.sql`)))
      .digest('hex'),
  }));
}

function appliedHashes({ sqlite }: Database): string[] {
  const there = sqlite.prepare("SELECT 1 FROM sqlite_schema WHERE name = '__drizzle_migrations'").get();
  if (there === undefined) return [];
  return z.array(z.string()).parse(sqlite.prepare('SELECT hash FROM __drizzle_migrations ORDER BY id').pluck().all());
}

function rowCounts({ sqlite }: Database): Map<string, number> {
  const names = z
    .array(z.string())
    .parse(
      sqlite.prepare("SELECT name FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite_%'").pluck().all(),
    );
  return new Map(
    names.map((name) => [name, z.int().parse(sqlite.prepare(`SELECT count(*) FROM "${name}"`).pluck().get())]),
  );
}

function mustHaveNoBrokenKeys(sqlite: Sqlite.Database): void {
  const broken = z.array(z.unknown()).parse(sqlite.pragma('foreign_key_check'));
  if (broken.length > 0) throw new Error(`${broken.length} rows refer to rows that are not there`);
}

/** Copies the open file aside, checks the copy and puts it under its name; the oldest copies beyond five go. */
export async function backUp({ sqlite }: Database, folder: string, name: string): Promise<string> {
  mkdirSync(folder, { recursive: true });
  const target = path.join(folder, `${name}.db`);
  const temporary = `${target}.part`;
  rmSync(temporary, { force: true });
  await sqlite.backup(temporary);
  const copy = new Sqlite(temporary);
  try {
    if (copy.pragma('integrity_check', { simple: true }) !== 'ok') throw new Error('the backup copy is damaged');
    mustHaveNoBrokenKeys(copy);
    copy.pragma('journal_mode = DELETE');
  } finally {
    copy.close();
  }
  const handle = openSync(temporary, 'r+');
  fsyncSync(handle);
  closeSync(handle);
  renameSync(temporary, target);
  const copies = readdirSync(folder)
    .filter((file) => file.endsWith('.db'))
    .sort();
  for (const old of copies.slice(0, -BACKUPS_KEPT)) rmSync(path.join(folder, old), { force: true });
  return target;
}

export type MigrateOptions = { migrationsDir: string; backupDir: string; now: Date };

/**
 * Brings the file to this version of the application. A file that holds anything is copied aside first. Foreign keys are off meanwhile,
 * since a rebuilt table would otherwise take its children with it, and no table may come out with fewer rows than it had.
 * Throws on a file from a newer version and on a migration that was edited after it had been applied.
 */
export async function migrateDatabase(
  database: Database,
  options: MigrateOptions,
): Promise<{ applied: number; backup: string | null }> {
  const { sqlite, db } = database;
  const known = knownMigrations(options.migrationsDir);
  const applied = appliedHashes(database);
  const version = z.int().parse(sqlite.pragma('user_version', { simple: true }));
  if (applied.length > known.length || version > known.length) {
    throw new Error(
      'The database was written by a newer version of Gablebook. Start that version, or restore a backup.',
    );
  }
  for (const [index, hash] of applied.entries()) {
    if (known[index]?.hash !== hash)
      throw new Error(`migration ${known[index]?.tag} was changed after it had been applied`);
  }
  if (applied.length === known.length) return { applied: 0, backup: null };

  const before = rowCounts(database);
  const stamp = options.now.toISOString().replaceAll(/[-:]/g, '').slice(0, 15);
  const backup =
    applied.length === 0 ? null : await backUp(database, options.backupDir, `before-${known.length}-${stamp}`);
  sqlite.pragma('foreign_keys = OFF');
  try {
    migrate(db, { migrationsFolder: options.migrationsDir });
    mustHaveNoBrokenKeys(sqlite);
    const after = rowCounts(database);
    for (const [table, count] of before) {
      if ((after.get(table) ?? 0) < count)
        throw new Error(`a migration lost rows of ${table}; the backup is ${backup}`);
    }
  } finally {
    sqlite.pragma('foreign_keys = ON');
  }
  sqlite.pragma(`user_version = ${known.length}`);
  return { applied: known.length - applied.length, backup };
}

/** The migrations folder beside the application's sources. */
export function defaultMigrationsDir(): string {
  const folder = path.resolve(import.meta.dirname, '../../migrations');
  if (!existsSync(folder)) throw new Error('the migrations folder is missing');
  return folder;
}
