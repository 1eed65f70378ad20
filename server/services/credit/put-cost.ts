import type * as z from 'zod/mini';
import type { creditCostBody } from '#shared/api/credit.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { readCredit } from '../../db/facts/read-money.ts';
import { setCreditCost } from '../../db/facts/write-credit.ts';
import type { Actor, Deps } from '../../deps.ts';
import { writeHousehold } from '../write-household.ts';
import { creditPaperFault } from './credit-paper-fault.ts';

/** Gives a cost its own day of completion, which can make it a vintage of its own, and its paper. */
export function putCost(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  id: string,
  body: z.infer<typeof creditCostBody>,
): Result<null> {
  const cost = readCredit(deps.db, actor.householdId)?.costs.find((one) => one.id === id);
  if (cost === undefined) return fail('not-found', 'This cost is not in the list.');
  const faults = creditPaperFault(deps, actor.householdId, body.documentId);
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return writeHousehold(deps, actor, { action: 'credit-cost-saved', about: cost.label }, (tx) =>
    setCreditCost(tx, actor.householdId, id, body) ? succeed(null) : fail('not-found', 'This cost is not in the list.'),
  );
}
