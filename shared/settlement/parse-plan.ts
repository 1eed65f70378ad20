import type * as z from 'zod/mini';
import { type Fault, fail, type Result, succeed } from '../problem.ts';
import { type RatePlan, ratePlanSchema } from './plan.ts';
import { planFaults } from './plan-faults.ts';

/**
 * Reads a rate plan: its shape, defaults filled in, and then what no plan may say (`planFaults`). Fails with `plan-invalid` and one fault for each
 * thing wrong, in words.
 */
export function parsePlan(input: unknown): Result<RatePlan> {
  const read = ratePlanSchema.safeParse(input);
  if (!read.success) {
    const faults = read.error.issues.map((issue) =>
      planFault(issue.path, `${placeOf(issue.path, input)}: ${sayIssue(issue)}`),
    );
    return refusedFor(faults);
  }
  const faults = planFaults(read.data).map(({ path, message }) => planFault(path, message));
  return faults.length > 0 ? refusedFor(faults) : succeed(read.data);
}

/** Refused for several things wrong, in the words of the first. */
function refusedFor(faults: Fault[]): Result<RatePlan> {
  const said = faults.map(({ message }) => message);
  return fail('plan-invalid', said.slice(0, 1).join(' '), faults);
}

function planFault(path: readonly PropertyKey[], message: string): Fault {
  return {
    code: 'plan',
    field: path.map(String).join('.'),
    fileName: null,
    row: null,
    column: null,
    found: null,
    message,
  };
}

/** Where in the plan, as its author wrote it: `charges energy, rates 2, rate`. */
function placeOf(path: readonly PropertyKey[], input: unknown): string {
  const words: string[] = [];
  let at: unknown = input;
  for (const step of path) {
    at = Reflect.get(Object(at), step);
    const id: unknown = Reflect.get(Object(at), 'id');
    words.push(typeof step === 'number' ? (typeof id === 'string' ? id : String(step + 1)) : String(step));
  }
  return words.length === 0 ? 'The plan' : words.join(' ');
}

function sayIssue(issue: z.core.$ZodIssue): string {
  switch (issue.code) {
    case 'invalid_type':
      return `this should be ${issue.expected === 'int' ? 'a whole number' : `a ${issue.expected}`}.`;
    case 'invalid_value':
      return `this should be one of ${issue.values.map(String).join(', ')}.`;
    case 'invalid_union':
      return 'this is none of the forms it may have.';
    case 'too_small':
      return `this should be at least ${issue.minimum}.`;
    case 'too_big':
      return `this should be at most ${issue.maximum}.`;
    default:
      return issue.message && issue.message !== 'Invalid input'
        ? issue.message
        : 'this is not written as it should be.';
  }
}
