import type { Response } from 'express';
import type { Problem, ProblemCode } from '#shared/problem.ts';

/** The status each code is sent with. */
export const STATUS: Record<ProblemCode, number> = {
  'bad-request': 400,
  'invalid-fields': 400,
  'not-signed-in': 401,
  'wrong-sign-in': 401,
  'too-many-tries': 429,
  forbidden: 403,
  'not-found': 404,
  conflict: 409,
  'email-taken': 409,
  'password-too-short': 400,
  'password-too-common': 400,
  'cross-site': 403,
  'file-missing': 400,
  'file-empty': 422,
  'file-too-large': 413,
  'file-wrong-kind': 415,
  'file-unreadable': 422,
  'file-already-here': 409,
  'nothing-to-post': 409,
  'cycle-already-posted': 409,
  'cycle-overlaps': 409,
  'readings-conflict': 409,
  'plan-invalid': 422,
  'quota-reached': 409,
  'server-error': 500,
};

export function sendProblem(res: Response, problem: Problem): void {
  res.status(STATUS[problem.code]).json(problem);
}
