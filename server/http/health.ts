import { Router } from 'express';
import type { Deps } from '../deps.ts';

/** `/livez` says that the process answers; `/readyz` that it can work, until it is told to stop. Neither says which version runs. */
export function healthRoutes({ sqlite, log }: Pick<Deps, 'sqlite' | 'log'>): { router: Router; stopping(): void } {
  let isStopping = false;
  const router = Router();
  router.get('/livez', (_req, res) => {
    res.type('text/plain').set('Cache-Control', 'no-store').send('alive');
  });
  router.get('/readyz', (_req, res) => {
    res.type('text/plain').set('Cache-Control', 'no-store');
    if (isStopping) {
      res.status(503).send('stopping');
      return;
    }
    try {
      sqlite.prepare('SELECT count(*) FROM users').get();
      res.send('ready');
    } catch (error) {
      log('error', 'not-ready', { error: error instanceof Error ? error.message : 'unknown' });
      res.status(503).send('not ready');
    }
  });
  return {
    router,
    stopping() {
      isStopping = true;
    },
  };
}
