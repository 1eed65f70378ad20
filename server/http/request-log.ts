import type { RequestHandler } from 'express';
import type { Log } from '../log.ts';

/** One line per answer: no query, no body, no cookie. */
export function requestLog(log: Log): RequestHandler {
  return (req, res, next) => {
    const start = process.hrtime.bigint();
    const { method, path } = req;
    res.once('finish', () => {
      const ms = Number((process.hrtime.bigint() - start) / 1_000_000n);
      log('info', 'answered', {
        id: String(res.locals.requestId ?? ''),
        method,
        path,
        status: res.statusCode,
        ms,
        user: String(res.locals.userId ?? '-'),
      });
    });
    next();
  };
}
