import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Role } from '#shared/api/endpoint.ts';
import { type AnyEndpoint, everyEndpoint } from '#tests/support/endpoints.ts';
import {
  failOnConsole,
  newHousehold,
  startTestServer,
  type TestClient,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

const endpoints = await everyEndpoint();
const households = endpoints.filter(({ endpoint }) => typeof endpoint.access !== 'string');

let server: TestServer;
let params: Record<string, string>;
const clients: Partial<Record<Role | 'anonymous' | 'stranger', TestClient>> = {};

beforeAll(async () => {
  server = await startTestServer();
  const household = await newHousehold(server);
  params = { householdId: household.id, to: '2026-09-14', taxYear: '2025' };
  clients.owner = household.owner;
  clients.member = await household.person('Jonah', 'member');
  clients.preparer = await household.person('Marisol', 'preparer');
  clients.stranger = (await newHousehold(server, 'Stranger', '4 Gull Court')).owner;
  clients.anonymous = server.client();
});
afterAll(() => server.close());

const changes = () => server.deps.sqlite.prepare('SELECT total_changes()').pluck().get();

async function call(who: keyof typeof clients, endpoint: AnyEndpoint) {
  const client = clients[who];
  if (client === undefined) throw new Error(`no client for ${who}`);
  // A body that no schema accepts: who may call is decided before what was sent.
  const answer = await client.raw(
    endpoint.path.replaceAll(/:(\w+)/g, (_match, name: string) => params[name] ?? 'unknown'),
    {
      method: endpoint.method,
      headers: { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json' },
      ...(endpoint.method === 'GET' || endpoint.method === 'DELETE' ? {} : { body: '{"nonsense":true}' }),
    },
  );
  return { status: answer.status, text: await answer.text() };
}

describe('who may call what', () => {
  it('has a route for every endpoint, and no route without one', () => {
    const key = ({ method, path }: { method: string; path: string }) => `${method} ${path}`;
    expect(endpoints.length).toBeGreaterThan(40);
    expect(server.app.mounted.map(key).sort()).toEqual(endpoints.map(({ endpoint }) => key(endpoint)).sort());
  });

  it.each(households)('$name: an unknown visitor is asked to sign in', async ({ endpoint }) => {
    const before = changes();
    const { status, text } = await call('anonymous', endpoint);
    expect(status).toBe(401);
    expect(JSON.parse(text)).toMatchObject({ code: 'not-signed-in' });
    expect(changes()).toBe(before);
  });

  it.each(households)('$name: the owner of another household learns nothing', async ({ endpoint }) => {
    const before = changes();
    const { status, text } = await call('stranger', endpoint);
    expect(status).toBe(404);
    expect(JSON.parse(text)).toEqual({ code: 'not-found', detail: null, faults: [] });
    expect(changes()).toBe(before);
  });

  const byRole = households.flatMap(({ name, endpoint }) =>
    (['member', 'preparer', 'owner'] as const).map((role) => ({
      name,
      endpoint,
      role,
      may: typeof endpoint.access !== 'string' && endpoint.access.includes(role),
    })),
  );

  it.each(byRole.filter(({ may }) => !may))('$name: a $role is refused', async ({ endpoint, role }) => {
    const before = changes();
    const { status, text } = await call(role, endpoint);
    expect(status).toBe(403);
    expect(JSON.parse(text)).toMatchObject({ code: 'forbidden' });
    expect(changes()).toBe(before);
  });

  it.each(byRole.filter(({ may }) => may))('$name: a $role gets past the guard', async ({ endpoint, role }) => {
    const { status, text } = await call(role, endpoint);
    expect([401, 403, 500]).not.toContain(status);
    // What is not there is not there; the household itself is.
    if (status === 404) expect(JSON.parse(text).detail).not.toBeNull();
  });

  it('asks for a session where a household is not yet named', async () => {
    const signedIn = endpoints.filter(({ endpoint }) => endpoint.access === 'signedIn');
    expect(signedIn.length).toBeGreaterThan(2);
    for (const { endpoint } of signedIn) expect((await call('anonymous', endpoint)).status).toBe(401);
  });

  it('reads change nothing', async () => {
    const before = changes();
    for (const { endpoint } of endpoints) if (endpoint.method === 'GET') await call('owner', endpoint);
    expect(changes()).toBe(before);
  });

  it('an address that is no endpoint is not found, as JSON', async () => {
    const answer = await server.client().raw('/api/nothing-here');
    expect(answer.status).toBe(404);
    expect(await answer.json()).toEqual({ code: 'not-found', detail: null, faults: [] });
  });
});
