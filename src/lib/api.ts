import type { Endpoint } from '#shared/api/endpoint.ts';
import { type Problem, problemSchema } from '#shared/problem.ts';

/** A refusal by the server, or no answer at all (`status` 0). */
export class ApiError extends Error {
  readonly status: number;
  readonly problem: Problem;
  constructor(status: number, problem: Problem) {
    super(problem.detail ?? problem.code);
    this.name = 'ApiError';
    this.status = status;
    this.problem = problem;
  }
}

type Params = Record<string, string>;
type Call<B> = { params?: Params; signal?: AbortSignal | undefined; body?: B; file?: File; fields?: Params };

/** The address of an endpoint with its parameters filled in; also used for plain download links. */
export function addressOf(endpoint: { path: string }, params: Params = {}): string {
  return endpoint.path.replace(/:([A-Za-z]+)/g, (_, name: string) => {
    const value = params[name];
    if (value === undefined) throw new Error(`the address ${endpoint.path} needs ${name}`);
    return encodeURIComponent(value);
  });
}

/** Calls an endpoint and parses its response by the schema both sides share. Throws `ApiError` on a refusal. */
export async function call<B, R>(endpoint: Endpoint<B, R>, given: Call<B> = {}): Promise<R> {
  const request: RequestInit = {
    method: endpoint.method,
    headers: { Accept: 'application/json' },
    credentials: 'same-origin',
  };
  if (given.signal) request.signal = given.signal;
  if (endpoint.kind === 'upload') {
    const form = new FormData();
    for (const [name, value] of Object.entries(given.fields ?? {})) form.append(name, value);
    if (given.file) form.append('file', given.file, given.file.name);
    request.body = form;
  } else if (given.body !== undefined) {
    request.headers = { ...request.headers, 'Content-Type': 'application/json' };
    request.body = JSON.stringify(given.body);
  }
  let answer: Response;
  try {
    answer = await fetch(addressOf(endpoint, given.params), request);
  } catch (failure) {
    if (failure instanceof DOMException && failure.name === 'AbortError') throw failure;
    throw new ApiError(0, { code: 'server-error', detail: 'no-connection', faults: [] });
  }
  const text = await answer.text();
  const value: unknown = text === '' ? undefined : readJson(text);
  if (!answer.ok) {
    const stated = problemSchema.safeParse(value);
    throw new ApiError(
      answer.status,
      stated.success ? stated.data : { code: 'server-error', detail: null, faults: [] },
    );
  }
  return endpoint.response ? endpoint.response.parse(value) : (undefined as R);
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
