import type * as z from 'zod/mini';
import type { loanPaymentBody, receiptBody } from '#shared/api/money.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { dollarsText } from '#shared/units/cents.ts';
import type { Tx } from '../db/client.ts';
import { readIncentive, readLoan } from '../db/facts/read-money.ts';
import { deleteLoanPayment, deleteReceipt, insertLoanPayment, insertReceipt } from '../db/facts/write-money.ts';
import type { Actor, Deps } from '../deps.ts';
import { newId } from '../ids.ts';
import { fieldFault } from './field-fault.ts';
import { unknownPaper } from './money/known-paper.ts';
import { writeHousehold } from './write-household.ts';

type MoneyDeps = Pick<Deps, 'db' | 'clock'>;

/** Records a payment of the loan as it was made. */
export function addLoanPayment(deps: MoneyDeps, actor: Actor, body: z.infer<typeof loanPaymentBody>): Result<null> {
  const loan = readLoan(deps.db, actor.householdId);
  if (loan === null) return fail('conflict', 'Enter the loan first.');
  if (body.on < loan.fundedOn) {
    return fail('invalid-fields', null, [fieldFault('on', 'A payment cannot come before the loan was funded.')]);
  }
  if (body.extraPrincipalCents > body.amountCents) {
    return fail('invalid-fields', null, [
      fieldFault('extraPrincipalCents', 'The extra principal is a part of the payment and cannot be more than it.'),
    ]);
  }
  const unknown = unknownPaper(deps, actor, body.documentId);
  if (unknown.length > 0) return fail('invalid-fields', null, unknown);
  const about = `${body.on} ${dollarsText(body.amountCents)}`;
  return writeHousehold(deps, actor, { action: 'loan-payment-added', about }, (tx) => {
    insertLoanPayment(tx, actor.householdId, { id: newId(), ...body });
    return succeed(null);
  });
}

/** Records money received from the incentive's payer. */
export function addReceipt(deps: MoneyDeps, actor: Actor, body: z.infer<typeof receiptBody>): Result<null> {
  if (readIncentive(deps.db, actor.householdId) === null) return fail('conflict', 'Enter the incentive first.');
  if (body.from !== null && body.to === null) {
    return fail('invalid-fields', null, [fieldFault('to', 'Write the last day it covers as well, or neither.')]);
  }
  if (body.from === null && body.to !== null) {
    return fail('invalid-fields', null, [fieldFault('from', 'Write the first day it covers as well, or neither.')]);
  }
  if (body.from !== null && body.to !== null && body.to <= body.from) {
    return fail('invalid-fields', null, [fieldFault('to', 'The last day it covers cannot come before the first.')]);
  }
  const unknown = unknownPaper(deps, actor, body.documentId);
  if (unknown.length > 0) return fail('invalid-fields', null, unknown);
  const about = `${body.on} ${dollarsText(body.amountCents)}`;
  return writeHousehold(deps, actor, { action: 'receipt-added', about }, (tx) => {
    insertReceipt(tx, actor.householdId, { id: newId(), ...body });
    return succeed(null);
  });
}

function remove(deps: MoneyDeps, actor: Actor, action: string, id: string, work: (tx: Tx) => boolean): Result<null> {
  return writeHousehold(deps, actor, { action, about: id }, (tx) =>
    work(tx) ? succeed(null) : fail('not-found', 'This entry is not there any more.'),
  );
}

export function removeLoanPayment(deps: MoneyDeps, actor: Actor, id: string): Result<null> {
  return remove(deps, actor, 'loan-payment-removed', id, (tx) => deleteLoanPayment(tx, actor.householdId, id));
}

export function removeReceipt(deps: MoneyDeps, actor: Actor, id: string): Result<null> {
  return remove(deps, actor, 'receipt-removed', id, (tx) => deleteReceipt(tx, actor.householdId, id));
}
