import type * as z from 'zod/mini';
import type { loanBalanceBody, loanContractBody, refinanceBody } from '#shared/api/money-loan.ts';
import { type LoanFacts, type LoanMore, loanMore } from '#shared/facts/finance.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { dollarsText } from '#shared/units/cents.ts';
import { readLoan } from '../../db/facts/read-money.ts';
import { writeLoanMore } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { newId } from '../../ids.ts';
import { fieldFault } from '../field-fault.ts';
import { ledgerOf } from '../ledger-of.ts';
import { writeHousehold } from '../write-household.ts';
import { unknownPaper } from './known-paper.ts';

type MoneyDeps = Pick<Deps, 'db' | 'clock'>;

/** A statement a month for forty years; more is a slip, and a bound on what one account can make the schedule work out. */
const MOST_BALANCES = 480;
const MOST_REFINANCES = 10;

/** Sets the rest of the loan's contract: how days are counted, a promotion, an assumed prepayment, the fee of a payoff, how it is secured. */
export function putLoanContract(deps: MoneyDeps, actor: Actor, body: z.infer<typeof loanContractBody>): Result<null> {
  return change(deps, actor, { action: 'loan-contract-set', about: body.dayCount }, (loan) => {
    const faults = contractFaults(loan, body);
    return faults.length > 0 ? fail('invalid-fields', null, faults) : succeed(body);
  });
}

function contractFaults(loan: LoanFacts, body: z.infer<typeof loanContractBody>): Fault[] {
  const faults: Fault[] = [];
  const { promotion, assumedPrepayment } = body;
  if (promotion !== null && promotion.months >= loan.termMonths) {
    faults.push(fieldFault('promotion.months', 'The promotion must be shorter than the loan.'));
  }
  if (promotion !== null && (Number(promotion.annualRate) < 0 || Number(promotion.annualRate) > 1)) {
    faults.push(fieldFault('promotion.annualRate', 'Write a rate from 0 to 100 percent a year.'));
  }
  if (assumedPrepayment !== null && assumedPrepayment.amountCents >= loan.principalCents) {
    faults.push(fieldFault('assumedPrepayment.amountCents', 'The prepayment must be less than the principal.'));
  }
  if (assumedPrepayment !== null && assumedPrepayment.byPayment >= loan.termMonths) {
    faults.push(fieldFault('assumedPrepayment.byPayment', 'The prepayment must come before the last payment.'));
  }
  return faults;
}

/** Records what the lender's statement says is owed in principal; from its day on it stands in the schedule's place. */
export function addLoanBalance(deps: MoneyDeps, actor: Actor, body: z.infer<typeof loanBalanceBody>): Result<null> {
  const about = `${body.on} ${dollarsText(body.balanceCents)}`;
  const { today } = ledgerOf(deps, actor.householdId);
  return change(deps, actor, { action: 'loan-balance-added', about }, (loan) => {
    const faults = unknownPaper(deps, actor, body.documentId);
    if (body.on < loan.fundedOn) faults.push(fieldFault('on', 'A balance cannot come before the loan was funded.'));
    if (body.on > today) faults.push(fieldFault('on', 'This day is still to come.'));
    if (loan.balances.some(({ on }) => on === body.on)) {
      faults.push(fieldFault('on', 'A balance of this day is entered. Remove that one first.'));
    }
    if (faults.length > 0) return fail('invalid-fields', null, faults);
    if (loan.balances.length >= MOST_BALANCES) {
      return fail('quota-reached', `At most ${MOST_BALANCES} balances can be entered.`);
    }
    return succeed({ balances: [...loan.balances, { id: newId(), ...body }] });
  });
}

export function removeLoanBalance(deps: MoneyDeps, actor: Actor, id: string): Result<null> {
  return change(deps, actor, { action: 'loan-balance-removed', about: id }, ({ balances }) => {
    const left = balances.filter((balance) => balance.id !== id);
    return left.length === balances.length ? gone() : succeed({ balances: left });
  });
}

/** Records a new loan that paid the one before it off. */
export function addRefinance(deps: MoneyDeps, actor: Actor, body: z.infer<typeof refinanceBody>): Result<null> {
  const about = `${body.on} ${dollarsText(body.principalCents)}`;
  return change(deps, actor, { action: 'loan-refinanced', about }, (loan) => {
    const faults = [...unknownPaper(deps, actor, body.documentId), ...refinanceFaults(loan, body)];
    if (faults.length > 0) return fail('invalid-fields', null, faults);
    if (loan.refinances.length >= MOST_REFINANCES) {
      return fail('quota-reached', `At most ${MOST_REFINANCES} refinances can be entered.`);
    }
    const refinances = [...loan.refinances, { id: newId(), ...body }];
    return succeed({ refinances: refinances.sort((a, b) => (a.on < b.on ? -1 : 1)) });
  });
}

function refinanceFaults(loan: LoanFacts, body: z.infer<typeof refinanceBody>): Fault[] {
  const faults: Fault[] = [];
  if (body.on <= loan.fundedOn) faults.push(fieldFault('on', 'It must come after the loan was funded.'));
  if (loan.refinances.some(({ on }) => on === body.on)) {
    faults.push(fieldFault('on', 'A refinance of this day is entered. Remove that one first.'));
  }
  if (body.firstPaymentOn <= body.on) {
    faults.push(fieldFault('firstPaymentOn', 'The first payment must come after the refinance.'));
  }
  if (Number(body.annualRate) < 0 || Number(body.annualRate) > 1) {
    faults.push(fieldFault('annualRate', 'Write a rate from 0 to 100 percent a year.'));
  }
  return faults;
}

export function removeRefinance(deps: MoneyDeps, actor: Actor, id: string): Result<null> {
  return change(deps, actor, { action: 'refinance-removed', about: id }, ({ refinances }) => {
    const left = refinances.filter((refinance) => refinance.id !== id);
    return left.length === refinances.length ? gone() : succeed({ refinances: left });
  });
}

function change(
  deps: MoneyDeps,
  actor: Actor,
  event: { action: string; about: string },
  make: (loan: LoanFacts) => Result<Partial<LoanMore>>,
): Result<null> {
  return writeHousehold(deps, actor, event, (tx) => {
    const loan = readLoan(tx, actor.householdId);
    if (loan === null) return fail('conflict', 'Enter the loan first.');
    const made = make(loan);
    if (!made.ok) return made;
    writeLoanMore(tx, actor.householdId, { ...loanMore.parse(loan), ...made.value });
    return succeed(null);
  });
}

function gone(): Result<never> {
  return fail('not-found', 'This entry is not there any more.');
}
