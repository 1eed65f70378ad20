import express, { type Request, type RequestHandler, type Response, Router } from 'express';
import type { Endpoint, Role, Schema } from '#shared/api/endpoint.ts';
import type { Result } from '#shared/problem.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import type { Sessions, SignedIn } from '../auth/sessions.ts';
import type { Actor, Deps } from '../deps.ts';
import { type Download, sendDownload } from './download.ts';
import { createGuards } from './guards.ts';
import { parseBody } from './parse-body.ts';
import { sendProblem } from './problems.ts';
import { Refused } from './refused.ts';
import { receiveUpload, type UploadedFile, uploadedFile } from './upload.ts';

const JSON_LIMIT = '512kb';

export type Call<Body> = {
  body: Body;
  /** A part of the path; empty when the path has none of that name. */
  param(name: string): string;
  /** A part of the path as a day; null when it is no date. */
  dayParam(name: string): Day | null;
  cookie: string | null;
  setCookie(value: string): void;
};
export type HouseholdCall<Body> = Call<Body> & { actor: Actor };
export type UploadCall = HouseholdCall<undefined> & { file: UploadedFile; field(name: string): string };

type Answer<T> = Result<T> | Promise<Result<T>>;
type Send<T> = (res: Response, value: T) => void;
/** What every endpoint has, whatever it carries. */
export type Route = Pick<Endpoint<unknown, unknown>, 'method' | 'path' | 'access'>;

/** Routes by their endpoint: guard, parse, call, send. An endpoint's own words decide who may call and what is read. */
export type Api = {
  router: Router;
  /** Every endpoint that has a route. */
  mounted: Route[];
  anyone<B, R>(
    endpoint: Endpoint<B, R>,
    call: (call: Call<B> & { session: SignedIn | null }) => Answer<R>,
    before?: RequestHandler[],
  ): void;
  anyoneDownload(endpoint: Endpoint<undefined, undefined>, call: (call: Call<undefined>) => Answer<Download>): void;
  signedIn<B, R>(
    endpoint: Endpoint<B, R>,
    call: (call: Call<B> & { session: SignedIn }) => Answer<R>,
    before?: RequestHandler[],
  ): void;
  household<B, R>(endpoint: Endpoint<B, R>, call: (call: HouseholdCall<B>) => Answer<R>): void;
  upload<R>(endpoint: Endpoint<undefined, R>, call: (call: UploadCall) => Answer<R>): void;
  download(endpoint: Endpoint<undefined, undefined>, call: (call: HouseholdCall<undefined>) => Answer<Download>): void;
};

function pass<T>(result: Result<T>): T {
  if (!result.ok) throw new Refused(result.problem.code, result.problem.detail, result.problem.faults);
  return result.value;
}

const readJson = express.json({ limit: JSON_LIMIT, strict: true });

function run(middleware: RequestHandler, req: Request, res: Response): Promise<void> {
  return new Promise((resolve, reject) => {
    middleware(req, res, (error?: unknown) => (error === undefined ? resolve() : reject(error)));
  });
}

export function createApi(deps: Deps, sessions: Sessions): Api {
  const router = Router();
  const mounted: Route[] = [];

  const callOf = <B>(req: Request, res: Response, body: B): Call<B> => {
    const param = (name: string) => {
      const value = req.params[name];
      return typeof value === 'string' ? value : '';
    };
    return {
      body,
      param,
      dayParam: (name) => parseDay(param(name)),
      cookie: req.get('cookie') ?? null,
      setCookie: (value) => res.append('Set-Cookie', value),
    };
  };

  const { sessionOf, signedInOf, actorOf } = createGuards(deps, sessions);

  const bodyOf = async <B>(endpoint: { body: Schema<B> | null }, req: Request, res: Response): Promise<B> => {
    // An endpoint without a body schema has `undefined` for its body type.
    if (endpoint.body === null) return undefined as B;
    if (req.body === undefined) await run(readJson, req, res);
    return pass(parseBody(endpoint.body, req.body));
  };

  const jsonSender =
    <R>(endpoint: { response: Schema<R> | null }): Send<R> =>
    (res, value) => {
      if (endpoint.response === null) {
        res.status(204).end();
        return;
      }
      if (deps.settings.checkResponses) endpoint.response.parse(value);
      res.json(value);
    };

  const mount = <R>(
    endpoint: Route,
    send: Send<R>,
    work: (req: Request, res: Response) => Promise<Result<R>>,
  ): void => {
    mounted.push(endpoint);
    const handler: RequestHandler = async (req, res) => {
      try {
        send(res, pass(await work(req, res)));
      } catch (error) {
        if (!(error instanceof Refused)) throw error;
        sendProblem(res, error.problem);
      }
    };
    switch (endpoint.method) {
      case 'GET':
        router.get(endpoint.path, handler);
        break;
      case 'POST':
        router.post(endpoint.path, handler);
        break;
      case 'PUT':
        router.put(endpoint.path, handler);
        break;
      case 'DELETE':
        router.delete(endpoint.path, handler);
        break;
    }
  };

  const rolesOf = (endpoint: Route): readonly Role[] => {
    if (typeof endpoint.access === 'string') throw new Error(`${endpoint.path} is not a household's`);
    return endpoint.access;
  };
  const mustBe = (endpoint: Route, access: 'anyone' | 'signedIn'): void => {
    if (endpoint.access !== access) throw new Error(`${endpoint.path} is not for ${access}`);
  };
  const runAll = async (before: RequestHandler[], req: Request, res: Response): Promise<void> => {
    for (const middleware of before) await run(middleware, req, res);
  };

  return {
    router,
    mounted,
    anyone(endpoint, call, before = []) {
      mustBe(endpoint, 'anyone');
      mount(endpoint, jsonSender(endpoint), async (req, res) => {
        const body = await bodyOf(endpoint, req, res);
        await runAll(before, req, res);
        return call({ ...callOf(req, res, body), session: await sessionOf(req, res) });
      });
    },
    anyoneDownload(endpoint, call) {
      mustBe(endpoint, 'anyone');
      mount(endpoint, sendDownload, async (req, res) => call(callOf(req, res, undefined)));
    },
    signedIn(endpoint, call, before = []) {
      mustBe(endpoint, 'signedIn');
      mount(endpoint, jsonSender(endpoint), async (req, res) => {
        const session = await signedInOf(req, res);
        await runAll(before, req, res);
        return call({ ...callOf(req, res, await bodyOf(endpoint, req, res)), session });
      });
    },
    household(endpoint, call) {
      const roles = rolesOf(endpoint);
      mount(endpoint, jsonSender(endpoint), async (req, res) => {
        const actor = await actorOf(req, res, roles);
        return call({ ...callOf(req, res, await bodyOf(endpoint, req, res)), actor });
      });
    },
    upload(endpoint, call) {
      const roles = rolesOf(endpoint);
      mount(endpoint, jsonSender(endpoint), async (req, res) => {
        const actor = await actorOf(req, res, roles);
        await run(receiveUpload, req, res);
        const file = pass(uploadedFile(req.file));
        const fields: unknown = req.body;
        const field = (name: string) => {
          const value =
            typeof fields === 'object' && fields !== null
              ? Object.entries(fields).find(([key]) => key === name)?.[1]
              : '';
          return typeof value === 'string' ? value : '';
        };
        return call({ ...callOf(req, res, undefined), actor, file, field });
      });
    },
    download(endpoint, call) {
      const roles = rolesOf(endpoint);
      mount(endpoint, sendDownload, async (req, res) => {
        const actor = await actorOf(req, res, roles);
        return call({ ...callOf(req, res, undefined), actor });
      });
    },
  };
}
