import type * as z from 'zod/mini';
import type { loanPaymentBody } from '#shared/api/money.ts';
import type { OtherLoanBody } from '#shared/api/money-other.ts';
import { loanMore, type OtherLoan } from '#shared/facts/finance.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { dollarsText } from '#shared/units/cents.ts';
import { readOtherLoans } from '../../db/facts/read-money.ts';
import { replaceOtherLoans } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { newId } from '../../ids.ts';
import { fieldFault } from '../field-fault.ts';
import { writeHousehold } from '../write-household.ts';
import { unknownPaper } from './known-paper.ts';

type MoneyDeps = Pick<Deps, 'db' | 'clock'>;

/** More than one house was ever paid with; a bound on what one account can make the ledger work out. */
const MOST_LOANS = 10;

/** Adds a loan beside the solar loan: the roof's share of a mortgage or home-equity loan, or a second one. */
export function addOtherLoan(deps: MoneyDeps, actor: Actor, body: OtherLoanBody): Result<null> {
  const faults = loanFaults(deps, actor, body);
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  const { kind, ...terms } = body;
  const loan = { ...terms, ...loanMore.parse({ documentId: body.documentId }), payments: [] };
  return writeLoans(deps, actor, { action: 'other-loan-added', about: body.lender || body.kind }, (loans) =>
    loans.length >= MOST_LOANS
      ? fail('quota-reached', `At most ${MOST_LOANS} other loans can be entered.`)
      : succeed([...loans, { id: newId(), kind, loan }]),
  );
}

/** Changes the terms of another loan; its recorded payments stay. */
export function changeOtherLoan(deps: MoneyDeps, actor: Actor, id: string, body: OtherLoanBody): Result<null> {
  const faults = loanFaults(deps, actor, body);
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  const { kind, ...terms } = body;
  return changeOne(deps, actor, id, { action: 'other-loan-changed', about: body.lender || body.kind }, (other) =>
    succeed({ ...other, kind, loan: { ...other.loan, ...terms } }),
  );
}

export function removeOtherLoan(deps: MoneyDeps, actor: Actor, id: string): Result<null> {
  return writeLoans(deps, actor, { action: 'other-loan-removed', about: id }, (loans) => {
    const left = loans.filter((other) => other.id !== id);
    return left.length === loans.length ? gone() : succeed(left);
  });
}

/** Records a payment of another loan as it was made. */
export function addOtherPayment(
  deps: MoneyDeps,
  actor: Actor,
  id: string,
  body: z.infer<typeof loanPaymentBody>,
): Result<null> {
  const faults = unknownPaper(deps, actor, body.documentId);
  if (body.extraPrincipalCents > body.amountCents) {
    faults.push(
      fieldFault('extraPrincipalCents', 'The extra principal is a part of the payment and cannot be more than it.'),
    );
  }
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  const about = `${body.on} ${dollarsText(body.amountCents)}`;
  return changeOne(deps, actor, id, { action: 'other-payment-added', about }, (other) =>
    body.on < other.loan.fundedOn
      ? fail('invalid-fields', null, [fieldFault('on', 'A payment cannot come before the loan was funded.')])
      : succeed({ ...other, loan: { ...other.loan, payments: [...other.loan.payments, { id: newId(), ...body }] } }),
  );
}

export function removeOtherPayment(deps: MoneyDeps, actor: Actor, id: string, paymentId: string): Result<null> {
  return changeOne(deps, actor, id, { action: 'other-payment-removed', about: paymentId }, (other) => {
    const payments = other.loan.payments.filter((payment) => payment.id !== paymentId);
    if (payments.length === other.loan.payments.length) return gone();
    return succeed({ ...other, loan: { ...other.loan, payments } });
  });
}

type Event = { action: string; about: string };

function changeOne(
  deps: MoneyDeps,
  actor: Actor,
  id: string,
  event: Event,
  change: (other: OtherLoan) => Result<OtherLoan>,
): Result<null> {
  return writeLoans(deps, actor, event, (loans) => {
    const other = loans.find((one) => one.id === id);
    if (other === undefined) return gone();
    const changed = change(other);
    return changed.ok ? succeed(loans.map((one) => (one.id === id ? changed.value : one))) : changed;
  });
}

function writeLoans(
  deps: MoneyDeps,
  actor: Actor,
  event: Event,
  change: (loans: OtherLoan[]) => Result<OtherLoan[]>,
): Result<null> {
  return writeHousehold(deps, actor, event, (tx) => {
    const changed = change(readOtherLoans(tx, actor.householdId));
    if (!changed.ok) return changed;
    replaceOtherLoans(tx, actor.householdId, changed.value);
    return succeed(null);
  });
}

function gone(): Result<never> {
  return fail('not-found', 'This entry is not there any more.');
}

function loanFaults(deps: MoneyDeps, actor: Actor, body: OtherLoanBody): Fault[] {
  const faults = unknownPaper(deps, actor, body.documentId);
  if (body.firstPaymentOn < body.fundedOn) {
    faults.push(fieldFault('firstPaymentOn', 'The first payment cannot come before the funding.'));
  }
  if (body.dealerFeeCents > body.principalCents) {
    faults.push(fieldFault('dealerFeeCents', 'The dealer fee is inside the principal and cannot be more than it.'));
  }
  if (body.annualRate.startsWith('-') || Number(body.annualRate) > 1) {
    faults.push(fieldFault('annualRate', 'Write a rate from 0 to 100 percent a year.'));
  }
  return faults;
}
