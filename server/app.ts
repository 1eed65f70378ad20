import { randomUUID } from 'node:crypto';
import compression from 'compression';
import express, { type Express } from 'express';
import { problem } from '#shared/problem.ts';
import { createSessions, type Sessions } from './auth/sessions.ts';
import type { Deps } from './deps.ts';
import { createApi, type Route } from './http/api.ts';
import { clientFiles } from './http/client-files.ts';
import { errorHandler } from './http/errors.ts';
import { healthRoutes } from './http/health.ts';
import { createLimits } from './http/limits.ts';
import { sendProblem } from './http/problems.ts';
import { requestLog } from './http/request-log.ts';
import { sameOriginOnly } from './http/same-origin.ts';
import { securityHeaders } from './http/security-headers.ts';
import { creditRoutes } from './routes/credit-routes.ts';
import { cyclesRoutes } from './routes/cycles-routes.ts';
import { logRoutes } from './routes/log-routes.ts';
import { moneyLoanRoutes } from './routes/money-loan-routes.ts';
import { moneyMortgageRoutes } from './routes/money-mortgage-routes.ts';
import { moneyOtherRoutes } from './routes/money-other-routes.ts';
import { moneyRoutes } from './routes/money-routes.ts';
import { peopleRoutes } from './routes/people-routes.ts';
import { planRoutes } from './routes/plan-routes.ts';
import { positionRoutes } from './routes/position-routes.ts';
import { sessionRoutes } from './routes/session-routes.ts';
import { setupRoutes } from './routes/setup-routes.ts';
import { tryRoutes } from './routes/try-routes.ts';

export type App = { express: Express; sessions: Sessions; mounted: readonly Route[]; stopping(): void };

/** The whole application over what it is given; it listens to nothing by itself. */
export function createApp(deps: Deps): App {
  const app = express();
  app.disable('x-powered-by');
  app.set('etag', false);
  app.set('trust proxy', deps.settings.trustedProxies === 0 ? false : deps.settings.trustedProxies);
  app.set('query parser', 'simple');

  const sessions = createSessions(deps);
  const limits = createLimits();
  const health = healthRoutes(deps);

  app.use((_req, res, next) => {
    res.locals.requestId = randomUUID();
    res.set('X-Request-Id', String(res.locals.requestId));
    next();
  });
  app.use(securityHeaders());
  app.use(health.router);
  app.use(requestLog(deps.log));
  app.use(compression());

  app.use('/api', (_req, res, next) => {
    res.set('Cache-Control', 'no-store');
    next();
  });
  app.use('/api', sameOriginOnly(deps.settings.origins, deps.log));

  const api = createApi(deps, sessions);
  sessionRoutes(api, deps, sessions, limits);
  setupRoutes(api, deps);
  planRoutes(api, deps);
  cyclesRoutes(api, deps);
  positionRoutes(api, deps);
  logRoutes(api, deps);
  moneyRoutes(api, deps);
  moneyLoanRoutes(api, deps);
  moneyMortgageRoutes(api, deps);
  moneyOtherRoutes(api, deps);
  creditRoutes(api, deps);
  tryRoutes(api, deps);
  peopleRoutes(api, deps, sessions, limits);
  app.use(api.router);

  app.use('/api', (_req, res) => sendProblem(res, problem('not-found')));
  if (deps.settings.distDir !== null) app.use(clientFiles(deps.settings.distDir));
  app.use((_req, res) => {
    res.status(404).type('text/plain').send('Not found');
  });
  app.use(errorHandler(deps.log));
  return { express: app, sessions, mounted: api.mounted, stopping: health.stopping };
}
