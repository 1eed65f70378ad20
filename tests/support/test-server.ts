import { copyFileSync, mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, vi } from 'vitest';
import { type App, createApp } from '#server/app.ts';
import { closeDatabase, openDatabase } from '#server/db/client.ts';
import { defaultMigrationsDir, migrateDatabase } from '#server/db/migrate.ts';
import type { Deps } from '#server/deps.ts';
import { createHousehold } from '#server/services/create-household.ts';
import { addPerson } from '#server/services/people.ts';
import { signUp } from '#server/services/sign-up.ts';
import type { Role } from '#shared/api/endpoint.ts';
import { sessionApi } from '#shared/api/session.ts';
import type { Result } from '#shared/problem.ts';
import { makeClient, type TestClient } from './test-client.ts';

export { pathOf, type TestClient } from './test-client.ts';

export const FIXED_NOW = '2026-12-01T15:00:00.000Z';
export const PASSWORD = 'a lantern over the harbor wall';

/** An unexpected `console.error` or `console.warn` fails the test. */
export function failOnConsole(): void {
  beforeEach(() => {
    vi.spyOn(console, 'error');
    vi.spyOn(console, 'warn');
  });
  afterEach(() => {
    expect(console.error).not.toHaveBeenCalled();
    expect(console.warn).not.toHaveBeenCalled();
    vi.restoreAllMocks();
  });
}

let template: string | null = null;

/** One migrated, empty database per process; every server starts from a copy of it. */
async function templateDatabase(): Promise<string> {
  if (template !== null) return template;
  const folder = mkdtempSync(path.join(tmpdir(), 'gablebook-template-'));
  const file = path.join(folder, 'template.db');
  const database = openDatabase(file);
  await migrateDatabase(database, {
    migrationsDir: defaultMigrationsDir(),
    backupDir: path.join(folder, 'backups'),
    now: new Date(FIXED_NOW),
  });
  closeDatabase(database);
  process.once('exit', () => rmSync(folder, { recursive: true, force: true }));
  template = file;
  return file;
}

export type LogLine = { level: string; event: string; about: Record<string, string | number | boolean | null> };

export type TestServer = {
  deps: Deps;
  app: App;
  url: string;
  logs: LogLine[];
  /** Moves the clock on. */
  advance(milliseconds: number): void;
  client(): TestClient;
  /** A new user, made by the service, signed in over HTTP. */
  signedIn(name: string): Promise<TestClient & { userId: string }>;
  close(): Promise<void>;
};

export function must<T>(result: Result<T>): T {
  if (!result.ok)
    throw new Error(`${result.problem.code}: ${result.problem.detail} ${JSON.stringify(result.problem.faults)}`);
  return result.value;
}

/** The whole application on its own database and a port of its own, with the clock standing still. */
export async function startTestServer(settings: Partial<Deps['settings']> = {}): Promise<TestServer> {
  const folder = mkdtempSync(path.join(tmpdir(), 'gablebook-api-'));
  const file = path.join(folder, 'gablebook.db');
  copyFileSync(await templateDatabase(), file);
  const database = openDatabase(file);
  let now = new Date(FIXED_NOW).getTime();
  const logs: LogLine[] = [];
  const deps: Deps = {
    ...database,
    clock: () => new Date(now),
    log: (level, event, about = {}) => logs.push({ level, event, about }),
    settings: {
      origins: ['http://book.test'],
      https: false,
      signUp: 'open',
      trustedProxies: 0,
      distDir: null,
      checkResponses: true,
      ...settings,
    },
  };
  const app = createApp(deps);
  const server = app.express.listen(0, '127.0.0.1');
  await new Promise<void>((resolve) => server.once('listening', () => resolve()));
  const { port } = server.address() as AddressInfo;
  const url = `http://127.0.0.1:${port}`;
  const client = () => makeClient(url);
  return {
    deps,
    app,
    url,
    logs,
    advance(milliseconds) {
      now += milliseconds;
    },
    client,
    async signedIn(name) {
      const email = `${name.toLowerCase().replaceAll(/\W/g, '.')}@example.org`;
      const { user } = must(await signUp(deps, { name, email, password: PASSWORD }));
      return Object.assign(await signInAs(client(), email), { userId: user.id });
    },
    async close() {
      await new Promise<void>((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      });
      closeDatabase(database);
      rmSync(folder, { recursive: true, force: true });
      const errors = logs.filter((line) => line.level === 'error');
      if (errors.length > 0) throw new Error(`the server logged errors: ${JSON.stringify(errors, null, 1)}`);
    },
  };
}

export async function signInAs(client: TestClient, email: string, password = PASSWORD): Promise<TestClient> {
  const { value } = await client.call(sessionApi.signIn, { body: { email, password } });
  expect(value.user.email).toBe(email);
  return client;
}

export type TestHousehold = {
  id: string;
  owner: TestClient & { userId: string };
  params: { householdId: string };
  actor: { userId: string; name: string; householdId: string; role: 'owner' };
  /** Adds a person of another role, signed in. */
  person(name: string, role: Role): Promise<TestClient & { userId: string }>;
};

type Owner = TestClient & { userId: string };

/** A household with its owner signed in. */
export async function newHousehold(server: TestServer, owner = 'Priya', name = '12 Tern Lane'): Promise<TestHousehold> {
  return householdOf(server, await server.signedIn(owner), owner, name);
}

/** One more household of the same owner, for a test that wants an empty one. */
export async function anotherHousehold(server: TestServer, { owner, actor }: TestHousehold): Promise<TestHousehold> {
  return householdOf(server, owner, actor.name, '12 Tern Lane');
}

function householdOf(server: TestServer, owner: Owner, ownerName: string, name: string): TestHousehold {
  const user = { id: owner.userId, name: ownerName };
  const { id } = must(createHousehold(server.deps, user, { name, timeZone: 'America/New_York' }));
  const actor = { userId: owner.userId, name: ownerName, householdId: id, role: 'owner' as const };
  return {
    id,
    owner,
    params: { householdId: id },
    actor,
    async person(personName, role) {
      const email = `${personName.toLowerCase()}.${role}@example.org`;
      const added = must(await addPerson(server.deps, actor, { name: personName, email, role, password: PASSWORD }));
      return Object.assign(await signInAs(server.client(), email), { userId: added.userId });
    },
  };
}
