import { type ChildProcess, spawn } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';

const CHROMIUM = process.env.CHROMIUM_PATH ?? '/usr/bin/chromium';
/** Where journeys leave pictures when asked to: set SHOTS_DIR. */
const SHOTS = process.env.SHOTS_DIR ?? null;

export const DESK = { width: 1280, height: 900 };
export const PHONE = { width: 390, height: 844 };

/** Words in the order they are printed: a sign-in of the sample. */
export type SampleSignIn = { role: 'owner' | 'member' | 'preparer'; email: string; password: string };

export type RunningServer = {
  address: string;
  signIns: SampleSignIn[];
  output: () => string;
  stop: () => Promise<void>;
};

function freePort(): Promise<number> {
  return new Promise((done, failed) => {
    const probe = createServer();
    probe.once('error', failed);
    probe.listen(0, '127.0.0.1', () => {
      const found = probe.address();
      probe.close(() => (found && typeof found === 'object' ? done(found.port) : failed(new Error('no port'))));
    });
  });
}

/** Starts the built product as `npm start` does, on a free port with a data folder of its own. */
export async function startProduct(sample: 'always' | 'never'): Promise<RunningServer> {
  const port = await freePort();
  const data = mkdtempSync(join(tmpdir(), 'gablebook-journey-'));
  const child: ChildProcess = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    env: {
      ...process.env,
      PORT: String(port),
      HOST: '127.0.0.1',
      DATA_DIR: data,
      SAMPLE: sample,
      NODE_ENV: 'production',
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  child.stdout?.on('data', (chunk: Buffer) => {
    output += chunk.toString('utf8');
  });
  child.stderr?.on('data', (chunk: Buffer) => {
    output += chunk.toString('utf8');
  });
  const address = `http://127.0.0.1:${port}`;
  await ready(address, child, () => output);
  return {
    address,
    signIns: readSignIns(output),
    output: () => output,
    stop: async () => {
      await new Promise<void>((done) => {
        if (child.exitCode !== null) return done();
        child.once('exit', () => done());
        child.kill('SIGTERM');
      });
      rmSync(data, { recursive: true, force: true });
    },
  };
}

async function ready(address: string, child: ChildProcess, output: () => string): Promise<void> {
  for (let tries = 0; tries < 300; tries += 1) {
    if (child.exitCode !== null) throw new Error(`the server stopped:\n${output()}`);
    const answer = await fetch(`${address}/readyz`).catch(() => null);
    if (answer?.ok) return;
    await new Promise((done) => setTimeout(done, 200));
  }
  throw new Error(`the server did not get ready:\n${output()}`);
}

/** The three sample sign-ins as the server prints them: role, e-mail, password on one line. */
function readSignIns(output: string): SampleSignIn[] {
  const lines = output.matchAll(/(owner|member|preparer)\S*\s+(\S+@\S+)\s+(\S.*\S)\s*$/gim);
  return [...lines].map((line) => ({
    role: (line[1] ?? 'owner').toLowerCase() as SampleSignIn['role'],
    email: line[2] ?? '',
    password: line[3] ?? '',
  }));
}

let shared: Browser | null = null;

async function browser(): Promise<Browser> {
  if (!existsSync(CHROMIUM))
    throw new Error(`the journeys need Chromium; ${CHROMIUM} is not there (set CHROMIUM_PATH)`);
  shared ??= await chromium.launch({
    executablePath: CHROMIUM,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
  return shared;
}

export async function closeBrowser(): Promise<void> {
  await shared?.close();
  shared = null;
}

export type Visit = { page: Page; context: BrowserContext; complaints: string[]; close: () => Promise<void> };

/** A new visitor with a browser of their own. Console errors, page errors and refused contents (CSP) are collected as complaints. */
export async function visit(address: string, size = DESK): Promise<Visit> {
  const context = await (await browser()).newContext({
    baseURL: address,
    viewport: size,
    reducedMotion: 'reduce',
    acceptDownloads: true,
    locale: 'en-US',
  });
  const page = await context.newPage();
  page.setDefaultTimeout(15_000);
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error' && !/the server responded with a status of 4\d\d/.test(message.text()))
      complaints.push(message.text());
  });
  page.on('pageerror', (error) => complaints.push(error.message));
  return { page, context, complaints, close: () => context.close() };
}

export async function signIn(page: Page, who: { email: string; password: string }): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(who.email);
  await page.getByLabel('Password', { exact: true }).fill(who.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL(/\/h\//);
}

/** Leaves a picture of the whole page when SHOTS_DIR is set. */
export async function shot(page: Page, name: string): Promise<void> {
  if (SHOTS === null) return;
  mkdirSync(SHOTS, { recursive: true });
  await page.screenshot({ path: join(SHOTS, `${name}.png`), fullPage: true });
}

/** Scrolling sideways is never needed: the page is no wider than its window. */
export async function widthOverflow(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
}
