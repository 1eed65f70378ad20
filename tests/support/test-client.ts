import type { Endpoint } from '#shared/api/endpoint.ts';
import { type Problem, problemSchema } from '#shared/problem.ts';

export type Called<R> = {
  status: number;
  headers: Headers;
  /** The parsed response; throws when the answer was a problem. */
  value: R;
  /** The problem; throws when the answer was none. */
  problem: Problem;
  text: string;
};

export type CallOptions<B> = {
  params?: Record<string, string>;
  body?: B;
  file?: { fileName: string; bytes: Uint8Array | string };
  fields?: Record<string, string>;
  headers?: Record<string, string>;
};

export type TestClient = {
  cookie: string | null;
  call<B, R>(endpoint: Endpoint<B, R>, options?: CallOptions<B>): Promise<Called<R>>;
  /** A request as it is, for what no endpoint would send. */
  raw(path: string, init?: RequestInit): Promise<Response>;
};

export function pathOf(endpoint: { path: string }, params: Record<string, string> = {}): string {
  return endpoint.path.replaceAll(/:(\w+)/g, (_match, name: string) => encodeURIComponent(params[name] ?? 'x'));
}

/** A browser's worth of a client: it keeps its cookie and speaks by endpoint. */
export function makeClient(url: string): TestClient {
  const client: TestClient = {
    cookie: null,
    async raw(at, init = {}) {
      const headers = new Headers(init.headers);
      if (client.cookie !== null && !headers.has('cookie')) headers.set('cookie', client.cookie);
      const response = await fetch(`${url}${at}`, { ...init, headers, redirect: 'manual' });
      for (const set of response.headers.getSetCookie()) {
        const [pair] = set.split(';');
        client.cookie = pair === undefined || pair.endsWith('=') ? null : pair;
      }
      return response;
    },
    async call(endpoint, options = {}) {
      const headers: Record<string, string> = { 'sec-fetch-site': 'same-origin', ...options.headers };
      let body: FormData | string | null = null;
      if (endpoint.kind === 'upload') {
        const form = new FormData();
        for (const [name, value] of Object.entries(options.fields ?? {})) form.append(name, value);
        if (options.file) {
          const { bytes } = options.file;
          const content = typeof bytes === 'string' ? bytes : new Uint8Array(bytes);
          form.append('file', new Blob([content]), options.file.fileName);
        }
        body = form;
      } else if (options.body !== undefined) {
        headers['content-type'] = 'application/json';
        body = JSON.stringify(options.body);
      }
      const response = await client.raw(pathOf(endpoint, options.params), { method: endpoint.method, headers, body });
      const text = await response.text();
      const json = (): unknown => JSON.parse(text);
      return {
        status: response.status,
        headers: response.headers,
        text,
        get value() {
          if (!response.ok) throw new Error(`${endpoint.method} ${endpoint.path}: ${response.status} ${text}`);
          // A response without a schema has `undefined` for its type.
          return endpoint.response === null ? (undefined as never) : endpoint.response.parse(json());
        },
        get problem() {
          if (response.ok) throw new Error(`${endpoint.method} ${endpoint.path} went well: ${text.slice(0, 200)}`);
          return problemSchema.parse(json());
        },
      };
    },
  };
  return client;
}
