import { fail, type Result } from '../problem.ts';

/** A plan or a cycle's inputs that cannot be settled. Thrown inside the settlement only; `settleCycle` hands it back as a value. */
export class SettlementRefused extends Error {}

export function refuse(why: string): never {
  throw new SettlementRefused(why);
}

/** Runs a settlement and turns a refusal into a problem of code `plan-invalid`; anything else is a bug and goes on up. */
export function orRefusal<T>(work: () => T): Result<T> {
  try {
    return { ok: true, value: work() };
  } catch (error) {
    if (error instanceof SettlementRefused) return fail('plan-invalid', error.message);
    throw error;
  }
}
