import type { NextFunction, Request, Response } from 'express';
import { problem } from '#shared/problem.ts';
import type { Log } from '../log.ts';
import { sendProblem } from './problems.ts';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Lets an unsafe request through only from our own pages: `Sec-Fetch-Site: same-origin`, or, where a browser does not send that, an
 * `Origin` that is exactly ours (OWASP, Cross-Site Request Forgery Prevention Cheat Sheet, fetch metadata). Neither: refused.
 */
export function sameOriginOnly(origins: readonly string[], log: Log) {
  return (req: Request, res: Response, next: NextFunction): void => {
    res.vary('Sec-Fetch-Site');
    res.vary('Origin');
    if (SAFE.has(req.method)) {
      next();
      return;
    }
    const site = req.get('sec-fetch-site');
    const origin = req.get('origin');
    const ours = site === undefined ? origin !== undefined && origins.includes(origin) : site === 'same-origin';
    if (ours) {
      next();
      return;
    }
    log('warn', 'cross-site-refused', { method: req.method, path: req.path, site: site ?? '-', origin: origin ?? '-' });
    sendProblem(
      res,
      problem(
        'cross-site',
        'This request did not come from a Gablebook page. If the address is right, set ORIGIN to it.',
      ),
    );
  };
}
