import type * as z from 'zod/mini';

export type Role = 'owner' | 'member' | 'preparer';

/** Who may call: anybody, anybody signed in, or the household's people with one of these roles. */
export type Access = 'anyone' | 'signedIn' | readonly Role[];

export const OWNER: readonly Role[] = ['owner'];
export const HOUSEHOLD: readonly Role[] = ['owner', 'member'];
export const ALL_ROLES: readonly Role[] = ['owner', 'member', 'preparer'];

export type Schema<T> = z.ZodMiniType<T>;

/**
 * One endpoint, used by the server to guard and parse and by the client to call and parse. `body` and `response` are null where there is
 * none; `kind` says what travels: JSON, a multipart upload (field `file`, other fields as text), or a download.
 */
export type Endpoint<Body, Response> = {
  method: 'GET' | 'POST' | 'PUT' | 'DELETE';
  /** Express path, `/api/households/:householdId/…`. */
  path: string;
  access: Access;
  kind: 'json' | 'upload' | 'download';
  body: Schema<Body> | null;
  response: Schema<Response> | null;
};

export function endpoint<Body = undefined, Response = undefined>(
  definition: Omit<Endpoint<Body, Response>, 'kind' | 'body' | 'response'> & {
    kind?: Endpoint<Body, Response>['kind'];
    body?: Schema<Body>;
    response?: Schema<Response>;
  },
): Endpoint<Body, Response> {
  return {
    method: definition.method,
    path: definition.path,
    access: definition.access,
    kind: definition.kind ?? 'json',
    body: definition.body ?? null,
    response: definition.response ?? null,
  };
}

export type BodyOf<E> = E extends Endpoint<infer B, unknown> ? B : never;
export type ResponseOf<E> = E extends Endpoint<never, infer R> | Endpoint<infer _B, infer R> ? R : never;
