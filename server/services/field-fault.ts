import type { Fault } from '#shared/problem.ts';

/** A fault of one form field. */
export function fieldFault(field: string, message: string): Fault {
  return { code: 'field', field, fileName: null, row: null, column: null, found: null, message };
}
