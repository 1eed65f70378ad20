import type * as z from 'zod/mini';
import type { creditYearBody } from '#shared/api/credit.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { yearOf } from '#shared/units/day.ts';
import { readCredit } from '../../db/facts/read-money.ts';
import { deleteCreditYear, putCreditYear } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';
import { writeHousehold } from '../write-household.ts';
import { creditPaperFault } from './credit-paper-fault.ts';

type CreditDeps = Pick<Deps, 'db' | 'clock'>;

function taxYearOf(text: string): number | null {
  const year = /^\d{4}$/.test(text) ? Number(text) : 0;
  return year >= 2006 && year <= 2100 ? year : null;
}

function yearFaults(taxYear: number, body: z.infer<typeof creditYearBody>): Fault[] {
  const faults: Fault[] = [];
  if (body.status !== 'planned' && body.filedOn === null) {
    faults.push(fieldFault('filedOn', 'Write the day the return was filed.'));
  }
  if (body.filedOn !== null && yearOf(body.filedOn) <= taxYear) {
    faults.push(fieldFault('filedOn', `A return for ${taxYear} is filed after the year has ended.`));
  }
  if (body.refundOn !== null && (body.filedOn === null || body.refundOn < body.filedOn)) {
    faults.push(fieldFault('refundOn', 'The refund comes after the return was filed.'));
  }
  if (body.status !== 'planned' && body.limitCents === null) {
    faults.push(fieldFault('limitCents', 'A filed return has a line 14; write it here.'));
  }
  return faults;
}

/** Adds a tax year to the credit's way, or changes it; the limit is always what somebody typed, and who typed it is kept. */
export function putYear(
  deps: CreditDeps,
  actor: Actor,
  year: string,
  body: z.infer<typeof creditYearBody>,
): Result<null> {
  const taxYear = taxYearOf(year);
  if (taxYear === null) return fail('not-found', 'There is no such tax year.');
  const credit = readCredit(deps.db, actor.householdId);
  if (credit === null) return fail('conflict', 'Enter what the roof cost first, in the set-up.');
  if (credit.carriedIn !== null && taxYear <= credit.carriedIn.taxYear) {
    return fail('conflict', `What was carried in from ${credit.carriedIn.taxYear} holds the years before it already.`);
  }
  const faults = [...yearFaults(taxYear, body), ...creditPaperFault(deps, actor.householdId, body.documentId)];
  if (faults.length > 0) return fail('invalid-fields', faults[0]?.message ?? null, faults);
  const before = credit.years.find((known) => known.taxYear === taxYear);
  const typedBy =
    body.limitCents === null ? null : before?.limitCents === body.limitCents ? before.typedBy : actor.name;
  return writeHousehold(deps, actor, { action: 'credit-year-saved', about: String(taxYear) }, (tx) => {
    putCreditYear(tx, actor.householdId, { taxYear, ...body, typedBy });
    return succeed(null);
  });
}

export function removeYear(deps: CreditDeps, actor: Actor, year: string): Result<null> {
  const taxYear = taxYearOf(year);
  return writeHousehold(deps, actor, { action: 'credit-year-removed', about: year }, (tx) =>
    taxYear !== null && deleteCreditYear(tx, actor.householdId, taxYear)
      ? succeed(null)
      : fail('not-found', 'This year is not in the list.'),
  );
}
