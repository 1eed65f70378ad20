import type { LenderBalance, MortgageFacts } from '../facts/finance.ts';
import { addCents, type Cents, cents, subtractCents, ZERO_CENTS } from '../units/cents.ts';
import { addDays, addMonths, type Day, dayOf, daysBetween, monthOf, yearOf } from '../units/day.ts';
import { exact } from '../units/rate.ts';
import { type AmortizedRow, amortize } from './amortize.ts';
import { interestRule } from './interest.ts';

/** A month as actually paid. A balance the lender states after its payment and before the next stands in the place of the computed one from then on. */
export type MortgageRow = AmortizedRow & {
  stated: LenderBalance | null;
  /** The lender's balance less the one computed; zero where none is stated. */
  driftCents: Cents;
};

/** The mortgage by its initial schedule, and as actually paid: with the extra principal of each month and the balances the lender stated. */
export type MortgageBook = { paymentCents: Cents; initial: AmortizedRow[]; actual: MortgageRow[] };

const books = new WeakMap<MortgageFacts, MortgageBook>();

export function mortgageBook(mortgage: MortgageFacts): MortgageBook {
  const known = books.get(mortgage);
  if (known) return known;
  const terms = {
    principalCents: mortgage.principalCents,
    annualRate: mortgage.annualRate,
    months: mortgage.termMonths,
    events: [],
  };
  const initial = amortize(terms);
  const actual = actualRows(mortgage, initial.paymentCents);
  const made = { paymentCents: initial.paymentCents, initial: initial.rows, actual };
  books.set(mortgage, made);
  return made;
}

function actualRows(mortgage: MortgageFacts, level: Cents): MortgageRow[] {
  const interest = interestRule(mortgage.annualRate);
  const stated = [...mortgage.balances].sort((a, b) => daysBetween(b.on, a.on));
  /** The last balance stated from one payment to the next. */
  const statedIn = (number: number) =>
    stated.findLast(
      ({ on }) => on >= mortgagePaymentDay(mortgage, number) && on < mortgagePaymentDay(mortgage, number + 1),
    ) ?? null;
  const rows: MortgageRow[] = [];
  let balance = openingCents(mortgage);
  for (let number = 1; number <= mortgage.termMonths && balance > 0; number += 1) {
    const interestCents = interest.month(balance);
    const toClear = addCents(balance, interestCents);
    const paymentCents = number === mortgage.termMonths || toClear < level ? toClear : level;
    const principalCents = subtractCents(paymentCents, interestCents);
    const regular = balance - principalCents;
    const extraPrincipalCents = cents(Math.min(mortgage.extraPrincipalMonthlyCents, regular));
    const computed = cents(regular - extraPrincipalCents);
    const one = statedIn(number);
    balance = one?.balanceCents ?? computed;
    rows.push({
      number,
      paymentCents,
      interestCents,
      principalCents,
      extraPrincipalCents,
      balanceCents: balance,
      stated: one,
      driftCents: subtractCents(balance, computed),
    });
  }
  return rows;
}

/** Day on which payment `number` is due; number 0 is the month before the first. */
export function mortgagePaymentDay(mortgage: MortgageFacts, number: number): Day {
  return addMonths(mortgage.firstPaymentOn, number - 1);
}

/** The most a balance may be to lie at or below a share of a value: whole cents, since a balance has no others. */
export function mostCents(valueCents: Cents, share: string): Cents {
  return cents(exact(share).times(valueCents).floor().toNumber());
}

/** The first payment after which the balance is at or below the share of the original value; 0 when it begins there. Every schedule comes to zero. */
export function paymentReaching(mortgage: MortgageFacts, rows: readonly AmortizedRow[], share: string): number {
  const most = mostCents(mortgage.originalValueCents, share);
  if (mortgage.principalCents <= most) return 0;
  return rows.findIndex((row) => row.balanceCents <= most) + 1;
}

/** The last payment due on or before a day; 0 when none is. */
export function lastPaymentBy(mortgage: MortgageFacts, on: Day): number {
  const months = (yearOf(on) - yearOf(mortgage.firstPaymentOn)) * 12 + monthOf(on) - monthOf(mortgage.firstPaymentOn);
  const number = mortgagePaymentDay(mortgage, months + 1) <= on ? months + 1 : months;
  return Math.max(0, Math.min(number, mortgage.termMonths));
}

/** The last balance the lender stated by a day and before the first payment was due; null where there is none. */
export function statedBeforeFirst(mortgage: MortgageFacts, by: Day): LenderBalance | null {
  return mortgage.balances
    .filter(({ on }) => on < mortgage.firstPaymentOn && on <= by)
    .reduce<LenderBalance | null>((last, one) => (last === null || one.on >= last.on ? one : last), null);
}

/** What is owed before the first payment: the principal, or what the lender states by then. */
function openingCents(mortgage: MortgageFacts): Cents {
  return statedBeforeFirst(mortgage, mortgage.firstPaymentOn)?.balanceCents ?? mortgage.principalCents;
}

/** Balance after payment `number` as actually paid. */
export function mortgageBalanceAfter(mortgage: MortgageFacts, number: number): Cents {
  if (number <= 0) return openingCents(mortgage);
  return mortgageBook(mortgage).actual[number - 1]?.balanceCents ?? ZERO_CENTS;
}

/**
 * The midpoint of the amortization period: half of the term after its start, which is a month before the first payment; and the payment due on or
 * just before it.
 */
export function amortizationMidpoint(mortgage: MortgageFacts): { on: Day; payment: number; firstOfNextMonth: Day } {
  const payment = Math.floor(mortgage.termMonths / 2);
  const due = mortgagePaymentDay(mortgage, payment);
  const on = mortgage.termMonths % 2 === 0 ? due : addDays(due, 15);
  return { on, payment, firstOfNextMonth: dayOf(yearOf(on), monthOf(on) + 1, 1) };
}
