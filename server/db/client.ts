import Sqlite from 'better-sqlite3';
import { type BetterSQLite3Database, drizzle } from 'drizzle-orm/better-sqlite3';

type NoSchema = Record<string, never>;
export type Db = BetterSQLite3Database<NoSchema>;
/** What a query can run on: the connection or a transaction on it. */
export type Tx = Parameters<Parameters<Db['transaction']>[0]>[0];
export type Reader = Db | Tx;
export type Database = { sqlite: Sqlite.Database; db: Db };

/** "GABL": tells our files from other people's. */
export const APPLICATION_ID = 0x4741424c;

function pragma(sqlite: Sqlite.Database, name: string): unknown {
  return sqlite.pragma(name, { simple: true });
}

function mustBe(sqlite: Sqlite.Database, name: string, expected: unknown): void {
  const found = pragma(sqlite, name);
  if (found !== expected) throw new Error(`the database setting ${name} is ${String(found)}, not ${String(expected)}`);
}

/**
 * Opens the one connection. Settings are not stored in the file, so each is set and then read back: write-ahead log, a full sync on
 * each commit (WAL alone gives NORMAL, which may lose a commit when the power fails), foreign keys, five seconds of patience.
 * Throws when the file belongs to another application.
 */
export function openDatabase(file: string): Database {
  const sqlite = new Sqlite(file);
  try {
    const applicationId = pragma(sqlite, 'application_id');
    const tables = sqlite.prepare('SELECT count(*) FROM sqlite_schema').pluck().get();
    if (applicationId !== APPLICATION_ID && !(applicationId === 0 && tables === 0)) {
      throw new Error(`${file} is not a Gablebook database. Set DATA_DIR to another folder.`);
    }
    sqlite.pragma('journal_mode = WAL');
    sqlite.pragma('synchronous = FULL');
    sqlite.pragma('foreign_keys = ON');
    sqlite.pragma('busy_timeout = 5000');
    if (applicationId === 0) sqlite.pragma(`application_id = ${APPLICATION_ID}`);
    // The synchronous setting shows its true value only after a page has been read.
    sqlite.prepare('SELECT count(*) FROM sqlite_schema').get();
    mustBe(sqlite, 'journal_mode', 'wal');
    mustBe(sqlite, 'synchronous', 2);
    mustBe(sqlite, 'foreign_keys', 1);
    mustBe(sqlite, 'busy_timeout', 5000);
    mustBe(sqlite, 'application_id', APPLICATION_ID);
    return { sqlite, db: drizzle(sqlite) };
  } catch (error) {
    sqlite.close();
    throw error;
  }
}

type Sync<T> = T extends PromiseLike<unknown> ? never : T;

/**
 * One immediate transaction. The work must be synchronous: an async one would go on outside the transaction after its first await, so
 * it is refused by type and, should the type be evaded, by a throw that rolls back.
 */
export function inTransaction<T>(db: Db, work: (tx: Tx) => Sync<T>): T {
  return db.transaction(
    (tx): T => {
      const value: unknown = work(tx);
      if (value instanceof Promise) {
        value.catch(() => undefined);
        throw new Error('a transaction cannot wait for a promise');
      }
      return value as T;
    },
    { behavior: 'immediate' },
  );
}

/** Takes the write-ahead log into the file and closes it. */
export function closeDatabase(database: Database): void {
  database.sqlite.pragma('wal_checkpoint(TRUNCATE)');
  database.sqlite.close();
}
