import { existsSync, mkdirSync } from 'node:fs';
import { createServer } from 'node:http';
import path from 'node:path';
import { createApp } from './app.ts';
import { closeDatabase, inTransaction, openDatabase } from './db/client.ts';
import { defaultMigrationsDir, migrateDatabase } from './db/migrate.ts';
import { households } from './db/schema/households.ts';
import { users } from './db/schema/people.ts';
import type { Deps } from './deps.ts';
import { isLoopback, parseEnv } from './env.ts';
import { lineLog } from './log.ts';

const REQUEST_TIMEOUT_MS = 60_000;
const HEADERS_TIMEOUT_MS = 15_000;
const GRACE_MS = 5_000;

function say(text: string): void {
  process.stdout.write(`${text}\n`);
}

function stopWith(text: string): never {
  process.stderr.write(`${text}\n`);
  process.exit(1);
}

const root = path.resolve(import.meta.dirname, '..');
const parsed = parseEnv(process.env, root);
if (!parsed.ok) stopWith(parsed.problem.detail ?? 'The configuration cannot be used.');
const env = parsed.value;

function openHere(): ReturnType<typeof openDatabase> {
  try {
    mkdirSync(env.dataDir, { recursive: true });
    return openDatabase(path.join(env.dataDir, 'gablebook.db'));
  } catch (error) {
    stopWith(
      `The database in ${env.dataDir} cannot be opened: ${error instanceof Error ? error.message : String(error)}`,
    );
  }
}

const database = openHere();
try {
  const { applied, backup } = await migrateDatabase(database, {
    migrationsDir: defaultMigrationsDir(),
    backupDir: path.join(env.dataDir, 'backups'),
    now: new Date(),
  });
  if (backup !== null)
    say(`The database was brought up to date in ${applied} steps; a copy of it as it was is ${backup}.`);
} catch (error) {
  stopWith(`The database could not be brought up to date: ${error instanceof Error ? error.message : String(error)}`);
}

const log = lineLog((line) => {
  if (env.log === 'all' || !line.includes(' info ')) process.stdout.write(line);
});
const distDir = path.join(root, 'dist');
const deps: Deps = {
  ...database,
  clock: () => new Date(),
  log,
  settings: {
    origins: env.origins,
    https: env.origins.every((origin) => origin.startsWith('https://')),
    signUp: env.signUp,
    trustedProxies: env.trustedProxies,
    distDir: existsSync(path.join(distDir, 'index.html')) ? distDir : null,
    checkResponses: false,
  },
};

const isEmpty = deps.db.select({ id: users.id }).from(users).limit(1).get() === undefined;
const wantsSample = env.sample === 'always' || (env.sample === 'auto' && isLoopback(env.host));
/**
 * The sample's sign-ins; none where it is not wanted or could not be laid. What was laid of it by then goes again, so that the next start
 * finds an empty database as this one did. Loaded only when it is wanted: an installation with people in it never needs it.
 */
async function laySampleIfWanted(): Promise<{ role: string; email: string; password: string }[]> {
  if (!isEmpty || !wantsSample) return [];
  try {
    const { laySample } = await import('./sample/lay-sample.ts');
    return await laySample(deps);
  } catch (error) {
    log('error', 'sample-failed', { error: error instanceof Error ? error.message : String(error) });
    inTransaction(deps.db, (tx) => {
      tx.delete(households).run();
      tx.delete(users).run();
      return null;
    });
    return [];
  }
}
const signIns = await laySampleIfWanted();

const app = createApp(deps);
const server = createServer({ requestTimeout: REQUEST_TIMEOUT_MS, headersTimeout: HEADERS_TIMEOUT_MS }, app.express);

server.once('error', (error: NodeJS.ErrnoException) => {
  const reason =
    error.code === 'EADDRINUSE'
      ? `Port ${env.port} on ${env.host} is taken. Stop what listens there, or set PORT to another number.`
      : error.code === 'EACCES'
        ? `Port ${env.port} may not be used. Set PORT to a number above 1023.`
        : `The server cannot listen on ${env.host}:${env.port}: ${error.message}`;
  closeDatabase(database);
  stopWith(reason);
});

server.listen(env.port, env.host, () => {
  const bound = server.address();
  const port = typeof bound === 'object' && bound !== null ? bound.port : env.port;
  const address = env.port === 0 ? `http://${env.host}:${port}` : env.origins[0];
  say('');
  say(`Gablebook is at ${address}`);
  if (signIns.length > 0) {
    say('');
    say('A sample household has been laid out. Its sign-ins are shown this once:');
    for (const { role, email, password } of signIns) say(`  ${role.padEnd(16)} ${email.padEnd(28)} ${password}`);
  }
  say('');
});

let stopping = false;
function stop(): void {
  if (stopping) return;
  stopping = true;
  app.stopping();
  const force = setTimeout(() => server.closeAllConnections(), GRACE_MS);
  server.close(() => {
    clearTimeout(force);
    closeDatabase(database);
    process.exit(0);
  });
  server.closeIdleConnections();
}
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
