import { and, eq } from 'drizzle-orm';
import type { CreditCost } from '#shared/facts/finance.ts';
import type { Reader } from '../client.ts';
import { creditCosts } from '../schema/money.ts';
import { documents } from '../schema/papers.ts';

/** Sets a cost's own day of completion and its paper; true where there is such a cost. */
export function setCreditCost(
  db: Reader,
  householdId: string,
  id: string,
  values: Pick<CreditCost, 'placedInServiceOn' | 'documentId'>,
): boolean {
  const one = and(eq(creditCosts.householdId, householdId), eq(creditCosts.id, id));
  return db.update(creditCosts).set(values).where(one).run().changes > 0;
}

/** Renames a kept paper of the credit; true where there is one of that id. */
export function renameCreditPaper(db: Reader, householdId: string, id: string, fileName: string): boolean {
  const one = and(
    eq(documents.householdId, householdId),
    eq(documents.id, id),
    eq(documents.kind, 'credit'),
    eq(documents.state, 'kept'),
  );
  return db.update(documents).set({ fileName }).where(one).run().changes > 0;
}
