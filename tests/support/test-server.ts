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
import type { Endpoint, Role } from '#shared/api/endpoint.ts';
import { sessionApi } from '#shared/api/session.ts';
import { type Problem, problemSchema, type Result } from '#shared/problem.ts';

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

export type Called<R> = {
  status: number;
  headers: Headers;
  /** The parsed response; throws when the answer was a problem. */
  value: R;
  /** The problem; throws when the answer was none. */
  problem: Problem;
  text: string;
};

export type CallOptions<B> = {
  params?: Record<string, string>;
  body?: B;
  file?: { fileName: string; bytes: Uint8Array | string };
  fields?: Record<string, string>;
  headers?: Record<string, string>;
};

export type TestClient = {
  cookie: string | null;
  call<B, R>(endpoint: Endpoint<B, R>, options?: CallOptions<B>): Promise<Called<R>>;
  /** A request as it is, for what no endpoint would send. */
  raw(path: string, init?: RequestInit): Promise<Response>;
};

export function pathOf(endpoint: { path: string }, params: Record<string, string> = {}): string {
  return endpoint.path.replaceAll(/:(\w+)/g, (_match, name: string) => encodeURIComponent(params[name] ?? 'x'));
}

function makeClient(url: string): TestClient {
  const client: TestClient = {
    cookie: null,
    async raw(at, init = {}) {
      const headers = new Headers(init.headers);
      if (client.cookie !== null && !headers.has('cookie')) headers.set('cookie', client.cookie);
      const response = await fetch(`${url}${at}`, { ...init, headers, redirect: 'manual' });
      for (const set of response.headers.getSetCookie()) {
        const [pair] = set.split(';');
        client.cookie = pair === undefined || pair.endsWith('=') ? null : pair;
      }
      return response;
    },
    async call(endpoint, options = {}) {
      const headers: Record<string, string> = { 'sec-fetch-site': 'same-origin', ...options.headers };
      let body: FormData | string | null = null;
      if (endpoint.kind === 'upload') {
        const form = new FormData();
        for (const [name, value] of Object.entries(options.fields ?? {})) form.append(name, value);
        if (options.file) {
          const { bytes } = options.file;
          const content = typeof bytes === 'string' ? bytes : new Uint8Array(bytes);
          form.append('file', new Blob([content]), options.file.fileName);
        }
        body = form;
      } else if (options.body !== undefined) {
        headers['content-type'] = 'application/json';
        body = JSON.stringify(options.body);
      }
      const response = await client.raw(pathOf(endpoint, options.params), { method: endpoint.method, headers, body });
      const text = await response.text();
      const json = (): unknown => JSON.parse(text);
      return {
        status: response.status,
        headers: response.headers,
        text,
        get value() {
          if (!response.ok) throw new Error(`${endpoint.method} ${endpoint.path}: ${response.status} ${text}`);
          // A response without a schema has `undefined` for its type.
          return endpoint.response === null ? (undefined as never) : endpoint.response.parse(json());
        },
        get problem() {
          if (response.ok) throw new Error(`${endpoint.method} ${endpoint.path} went well: ${text.slice(0, 200)}`);
          return problemSchema.parse(json());
        },
      };
    },
  };
  return client;
}

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
