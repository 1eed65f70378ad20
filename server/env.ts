import path from 'node:path';
import * as z from 'zod/mini';
import { fail, type Result, succeed } from '#shared/problem.ts';

export type Env = {
  port: number;
  host: string;
  dataDir: string;
  sample: 'auto' | 'always' | 'never';
  /** The public address, first the one to print. */
  origins: string[];
  signUp: 'open' | 'closed';
  log: 'all' | 'quiet';
  trustedProxies: number;
};

const LOOPBACK = new Set(['127.0.0.1', '::1', 'localhost']);

export function isLoopback(host: string): boolean {
  return LOOPBACK.has(host);
}

/** A variable's words and what it must be; an empty variable counts as not set. */
const VARIABLES = {
  PORT: {
    schema: z.string().check(z.refine((text) => /^\d{1,5}$/.test(text) && Number(text) <= 65_535)),
    rule: 'a port number from 0 to 65535',
  },
  HOST: { schema: z.string().check(z.regex(/^[\w.:-]+$/)), rule: 'an address to listen on, such as 127.0.0.1' },
  DATA_DIR: { schema: z.string(), rule: 'a folder' },
  SAMPLE: { schema: z.enum(['auto', 'always', 'never']), rule: 'auto, always or never' },
  ORIGIN: {
    schema: z.string().check(z.refine((text) => originsIn(text) !== null)),
    rule: 'the public address without a path, such as https://book.example.org; several are parted by commas',
  },
  SIGN_UP: { schema: z.enum(['open', 'closed']), rule: 'open or closed' },
  LOG: { schema: z.enum(['all', 'quiet']), rule: 'all or quiet' },
  TRUST_PROXY: { schema: z.string().check(z.regex(/^\d$/)), rule: 'the number of proxies in front, 0 to 9' },
} as const;

function originsIn(text: string): string[] | null {
  const found = text.split(',').map((part) => part.trim().replace(/\/$/, ''));
  const exact = found.every((part) => {
    if (!/^https?:\/\//.test(part)) return false;
    try {
      return new URL(part).origin === part;
    } catch {
      return false;
    }
  });
  return exact ? found : null;
}

/**
 * The configuration; everything has a default. Sign-up is open while the server listens on loopback, where only people at this machine
 * come by, and closed elsewhere until it is opened. A refusal names the variable and what it must be.
 */
export function parseEnv(given: Record<string, string | undefined>, root: string): Result<Env> {
  const read = (name: keyof typeof VARIABLES): string | null => {
    const text = given[name]?.trim() ?? '';
    return text === '' ? null : text;
  };
  for (const [name, { schema, rule }] of Object.entries(VARIABLES)) {
    const text = read(name as keyof typeof VARIABLES);
    if (text !== null && !schema.safeParse(text).success)
      return fail('bad-request', `${name} is "${text}"; it must be ${rule}.`);
  }
  const port = Number(read('PORT') ?? '4470');
  const host = read('HOST') ?? '127.0.0.1';
  const origin = read('ORIGIN');
  const sample = VARIABLES.SAMPLE.schema.parse(read('SAMPLE') ?? 'auto');
  const signUp = VARIABLES.SIGN_UP.schema.parse(read('SIGN_UP') ?? (isLoopback(host) ? 'open' : 'closed'));
  const log = VARIABLES.LOG.schema.parse(read('LOG') ?? 'all');
  return succeed({
    port,
    host,
    dataDir: path.resolve(root, read('DATA_DIR') ?? 'data'),
    sample,
    origins: (origin === null ? null : originsIn(origin)) ?? [`http://127.0.0.1:${port}`, `http://localhost:${port}`],
    signUp,
    log,
    trustedProxies: Number(read('TRUST_PROXY') ?? '0'),
  });
}
