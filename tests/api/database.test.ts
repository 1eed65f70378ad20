import { copyFileSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import Sqlite from 'better-sqlite3';
import fc from 'fast-check';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { APPLICATION_ID, closeDatabase, inTransaction, openDatabase } from '#server/db/client.ts';
import { backUp, defaultMigrationsDir, migrateDatabase } from '#server/db/migrate.ts';
import { MISSING, packDay, unpackDay } from '#server/db/packed-day.ts';
import { appSettings } from '#server/db/schema/people.ts';
import { failOnConsole } from '#tests/support/test-server.ts';

failOnConsole();

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'gablebook-db-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const NOW = new Date('2026-12-01T15:00:00Z');
const file = () => path.join(folder, 'gablebook.db');
const options = (migrationsDir = defaultMigrationsDir()) => ({
  migrationsDir,
  backupDir: path.join(folder, 'backups'),
  now: NOW,
});

async function migrated(migrationsDir?: string) {
  const database = openDatabase(file());
  await migrateDatabase(database, options(migrationsDir));
  return database;
}

/** The migrations of the application and one more, as a later version would have it. */
function withOneMore(sql: string): string {
  const target = path.join(folder, 'migrations');
  const source = defaultMigrationsDir();
  const journal = JSON.parse(readFileSync(path.join(source, 'meta', '_journal.json'), 'utf8'));
  rmSync(target, { recursive: true, force: true });
  for (const { tag } of journal.entries) {
    copyInto(path.join(source, `${tag}.sql`), path.join(target, `${tag}.sql`));
  }
  const last = journal.entries.at(-1);
  journal.entries.push({ ...last, idx: last.idx + 1, when: last.when + 1000, tag: '9999_next' });
  writeFileSync(path.join(target, '9999_next.sql'), sql);
  copyInto(path.join(source, 'meta', '_journal.json'), path.join(target, 'meta', '_journal.json'));
  writeFileSync(path.join(target, 'meta', '_journal.json'), JSON.stringify(journal));
  return target;
}

function copyInto(from: string, to: string): void {
  mkdirSync(path.dirname(to), { recursive: true });
  copyFileSync(from, to);
}

describe('the schema', () => {
  it('has strict tables only, each with its household but the global ones', async () => {
    const database = await migrated();
    const tables = database.sqlite
      .prepare(
        "SELECT name, sql FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite_%' AND name NOT LIKE '\\_\\_drizzle%' ESCAPE '\\'",
      )
      .all() as { name: string; sql: string }[];
    expect(tables.length).toBeGreaterThan(25);
    expect(tables.filter(({ sql }) => !/\)\s*STRICT\s*$/.test(sql)).map(({ name }) => name)).toEqual([]);
    const global = ['app_settings', 'households', 'sessions', 'users'];
    const without = tables.filter(({ name }) => {
      const columns = database.sqlite.prepare(`SELECT name FROM pragma_table_info('${name}')`).pluck().all();
      return !columns.includes('household_id');
    });
    expect(without.map(({ name }) => name).sort()).toEqual(global);
    // Keys begin with the household, so that one household's rows can never stand for another's.
    for (const { name } of tables.filter((table) => !global.includes(table.name) && table.name !== 'audit_events')) {
      const first = database.sqlite.prepare(`SELECT name FROM pragma_table_info('${name}') WHERE pk = 1`).pluck().get();
      expect([name, first]).toEqual([name, 'household_id']);
    }
    closeDatabase(database);
  });

  it.each([
    ['a fraction of a cent', "INSERT INTO loan_payments VALUES ('h', 'p', '2026-01-01', 10.5, 0, NULL, 0, NULL)"],
    ['a text for an amount', "INSERT INTO loan_payments VALUES ('h', 'p', '2026-01-01', 'ten', 0, NULL, 0, NULL)"],
    ['a day that is none', "INSERT INTO loan_payments VALUES ('h', 'p', '1 Jan 2026', 10, 0, NULL, 0, NULL)"],
    ['an end before its start', "INSERT INTO usage_before VALUES ('h', '2026-02-01', '2026-01-01', 1000)"],
    ['a plan that is no JSON', "INSERT INTO rate_plans VALUES ('h', '2026-01-01', 'flat', NULL)"],
    ['half a step', "INSERT INTO interval_days VALUES ('h', 'import', '2026-01-01', 60, x'010203', NULL)"],
    ['another role', "INSERT INTO memberships VALUES ('h', 'u', 'admin', '2026-01-01')"],
    [
      'a rate that is no number',
      "INSERT INTO incentives VALUES ('h', 'p', 'abc', '2026-01-01', '2027-01-01', 'separate')",
    ],
    ['a row of no household', "INSERT INTO loan_payments VALUES ('nobody', 'p', '2026-01-01', 10, 0, NULL, 0, NULL)"],
  ])('refuses %s', async (_what, sql) => {
    const database = await migrated();
    database.sqlite.exec(
      "INSERT INTO households (id, created_at, name, place, utility, time_zone, opening) VALUES ('h', 'now', 'n', '', '', 'UTC', '{}')",
    );
    database.sqlite.exec("INSERT INTO users VALUES ('u', 'u@example.org', 'U', '$argon2id$x', 'now')");
    expect(() => database.sqlite.exec(sql)).toThrow(/constraint|cannot store/i);
    closeDatabase(database);
  });
});

describe('the connection', () => {
  it('writes ahead, syncs in full, minds foreign keys, is patient, and knows its own files', async () => {
    const database = await migrated();
    const pragma = (name: string) => database.sqlite.pragma(name, { simple: true });
    expect(['journal_mode', 'synchronous', 'foreign_keys', 'busy_timeout', 'application_id'].map(pragma)).toEqual([
      'wal',
      2,
      1,
      5000,
      APPLICATION_ID,
    ]);
    closeDatabase(database);
    const again = openDatabase(file());
    expect(again.sqlite.pragma('synchronous', { simple: true })).toBe(2);
    closeDatabase(again);
  });

  it('refuses the file of another application', () => {
    const other = new Sqlite(file());
    other.exec('CREATE TABLE notes (text TEXT)');
    other.close();
    expect(() => openDatabase(file())).toThrow(/is not a Gablebook database/);
  });

  it('a transaction that waits is refused and leaves nothing', async () => {
    const database = await migrated();
    const work = (async (tx: Parameters<Parameters<typeof inTransaction>[1]>[0]) => {
      tx.insert(appSettings).values({ name: 'a', value: '1' }).run();
      await Promise.resolve();
    }) as unknown as (tx: unknown) => null;
    expect(() => inTransaction(database.db, work)).toThrow(/cannot wait for a promise/);
    expect(database.sqlite.prepare('SELECT count(*) FROM app_settings').pluck().get()).toBe(0);
    closeDatabase(database);
  });
});

describe('migrations', () => {
  const seed = (database: Awaited<ReturnType<typeof migrated>>) =>
    database.sqlite.exec(`
      INSERT INTO users VALUES ('u', 'u@example.org', 'U', '$argon2id$x', 'now');
      INSERT INTO households (id, created_at, name, place, utility, time_zone, opening) VALUES ('h', 'now', 'n', '', '', 'UTC', '{}');
      INSERT INTO memberships VALUES ('h', 'u', 'owner', 'now');
      INSERT INTO loan_payments (household_id, id, on_day, amount_cents, extra_principal_cents) VALUES ('h', 'p', '2026-01-01', 10, 0);`);

  it('are done once', async () => {
    const database = openDatabase(file());
    expect((await migrateDatabase(database, options())).applied).toBeGreaterThan(0);
    expect(await migrateDatabase(database, options())).toEqual({ applied: 0, backup: null });
    closeDatabase(database);
  });

  it('keep the children of a table that is rebuilt, and leave a sound copy of the file as it was', async () => {
    const database = await migrated();
    seed(database);
    const rebuild = [
      'PRAGMA foreign_keys=OFF;',
      'CREATE TABLE `__new_users` (`id` text PRIMARY KEY NOT NULL, `email` text NOT NULL, `name` text NOT NULL, `password_hash` text NOT NULL, `created_at` text NOT NULL, `note` text) STRICT;',
      'INSERT INTO `__new_users`(id, email, name, password_hash, created_at) SELECT id, email, name, password_hash, created_at FROM `users`;',
      'DROP TABLE `users`;',
      'ALTER TABLE `__new_users` RENAME TO `users`;',
      'PRAGMA foreign_keys=ON;',
    ].join('--> statement-breakpoint\n');
    const { applied, backup } = await migrateDatabase(database, options(withOneMore(rebuild)));
    expect(applied).toBe(1);
    const count = (table: string) => database.sqlite.prepare(`SELECT count(*) FROM ${table}`).pluck().get();
    expect([count('users'), count('memberships'), count('loan_payments')]).toEqual([1, 1, 1]);
    expect(database.sqlite.pragma('foreign_keys', { simple: true })).toBe(1);
    const copy = openDatabase(backup ?? '');
    expect(
      copy.sqlite.prepare("SELECT count(*) FROM pragma_table_info('users') WHERE name = 'note'").pluck().get(),
    ).toBe(0);
    expect(copy.sqlite.prepare('SELECT count(*) FROM memberships').pluck().get()).toBe(1);
    closeDatabase(copy);
    closeDatabase(database);
  });

  it('that lose rows are refused', async () => {
    const database = await migrated();
    seed(database);
    await expect(migrateDatabase(database, options(withOneMore('DELETE FROM loan_payments;')))).rejects.toThrow(
      /lost rows of loan_payments; the backup is/,
    );
    closeDatabase(database);
  });

  it('that were edited after they ran, and files from a newer version, are refused', async () => {
    const database = await migrated();
    const edited = withOneMore('SELECT 1;');
    await migrateDatabase(database, options(edited));
    writeFileSync(path.join(edited, '9999_next.sql'), 'SELECT 2;');
    await expect(migrateDatabase(database, options(edited))).rejects.toThrow(/was changed after/);
    await expect(migrateDatabase(database, options())).rejects.toThrow(/newer version/);
    closeDatabase(database);
  });

  it('keep the five youngest copies', async () => {
    const database = await migrated();
    const names = ['1', '2', '3', '4', '5', '6', '7'];
    for (const name of names) await backUp(database, path.join(folder, 'backups'), `copy-${name}`);
    const kept = readdirSync(path.join(folder, 'backups')).filter((name) => name.endsWith('.db'));
    expect(kept.sort()).toEqual(['copy-3.db', 'copy-4.db', 'copy-5.db', 'copy-6.db', 'copy-7.db']);
    closeDatabase(database);
  });
});

describe('packed days', () => {
  it('come out as they went in', () => {
    const step = fc.oneof(fc.constant(null), fc.integer({ min: MISSING + 1, max: 2_147_483_647 }));
    fc.assert(
      fc.property(fc.array(step, { maxLength: 300 }), (values) => {
        const packed = packDay(values);
        expect(packed.length).toBe(values.length * 4);
        expect(unpackDay(packed)).toEqual(values);
      }),
    );
  });

  it('lie in the file as little-endian 32-bit numbers', () => {
    expect(packDay([1, -2, null]).toString('hex')).toBe('01000000feffffff00000080');
  });

  it.each([0.5, 2_147_483_648, MISSING, Number.NaN])('refuse %s', (value) => {
    expect(() => packDay([value])).toThrow(RangeError);
  });
});
