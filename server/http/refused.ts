import { type Problem, type ProblemCode, problem } from '#shared/problem.ts';

/** Carries an expected refusal out of the middle of a request to where it is sent. */
export class Refused extends Error {
  readonly problem: Problem;
  constructor(code: ProblemCode, detail: string | null = null, faults: Problem['faults'] = []) {
    super(code);
    this.problem = problem(code, detail, faults);
  }
}
