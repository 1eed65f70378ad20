import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { SIGN_IN_FAILURES, SIGN_UPS } from '#server/http/limits.ts';
import { sessionApi } from '#shared/api/session.ts';
import { failOnConsole, PASSWORD, startTestServer, type TestServer } from '#tests/support/test-server.ts';

failOnConsole();

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

const tryIn = (email: string, password: string, headers: Record<string, string> = {}) =>
  server.client().call(sessionApi.signIn, { body: { email, password }, headers });

describe('guessing', () => {
  it('an unknown address and a wrong password get the same answer, word for word', async () => {
    await server.signedIn('Known');
    const wrong = await tryIn('known@example.org', 'not the right password');
    const unknown = await tryIn('nobody@example.org', 'not the right password');
    expect(wrong.status).toBe(401);
    expect(unknown.status).toBe(401);
    expect(unknown.text).toBe(wrong.text);
  });

  it('an unknown address takes as long as a wrong password', async () => {
    const quick = await startTestServer();
    await quick.signedIn('Timed');
    const time = async (email: string) => {
      const start = performance.now();
      await quick.client().call(sessionApi.signIn, { body: { email, password: 'not the right password' } });
      return performance.now() - start;
    };
    const median = (values: number[]) => values.sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? 0;
    await time('warm@example.org');
    const known: number[] = [];
    const unknown: number[] = [];
    for (let round = 0; round < 7; round += 1) {
      known.push(await time('timed@example.org'));
      unknown.push(await time(`nobody${round}@example.org`));
    }
    // Without the dummy hash the ratio is about ten; this machine is too noisy to ask for a few percent.
    expect(median(known) / median(unknown)).toBeLessThan(2);
    expect(median(unknown) / median(known)).toBeLessThan(2);
    await quick.close();
  });

  it('too many failures for one address shut it for a while, and nobody else', async () => {
    await server.signedIn('Target');
    await server.signedIn('Neighbour');
    for (let count = 0; count < SIGN_IN_FAILURES; count += 1) {
      expect((await tryIn('target@example.org', `guess number ${count}`)).status).toBe(401);
    }
    const shut = await tryIn('target@example.org', PASSWORD);
    expect(shut.status).toBe(429);
    expect(shut.problem.code).toBe('too-many-tries');
    expect((await tryIn('neighbour@example.org', PASSWORD)).status).toBe(200);
    // Another spelling is the same address.
    expect((await tryIn(' TARGET@example.org', PASSWORD)).status).toBe(429);
  });

  it('a forged X-Forwarded-For does not open it', async () => {
    const forged = await tryIn('target@example.org', PASSWORD, { 'x-forwarded-for': '203.0.113.7' });
    expect(forged.status).toBe(429);
  });

  it('right passwords are not counted', async () => {
    const fresh = await startTestServer();
    await fresh.signedIn('Regular');
    for (let count = 0; count < SIGN_IN_FAILURES + 2; count += 1) {
      const answer = await fresh
        .client()
        .call(sessionApi.signIn, { body: { email: 'regular@example.org', password: PASSWORD } });
      expect(answer.status).toBe(200);
    }
    await fresh.close();
  });

  it('sign-ups from one address are counted', async () => {
    const fresh = await startTestServer();
    for (let count = 0; count < SIGN_UPS; count += 1) {
      const body = { name: 'N', email: `n${count}@example.org`, password: 'passwordpassword' };
      expect((await fresh.client().call(sessionApi.signUp, { body })).status).toBe(400);
    }
    const body = { name: 'N', email: 'last@example.org', password: PASSWORD };
    expect((await fresh.client().call(sessionApi.signUp, { body })).status).toBe(429);
    await fresh.close();
  });

  it('an installation can be closed to sign-ups', async () => {
    const closed = await startTestServer({ signUp: 'closed' });
    const body = { name: 'N', email: 'n@example.org', password: PASSWORD };
    const refused = await closed.client().call(sessionApi.signUp, { body });
    expect(refused.status).toBe(403);
    await closed.close();
  });
});
