import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createServer, type Server } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../..');
let folder: string;
let child: ChildProcess | null = null;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'gablebook-process-'));
});
afterEach(() => {
  child?.kill('SIGKILL');
  child = null;
  rmSync(folder, { recursive: true, force: true });
});

type Ended = { code: number | null; output: string };

/** Starts the server as a process; `said` waits for words in what it prints, `ended` for its end. */
function start(env: Record<string, string>) {
  const started = spawn(process.execPath, ['--import', 'tsx', path.join(root, 'server/main.ts')], {
    cwd: root,
    env: { ...process.env, PORT: '0', HOST: '', ORIGIN: '', SAMPLE: 'never', LOG: '', DATA_DIR: folder, ...env },
  });
  child = started;
  let output = '';
  let exited = false;
  const waiting: (() => void)[] = [];
  const tell = () => {
    for (const wake of waiting.splice(0)) wake();
  };
  for (const stream of [started.stdout, started.stderr]) {
    stream.on('data', (chunk: Buffer) => {
      output += chunk.toString();
      tell();
    });
  }
  const ended = new Promise<Ended>((resolve) => {
    started.once('close', (code) => {
      exited = true;
      tell();
      resolve({ code, output });
    });
  });
  const said = async (words: RegExp): Promise<string> => {
    for (;;) {
      const found = words.exec(output);
      if (found) return found[1] ?? found[0];
      if (exited) throw new Error(`the server ended with: ${output}`);
      await new Promise<void>((resolve) => waiting.push(resolve));
    }
  };
  return { process: started, said, ended };
}

// A start compiles the sources anew; on a busy machine that takes many seconds.
describe('the server as a process', { timeout: 120_000 }, () => {
  it('says where it is, answers, and stops in order when it is told to', async () => {
    const server = start({});
    const url = await server.said(/Gablebook is at (http:\S+)/);
    expect(await (await fetch(`${url}/readyz`)).text()).toBe('ready');
    expect(await (await fetch(`${url}/api/session`)).json()).toBeNull();
    const at = Date.now();
    server.process.kill('SIGTERM');
    const { code, output } = await server.ended;
    expect(code).toBe(0);
    expect(Date.now() - at).toBeLessThan(10_000);
    expect(output).not.toMatch(/sample|Error/);
  });

  it('keeps what was written when it is killed', async () => {
    const first = start({});
    const url = await first.said(/Gablebook is at (http:\S+)/);
    const answer = await fetch(`${url}/api/users`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', 'sec-fetch-site': 'same-origin' },
      body: JSON.stringify({ name: 'Priya', email: 'priya@example.org', password: 'a lantern over the harbor wall' }),
    });
    expect(answer.status).toBe(200);
    const [cookie = ''] = answer.headers.getSetCookie();
    first.process.kill('SIGKILL');
    await first.ended;
    const second = start({});
    const again = await second.said(/Gablebook is at (http:\S+)/);
    const session = await fetch(`${again}/api/session`, { headers: { cookie: cookie.split(';')[0] ?? '' } });
    expect(await session.json()).toMatchObject({ user: { email: 'priya@example.org' } });
  });

  it('lays no sample for the world: only on loopback, or when it is told to', async () => {
    const server = start({ HOST: '0.0.0.0', SAMPLE: 'auto' });
    await server.said(/Gablebook is at/);
    server.process.kill('SIGTERM');
    expect((await server.ended).output).not.toMatch(/sample/);
  });

  it('a taken port is named, with the way out', async () => {
    const taken: Server = createServer();
    await new Promise<void>((resolve) => taken.listen(0, '127.0.0.1', resolve));
    const address = taken.address();
    const port = typeof address === 'object' && address !== null ? address.port : 0;
    const { code, output } = await start({ PORT: String(port) }).ended;
    taken.close();
    expect(code).toBe(1);
    expect(output).toContain(
      `Port ${port} on 127.0.0.1 is taken. Stop what listens there, or set PORT to another number.`,
    );
    expect(output).not.toMatch(/ at .*\.ts/);
  });

  it('a wrong setting is named', async () => {
    const { code, output } = await start({ SAMPLE: 'sometimes' }).ended;
    expect(code).toBe(1);
    expect(output.trim()).toBe('SAMPLE is "sometimes"; it must be auto, always or never.');
  });

  it('the database of something else is left alone', async () => {
    writeFileSync(path.join(folder, 'gablebook.db'), 'this is no database at all, just some words in a file');
    const { code, output } = await start({}).ended;
    expect(code).toBe(1);
    expect(output).toMatch(/^The database in .* cannot be opened: /);
    expect(output).not.toMatch(/ at .*\.ts/);
  });
});
