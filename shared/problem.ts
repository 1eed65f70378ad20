import * as z from 'zod/mini';

/**
 * What the server says when it will not do something. Codes are stable; sentences are for people and belong to the client, which may use
 * `detail` where a code alone cannot say it (which row, which column). Status codes are in `server/http/problems.ts`.
 */
export const problemCode = z.enum([
  'bad-request',
  'invalid-fields',
  'not-signed-in',
  'wrong-sign-in',
  'too-many-tries',
  'forbidden',
  'not-found',
  'conflict',
  'email-taken',
  'password-too-short',
  'password-too-common',
  'cross-site',
  'file-missing',
  'file-empty',
  'file-too-large',
  'file-wrong-kind',
  'file-unreadable',
  'file-already-here',
  'nothing-to-post',
  'cycle-already-posted',
  'cycle-overlaps',
  'readings-conflict',
  'plan-invalid',
  'quota-reached',
  'server-error',
]);
export type ProblemCode = z.infer<typeof problemCode>;

/** One fault in a form or a file: where, and what to do. `row` counts from 1 as a spreadsheet shows it. */
export const faultSchema = z.object({
  code: z.string(),
  /** Form field path (`loan.principalCents`) or the file's column name. */
  field: z.nullable(z.string()),
  fileName: z.nullable(z.string()),
  row: z.nullable(z.int()),
  column: z.nullable(z.string()),
  /** The text as found, shortened. */
  found: z.nullable(z.string()),
  /** One sentence: what is wrong and what to do. */
  message: z.string(),
});
export type Fault = z.infer<typeof faultSchema>;

export const problemSchema = z.object({
  code: problemCode,
  detail: z.nullable(z.string()),
  faults: z.array(faultSchema),
});
export type Problem = z.infer<typeof problemSchema>;

/** The result of an operation whose failure is expected: a value, never a throw. */
export type Result<T> = { ok: true; value: T } | { ok: false; problem: Problem };

export function problem(code: ProblemCode, detail: string | null = null, faults: Fault[] = []): Problem {
  return { code, detail, faults };
}

export function succeed<T>(value: T): { ok: true; value: T } {
  return { ok: true, value };
}

export function fail(
  code: ProblemCode,
  detail: string | null = null,
  faults: Fault[] = [],
): { ok: false; problem: Problem } {
  return { ok: false, problem: problem(code, detail, faults) };
}

export function unreachable(value: never): never {
  throw new Error(`a case was not handled: ${JSON.stringify(value)}`);
}
