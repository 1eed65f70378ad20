import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ABSOLUTE_DAYS, IDLE_DAYS } from '#server/auth/sessions.ts';
import { peopleApi } from '#shared/api/people.ts';
import { sessionApi } from '#shared/api/session.ts';
import { setupApi } from '#shared/api/setup.ts';
import {
  failOnConsole,
  newHousehold,
  PASSWORD,
  signInAs,
  startTestServer,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

const DAY_MS = 86_400_000;
let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

const whoIs = async (cookie: string | null) => {
  const client = server.client();
  client.cookie = cookie;
  return (await client.call(sessionApi.current)).value?.user.name ?? null;
};

describe('sessions', () => {
  it('signing up signs in, and answers who and which households', async () => {
    const client = server.client();
    const { value } = await client.call(sessionApi.signUp, {
      body: { name: ' Ada Fenn ', email: 'Ada.Fenn@Example.org', password: PASSWORD },
    });
    expect(value).toEqual({
      user: { id: value.user.id, name: 'Ada Fenn', email: 'ada.fenn@example.org' },
      households: [],
    });
    expect((await client.call(sessionApi.current)).value).toEqual(value);
  });

  it('an address can sign up once, in whatever letters it is written', async () => {
    const again = await server.client().call(sessionApi.signUp, {
      body: { name: 'Other', email: 'ADA.FENN@example.org', password: PASSWORD },
    });
    expect(again.status).toBe(409);
    expect(again.problem.code).toBe('email-taken');
  });

  it('the cookie cannot be read by scripts and does not travel with other sites’ posts', async () => {
    const client = server.client();
    const answer = await client.raw('/api/session', {
      method: 'POST',
      headers: { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json' },
      body: JSON.stringify({ email: 'ada.fenn@example.org', password: PASSWORD }),
    });
    const [cookie = ''] = answer.headers.getSetCookie();
    expect(cookie).toMatch(/^gablebook=[a-z0-9]{40};/);
    expect(cookie).toContain('HttpOnly');
    expect(cookie).toContain('SameSite=Lax');
    expect(cookie).toContain('Path=/');
    expect(cookie).not.toContain('Secure');
  });

  it('behind https the cookie is Secure and bound to the host by its name', async () => {
    const secure = await startTestServer({ https: true, origins: ['https://book.test'] });
    const answer = await secure.client().raw('/api/users', {
      method: 'POST',
      headers: { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json' },
      body: JSON.stringify({ name: 'Ada', email: 'ada@example.org', password: PASSWORD }),
    });
    const [cookie = ''] = answer.headers.getSetCookie();
    expect(cookie).toMatch(/^__Host-gablebook=/);
    expect(cookie).toContain('Secure');
    await secure.close();
  });

  it('the database holds no token that a browser could send', async () => {
    const client = await server.signedIn('Token Holder');
    const token = client.cookie?.split('=')[1] ?? '';
    expect(token).toHaveLength(40);
    const ids = server.deps.sqlite.prepare('SELECT id FROM sessions').pluck().all();
    expect(ids.length).toBeGreaterThan(0);
    expect(ids).not.toContain(token);
  });

  it('signing in again gives a new token and ends the old one', async () => {
    const client = await server.signedIn('Twice');
    const old = client.cookie;
    await signInAs(client, 'twice@example.org');
    expect(client.cookie).not.toBe(old);
    expect(await whoIs(client.cookie)).toBe('Twice');
    expect(await whoIs(old)).toBeNull();
  });

  it('a token planted before signing in is worth nothing after', async () => {
    const client = server.client();
    await server.signedIn('Planted');
    client.cookie = `gablebook=${'a'.repeat(40)}`;
    await signInAs(client, 'planted@example.org');
    expect(await whoIs(`gablebook=${'a'.repeat(40)}`)).toBeNull();
  });

  it('signing out ends the session on the server', async () => {
    const client = await server.signedIn('Leaver');
    const old = client.cookie;
    expect((await client.call(sessionApi.signOut)).status).toBe(204);
    expect(client.cookie).toBeNull();
    expect(await whoIs(old)).toBeNull();
  });

  it('two weeks without a visit end a session, and a visit starts them anew', async () => {
    const client = await server.signedIn('Idle');
    const { cookie } = client;
    server.advance((IDLE_DAYS - 1) * DAY_MS);
    expect(await whoIs(cookie)).toBe('Idle');
    server.advance((IDLE_DAYS - 1) * DAY_MS);
    expect(await whoIs(cookie)).toBe('Idle');
    server.advance(IDLE_DAYS * DAY_MS + 1);
    expect(await whoIs(cookie)).toBeNull();
  });

  it('two months end a session that is used every day', async () => {
    const client = await server.signedIn('Daily');
    const { cookie } = client;
    for (let day = 0; day < ABSOLUTE_DAYS; day += 10) {
      expect(await whoIs(cookie)).toBe('Daily');
      server.advance(10 * DAY_MS);
    }
    expect(await whoIs(cookie)).toBe('Daily');
    server.advance(1);
    expect(await whoIs(cookie)).toBeNull();
  });

  it('a changed password ends every other session and gives this one a new token', async () => {
    const here = await server.signedIn('Changer');
    const there = await signInAs(server.client(), 'changer@example.org');
    const old = here.cookie;
    const next = 'another lantern, farther out';
    const refused = await here.call(peopleApi.changePassword, { body: { current: 'not the present one', next } });
    expect(refused.status).toBe(401);
    expect(refused.problem.faults[0]?.field).toBe('current');
    expect(await whoIs(there.cookie)).toBe('Changer');
    expect((await here.call(peopleApi.changePassword, { body: { current: PASSWORD, next } })).status).toBe(204);
    expect(await whoIs(here.cookie)).toBe('Changer');
    expect(await whoIs(old)).toBeNull();
    expect(await whoIs(there.cookie)).toBeNull();
    await signInAs(server.client(), 'changer@example.org', next);
  });

  it('a person taken out of the household is out with the next request', async () => {
    const household = await newHousehold(server, 'Remover');
    const member = await household.person('Gone', 'member');
    expect((await member.call(setupApi.view, { params: household.params })).status).toBe(200);
    const removed = await household.owner.call(peopleApi.remove, {
      params: { ...household.params, userId: member.userId },
    });
    expect(removed.status).toBe(204);
    expect((await member.call(setupApi.view, { params: household.params })).status).toBe(404);
  });

  it('the last owner stays', async () => {
    const household = await newHousehold(server, 'Only Owner');
    const params = { ...household.params, userId: household.owner.userId };
    const refused = await household.owner.call(peopleApi.remove, { params });
    expect(refused.status).toBe(409);
  });

  it('no log line holds a password, a token or an address', () => {
    const text = JSON.stringify(server.logs);
    expect(server.logs.length).toBeGreaterThan(20);
    for (const secret of [PASSWORD, 'another lantern', 'example.org', 'gablebook=']) expect(text).not.toContain(secret);
  });
});
