import type * as z from 'zod/mini';
import type { carriedInBody } from '#shared/api/credit.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { dollarsText } from '#shared/units/cents.ts';
import { readCredit } from '../../db/facts/read-money.ts';
import { writeCreditCarriedIn } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';
import { writeHousehold } from '../write-household.ts';

/** Line 16 of a return before this record: it comes before every return in the list. */
export function putCarriedIn(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  { carriedIn }: z.infer<typeof carriedInBody>,
): Result<null> {
  const credit = readCredit(deps.db, actor.householdId);
  if (credit === null) return fail('conflict', 'Enter what the roof cost first, in the set-up.');
  if (carriedIn !== null) {
    const fault = yearFault(
      carriedIn.taxYear,
      credit.years.map((year) => year.taxYear),
    );
    if (fault !== null) return fail('invalid-fields', null, [fieldFault('carriedIn.taxYear', fault)]);
  }
  const about = carriedIn === null ? 'none' : `${carriedIn.taxYear} ${dollarsText(carriedIn.amountCents)}`;
  return writeHousehold(deps, actor, { action: 'credit-carried-in-saved', about }, (tx) => {
    writeCreditCarriedIn(tx, actor.householdId, carriedIn);
    return succeed(null);
  });
}

function yearFault(taxYear: number, listed: readonly number[]): string | null {
  if (taxYear < 2006 || taxYear > 2100) return 'Write a year such as 2023.';
  const first = Math.min(...listed);
  if (taxYear < first) return null;
  return `It comes from a return before the first in the list, ${first}.`;
}
