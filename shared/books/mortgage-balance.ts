import type { MortgageFacts } from '../facts/finance.ts';
import { type Cents, ZERO_CENTS } from '../units/cents.ts';
import { addDays, addMonths, type Day, dayOf, monthOf, yearOf } from '../units/day.ts';
import { exact } from '../units/rate.ts';
import { type AmortizedRow, amortize } from './amortize.ts';

/** The mortgage by its initial schedule and as actually paid (with the extra principal of each month). */
export type MortgageBook = { paymentCents: Cents; initial: AmortizedRow[]; actual: AmortizedRow[] };

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
  const actual =
    mortgage.extraPrincipalMonthlyCents > 0
      ? amortize({ ...terms, extraMonthlyCents: mortgage.extraPrincipalMonthlyCents }).rows
      : initial.rows;
  const made = { paymentCents: initial.paymentCents, initial: initial.rows, actual };
  books.set(mortgage, made);
  return made;
}

/** Day on which payment `number` is due; number 0 is the month before the first. */
export function mortgagePaymentDay(mortgage: MortgageFacts, number: number): Day {
  return addMonths(mortgage.firstPaymentOn, number - 1);
}

/** The most a balance may be to lie at or below a share of the original value: whole cents, since a balance has no others. */
function mostCents(mortgage: MortgageFacts, share: string): number {
  return exact(share).times(mortgage.originalValueCents).floor().toNumber();
}

/** The first payment after which the balance is at or below the share; 0 when it begins there, null when it never is. */
export function paymentReaching(mortgage: MortgageFacts, rows: readonly AmortizedRow[], share: string): number | null {
  const most = mostCents(mortgage, share);
  if (mortgage.principalCents <= most) return 0;
  return rows.find((row) => row.balanceCents <= most)?.number ?? null;
}

/** The last payment due on or before a day; 0 when none is. */
export function lastPaymentBy(mortgage: MortgageFacts, on: Day): number {
  const months = (yearOf(on) - yearOf(mortgage.firstPaymentOn)) * 12 + monthOf(on) - monthOf(mortgage.firstPaymentOn);
  const number = mortgagePaymentDay(mortgage, months + 1) <= on ? months + 1 : months;
  return Math.max(0, Math.min(number, mortgage.termMonths));
}

/** Balance after payment `number` as actually paid. */
export function mortgageBalanceAfter(mortgage: MortgageFacts, number: number): Cents {
  if (number <= 0) return mortgage.principalCents;
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
