import * as z from 'zod/mini';
import type { Schema } from '#shared/api/endpoint.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';

// The small build of zod has no sentences of its own until it is given a language.
z.config(z.locales.en());

function faultOf(path: readonly PropertyKey[], code: string, message: string): Fault {
  return {
    code,
    field: path.length === 0 ? null : path.map(String).join('.'),
    fileName: null,
    row: null,
    column: null,
    found: null,
    message,
  };
}

/** Parses what a client sent; a fault per field, by its path, in the schema's own sentence. */
export function parseBody<T>(schema: Schema<T>, body: unknown): Result<T> {
  if (body === undefined) return fail('bad-request', 'Send a JSON body.');
  const parsed = schema.safeParse(body);
  if (parsed.success) return succeed(parsed.data);
  const faults = parsed.error.issues.flatMap((issue): Fault[] => {
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => faultOf([...issue.path, key], issue.code, 'This field is not known here.'));
    }
    return [faultOf(issue.path, issue.code, issue.message)];
  });
  return fail('invalid-fields', faults[0]?.message ?? null, faults);
}
