import type { Problem, ProblemCode } from '#shared/problem.ts';
import { ApiError } from './api.ts';

const WORDS: Record<ProblemCode, string> = {
  'bad-request': 'The server could not read that. Reload the page and try again.',
  'invalid-fields': 'Some fields need another look.',
  'not-signed-in': 'You are signed out. Sign in again; nothing you posted is lost.',
  'wrong-sign-in': 'That e-mail and password do not go together.',
  'too-many-tries': 'Too many tries. Wait a few minutes, then try again.',
  forbidden: 'Your role in this household does not allow that. The owner can do it.',
  'not-found': 'There is nothing here. It may have been removed.',
  conflict: 'That cannot be done as things stand.',
  'email-taken': 'Somebody with this e-mail has an account already. Use another address.',
  'password-too-short': 'Use 15 characters or more; a short sentence is easy to keep.',
  'password-too-common': 'This password is on the list of common ones. Choose another sentence.',
  'cross-site': 'The request did not come from this page. Reload and try again.',
  'file-missing': 'No file arrived. Choose a file and try again.',
  'file-empty': 'The file is empty. Save it again from where it came from.',
  'file-too-large': 'The file is larger than 20 MB. Split it by year and send the parts.',
  'file-wrong-kind': 'This is not a CSV file. Open it and save it as CSV.',
  'file-unreadable': 'The file could not be read.',
  'file-already-here': 'This file is here already. Nothing was changed.',
  'nothing-to-post': 'There is nothing to post yet.',
  'cycle-already-posted': 'This cycle is posted already.',
  'cycle-overlaps': 'These dates overlap a cycle that is posted already.',
  'readings-conflict': 'Some days are here already with other values.',
  'plan-invalid': 'The rate plan does not hold together.',
  'quota-reached': 'The household has as many files as it may keep. Remove some first.',
  'server-error': 'Something went wrong on the server. Nothing was changed; try again.',
};

/** What happened and what to do, in one or two sentences. */
export function problemWords(problem: Problem): string {
  if (problem.detail === 'no-connection') return 'No connection to Gablebook. What you typed is still here; try again.';
  return problem.detail && problem.detail !== '' ? problem.detail : WORDS[problem.code];
}

export function errorWords(error: unknown): string {
  return error instanceof ApiError
    ? problemWords(error.problem)
    : 'Something went wrong. Reload the page and try again.';
}
