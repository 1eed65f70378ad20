import { createHash } from 'node:crypto';
import type { Request, RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { Refused } from './refused.ts';

const QUARTER_HOUR_MS = 15 * 60_000;
/** Failed sign-ins for one e-mail from one address in a quarter of an hour. */
export const SIGN_IN_FAILURES = 10;
/** Failed sign-ins from one address whatever the e-mail. */
export const SIGN_IN_FAILURES_PER_ADDRESS = 60;
/** New users from one address in an hour. */
export const SIGN_UPS = 10;

const address = (req: Request) => ipKeyGenerator(req.ip ?? '');

function emailOf(req: Request): string {
  const body: unknown = req.body;
  const email = typeof body === 'object' && body !== null && 'email' in body ? body.email : '';
  return createHash('sha256').update(String(email).trim().toLowerCase()).digest('hex').slice(0, 32);
}

function limiter(options: {
  windowMs: number;
  limit: number;
  key: (req: Request) => string;
  failuresOnly: boolean;
  words: string;
}): RequestHandler {
  return rateLimit({
    windowMs: options.windowMs,
    limit: options.limit,
    keyGenerator: options.key,
    skipSuccessfulRequests: options.failuresOnly,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    handler: (_req, _res, next) => next(new Refused('too-many-tries', options.words)),
  });
}

/** Counted in memory, per process: there is one. */
export function createLimits() {
  const wait = 'Too many tries. Wait a quarter of an hour and try again.';
  return {
    signIn: [
      limiter({
        windowMs: QUARTER_HOUR_MS,
        limit: SIGN_IN_FAILURES_PER_ADDRESS,
        key: address,
        failuresOnly: true,
        words: wait,
      }),
      limiter({
        windowMs: QUARTER_HOUR_MS,
        limit: SIGN_IN_FAILURES,
        key: (req) => `${address(req)} ${emailOf(req)}`,
        failuresOnly: true,
        words: wait,
      }),
    ],
    signUp: [
      limiter({
        windowMs: 4 * QUARTER_HOUR_MS,
        limit: SIGN_UPS,
        key: address,
        failuresOnly: false,
        words: 'Too many sign-ups from here. Wait an hour and try again.',
      }),
    ],
    password: [
      limiter({
        windowMs: QUARTER_HOUR_MS,
        limit: SIGN_IN_FAILURES,
        key: (req) => `${address(req)} ${req.get('cookie') ?? ''}`,
        failuresOnly: true,
        words: wait,
      }),
    ],
  };
}
export type Limits = ReturnType<typeof createLimits>;
