import { addCents, type Cents, cents, subtractCents, ZERO_CENTS } from '../units/cents.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { interestRule, levelPayment } from './interest.ts';

/** Principal paid right after a payment (0: before the first); `reamortize` sets a new level payment over the months that remain. */
export type PrincipalEvent = { afterPayment: number; principalCents: Cents; reamortize: boolean };

export type AmortizeTerms = {
  principalCents: Cents;
  annualRate: DecimalText;
  months: number;
  events: readonly PrincipalEvent[];
  /** Principal paid with every payment beyond it; zero for none. */
  extraMonthlyCents?: Cents;
};

export type AmortizedRow = {
  number: number;
  /** The regular payment, without extra principal. */
  paymentCents: Cents;
  interestCents: Cents;
  /** The part of the regular payment that is principal. */
  principalCents: Cents;
  extraPrincipalCents: Cents;
  balanceCents: Cents;
};

export type Amortization = {
  /** The level payment at the start. */
  paymentCents: Cents;
  /** The level payment in force after the last event. */
  paymentAfterEventsCents: Cents;
  rows: AmortizedRow[];
  totalInterestCents: Cents;
};

/**
 * A level-payment loan by whole months (30/360): payment and each month's interest rounded half-up to the cent, the last payment clears
 * the balance. Extra principal shortens the term unless its event re-amortizes.
 */
export function amortize(terms: AmortizeTerms): Amortization {
  const interest = interestRule(terms.annualRate);
  const first = levelPayment(terms.principalCents, terms.annualRate, terms.months);
  const rows: AmortizedRow[] = [];
  let level = first;
  let balance = terms.principalCents;
  let totalInterest = 0;

  function payPrincipal(number: number): Cents {
    const extra = number > 0 ? Math.min(terms.extraMonthlyCents ?? 0, balance) : 0;
    balance = cents(balance - extra);
    let paid = extra;
    for (const event of terms.events) {
      if (event.afterPayment !== number) continue;
      const principal = Math.min(event.principalCents, balance);
      balance = cents(balance - principal);
      paid += principal;
      const left = terms.months - number;
      if (event.reamortize && left > 0) level = levelPayment(balance, terms.annualRate, left);
    }
    return cents(paid);
  }

  payPrincipal(0);
  for (let number = 1; number <= terms.months && balance > 0; number += 1) {
    const interestCents = interest.month(balance);
    const toClear = addCents(balance, interestCents);
    const paymentCents = number === terms.months || toClear < level ? toClear : level;
    const principalCents = subtractCents(paymentCents, interestCents);
    balance = subtractCents(balance, principalCents);
    totalInterest += interestCents;
    const extraPrincipalCents = balance > 0 ? payPrincipal(number) : ZERO_CENTS;
    rows.push({ number, paymentCents, interestCents, principalCents, extraPrincipalCents, balanceCents: balance });
  }
  return {
    paymentCents: first,
    paymentAfterEventsCents: level,
    rows,
    totalInterestCents: cents(totalInterest),
  };
}
