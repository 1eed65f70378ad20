import type { FieldValues, Path, UseFormSetError } from 'react-hook-form';
import type { ProblemCode } from '#shared/problem.ts';
import { ApiError } from './api.ts';
import { errorWords } from './problem-words.ts';

/**
 * Puts the server's refusal on a form: each fault that names a field goes to that field, the rest is returned as sentences for the head of
 * the form. `known` says whether the form has a field of that name; `fieldOf` says which field a refusal as a whole speaks of, and in which words
 * where not in its own.
 */
export function showRefusal<T extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<T>,
  known: (field: string) => boolean,
  fieldOf: Partial<Record<ProblemCode, { field: Path<T>; words?: string }>> = {},
): string[] {
  if (!(error instanceof ApiError)) return [errorWords(error)];
  const meant = fieldOf[error.problem.code];
  if (meant) {
    setError(meant.field, { type: 'server', message: meant.words ?? errorWords(error) }, { shouldFocus: true });
    return [];
  }
  const left: string[] = [];
  for (const fault of error.problem.faults) {
    if (fault.field !== null && known(fault.field)) {
      setError(fault.field as Path<T>, { type: 'server', message: fault.message }, { shouldFocus: left.length === 0 });
    } else {
      left.push(fault.message);
    }
  }
  if (error.problem.faults.length === 0 || left.length === 0) left.unshift(errorWords(error));
  return left;
}

/** The field meant when an account cannot be made as asked. */
export const ACCOUNT_FIELDS = {
  'email-taken': { field: 'email' },
  'password-too-short': { field: 'password' },
  'password-too-common': { field: 'password' },
} as const;
