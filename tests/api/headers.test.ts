import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { failOnConsole, startTestServer, type TestServer } from '#tests/support/test-server.ts';

failOnConsole();

let server: TestServer;
let folder: string;
beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'gablebook-dist-'));
  mkdirSync(path.join(folder, 'assets'));
  mkdirSync(path.join(folder, '.vite'));
  writeFileSync(path.join(folder, 'index.html'), '<!doctype html><title>Gablebook</title>');
  writeFileSync(path.join(folder, 'assets', 'main-abc123.js'), 'export {};');
  writeFileSync(path.join(folder, '.vite', 'manifest.json'), '{}');
  server = await startTestServer({ distDir: folder });
});
afterAll(async () => {
  await server.close();
  rmSync(folder, { recursive: true, force: true });
});

const SECURITY = [
  'content-security-policy',
  'cross-origin-opener-policy',
  'cross-origin-resource-policy',
  'referrer-policy',
  'strict-transport-security',
  'x-content-type-options',
  'x-frame-options',
];
const headersOf = async (at: string, init: RequestInit = {}) => {
  const answer = await server.client().raw(at, init);
  await answer.arrayBuffer();
  return {
    status: answer.status,
    get: (name: string) => answer.headers.get(name),
    security: SECURITY.map((name) => `${name}: ${answer.headers.get(name)}`),
  };
};

describe('headers', () => {
  it('are the same strict ones on pages, data, refusals and faults', async () => {
    const page = await headersOf('/');
    expect(page.security).toEqual([
      "content-security-policy: default-src 'none';script-src 'self';style-src 'self';font-src 'self';img-src 'self';connect-src 'self';form-action 'self';frame-ancestors 'none';base-uri 'none';object-src 'none'",
      'cross-origin-opener-policy: same-origin',
      'cross-origin-resource-policy: same-origin',
      'referrer-policy: same-origin',
      'strict-transport-security: max-age=31536000',
      'x-content-type-options: nosniff',
      'x-frame-options: DENY',
    ]);
    const json = { 'content-type': 'application/json', 'sec-fetch-site': 'same-origin' };
    const others = [
      await headersOf('/api/session'),
      await headersOf('/api/unknown'),
      await headersOf('/missing.js'),
      await headersOf('/api/session', { method: 'POST' }),
      await headersOf('/api/session', { method: 'POST', headers: json, body: '{broken' }),
    ];
    expect(others.map(({ status }) => status)).toEqual([200, 404, 404, 403, 400]);
    for (const other of others) expect(other.security).toEqual(page.security);
  });

  it('tell nobody what the server is built with', async () => {
    const { get } = await headersOf('/api/session');
    expect(get('x-powered-by')).toBeNull();
    expect(get('server')).toBeNull();
  });

  it('let nothing of the API be stored, assets be stored for ever, and the page be asked for each time', async () => {
    expect((await headersOf('/api/session')).get('cache-control')).toBe('no-store');
    expect((await headersOf('/api/unknown')).get('cache-control')).toBe('no-store');
    expect((await headersOf('/assets/main-abc123.js')).get('cache-control')).toBe(
      'public, max-age=31536000, immutable',
    );
    expect((await headersOf('/h/some-household/cycles')).get('cache-control')).toBe('no-cache');
  });

  it('carry an id to find the request by', async () => {
    const { get } = await headersOf('/api/session');
    const id = get('x-request-id');
    expect(id).toMatch(/^[0-9a-f-]{36}$/);
    expect(server.logs.some((line) => line.about.id === id)).toBe(true);
  });
});

describe('the pages', () => {
  it.each(['/', '/sign-in', '/h/abc/cycles/2026-09-14', '/anything/else'])('%s is the application', async (at) => {
    const answer = await server.client().raw(at);
    expect(answer.status).toBe(200);
    expect(await answer.text()).toContain('<title>Gablebook</title>');
  });

  it.each([
    '/.git/config',
    '/.vite/manifest.json',
    '/package.json',
    '/assets/gone-000.js',
    '/..%2f..%2fetc/passwd',
    '/gablebook.db',
  ])('%s is not there', async (at) => {
    const answer = await server.client().raw(at);
    expect(answer.status).toBe(404);
    expect(await answer.text()).not.toMatch(/root:|\{\}/);
  });

  it('says that it lives and is ready, and stops being ready when it is told to stop', async () => {
    const own = await startTestServer();
    expect((await own.client().raw('/livez')).status).toBe(200);
    expect(await (await own.client().raw('/readyz')).text()).toBe('ready');
    own.app.stopping();
    expect((await own.client().raw('/readyz')).status).toBe(503);
    expect((await own.client().raw('/livez')).status).toBe(200);
    await own.close();
  });
});

describe('requests that are no good', () => {
  const post = (body: string, type = 'application/json') =>
    server.client().raw('/api/session', {
      method: 'POST',
      headers: { 'content-type': type, 'sec-fetch-site': 'same-origin' },
      body,
    });

  it.each([
    ['JSON that breaks off', '{"email":', 'application/json'],
    ['no JSON at all', 'email=a&password=b', 'application/x-www-form-urlencoded'],
    ['a body far too large', JSON.stringify({ email: 'x'.repeat(600_000), password: '' }), 'application/json'],
    ['a list where an object belongs', '[1]', 'application/json'],
  ])('%s is answered with a problem and no word of the inside', async (_what, body, type) => {
    const answer = await post(body, type);
    const text = await answer.text();
    expect(answer.status).toBe(400);
    expect(JSON.parse(text)).toMatchObject({ code: expect.stringMatching(/bad-request|invalid-fields/) });
    expect(text).not.toMatch(/node_modules|SyntaxError|at .*\.js/);
  });
});
