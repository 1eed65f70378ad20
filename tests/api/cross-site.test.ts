import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { everyEndpoint } from '#tests/support/endpoints.ts';
import {
  failOnConsole,
  newHousehold,
  pathOf,
  startTestServer,
  type TestClient,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

const unsafe = (await everyEndpoint()).filter(({ endpoint }) => endpoint.method !== 'GET');

let server: TestServer;
let owner: TestClient;
let params: Record<string, string>;

beforeAll(async () => {
  server = await startTestServer();
  const household = await newHousehold(server);
  owner = household.owner;
  params = household.params;
});
afterAll(() => server.close());

const send = (path: string, method: string, headers: Record<string, string>) =>
  owner.raw(path, {
    method,
    headers: { 'content-type': 'application/json', ...headers },
    ...(method === 'DELETE' ? {} : { body: '{}' }),
  });

describe('requests from other sites (OWASP Cross-Site Request Forgery Prevention Cheat Sheet: fetch metadata, then Origin)', () => {
  it.each(unsafe)('$name refuses what does not come from our own pages', async ({ endpoint }) => {
    const path = pathOf(endpoint, params);
    const foreign: Record<string, string>[] = [
      {},
      { 'sec-fetch-site': 'cross-site' },
      { 'sec-fetch-site': 'same-site' },
      { 'sec-fetch-site': 'none' },
      { origin: 'http://elsewhere.test' },
      { origin: 'http://book.test.elsewhere.test' },
      { origin: 'null' },
      // A browser that says cross-site is believed, whatever origin it gives.
      { 'sec-fetch-site': 'cross-site', origin: 'http://book.test' },
    ];
    for (const headers of foreign) {
      const answer = await send(path, endpoint.method, headers);
      expect(answer.status).toBe(403);
      expect(await answer.json()).toMatchObject({ code: 'cross-site' });
    }
  });

  it('takes our own pages by fetch metadata, and by the exact origin where a browser sends none', async () => {
    const path = pathOf({ path: '/api/households/:householdId/setup/skip' }, params);
    for (const headers of [{ 'sec-fetch-site': 'same-origin' }, { origin: 'http://book.test' }]) {
      const answer = await owner.raw(path, {
        method: 'POST',
        headers: { 'content-type': 'application/json', ...headers },
        body: '{"step":"loan"}',
      });
      expect(answer.status).toBe(200);
    }
  });

  it('varies by the headers it decides on and reflects no origin', async () => {
    const answer = await owner.raw('/api/session', { headers: { origin: 'http://elsewhere.test' } });
    expect(answer.headers.get('vary')).toMatch(/Sec-Fetch-Site, Origin/);
    expect(answer.headers.get('access-control-allow-origin')).toBeNull();
  });
});
