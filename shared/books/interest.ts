import { type Cents, cents } from '../units/cents.ts';
import { type Day, dayOfMonth, daysInMonth, monthOf, yearOf } from '../units/day.ts';
import { Exact, exact, roundToCents, usdOf } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';

/**
 * Level monthly payment `P = L·i / (1 − (1 + i)^−n)`, `i` = annual rate / 12, rounded half-up to the cent; at a zero rate `L / n`.
 * Source: the annuity formula as numpy-financial documents `pmt`.
 */
export function levelPayment(principalCents: Cents, annualRate: DecimalText, months: number): Cents {
  return levelPaymentAssuming(principalCents, annualRate, months, null);
}

/** Principal that a contract takes for granted to be paid with one of its payments. */
export type AssumedPrincipal = { amountCents: Cents; withPayment: number };

/**
 * The level payment that clears a loan over `months` if `assumed.amountCents` of principal is paid with payment `withPayment`: the annuity of what the
 * loan is worth less the discounted prepayment, `(L − A·(1 + i)^−k)·i / (1 − (1 + i)^−n)`, rounded half-up. Never below zero.
 */
export function levelPaymentAssuming(
  principalCents: Cents,
  annualRate: DecimalText,
  months: number,
  assumed: AssumedPrincipal | null,
): Cents {
  const monthly = exact(annualRate).div(12);
  const growth = monthly.plus(1);
  const prepaid = assumed ? usdOf(assumed.amountCents).times(growth.pow(-assumed.withPayment)) : 0;
  const owed = Exact.max(0, usdOf(principalCents).minus(prepaid));
  if (monthly.isZero()) return roundToCents(owed.div(months));
  return roundToCents(owed.times(monthly).div(new Exact(1).minus(growth.pow(-months))));
}

/** Interest on a balance, rounded half-up to the cent. Exact integers, since a schedule asks hundreds of times. */
export type InterestRule = {
  /** One month: balance × rate / 12. */
  month(balance: Cents): Cents;
  /** Days of a year that is counted as 360 or 365 days: balance × rate × days / year. */
  days(balance: Cents, days: number, yearDays?: 360 | 365): Cents;
};

export function interestRule(annualRate: DecimalText): InterestRule {
  const digits = annualRate.replace('-', '');
  const point = digits.indexOf('.');
  const size = BigInt(digits.replace('.', ''));
  const numerator = annualRate.startsWith('-') ? -size : size;
  const denominator = point === -1 ? 1n : 10n ** BigInt(digits.length - point - 1);
  const of = (balance: Cents, parts: bigint, partsOfYear: bigint) =>
    cents(Number(roundedQuotient(BigInt(balance) * numerator * parts, denominator * partsOfYear)));
  return {
    month: (balance) => of(balance, 1n, 12n),
    days: (balance, days, yearDays = 360) => of(balance, BigInt(days), BigInt(yearDays)),
  };
}

/** Half away from zero. */
function roundedQuotient(numerator: bigint, denominator: bigint): bigint {
  const size = numerator < 0n ? -numerator : numerator;
  const rounded = (2n * size + denominator) / (2n * denominator);
  return numerator < 0n ? -rounded : rounded;
}

/**
 * Days from one date to another by 30/360 (US): every month counts 30 days, a month's last day is its thirtieth.
 * Common practice, no source.
 */
export function days360(from: Day, to: Day): number {
  const first = isMonthEnd(from) ? 30 : dayOfMonth(from);
  const second = isMonthEnd(to) && first === 30 ? 30 : Math.min(dayOfMonth(to), 30);
  return (yearOf(to) - yearOf(from)) * 360 + (monthOf(to) - monthOf(from)) * 30 + second - first;
}

function isMonthEnd(date: Day): boolean {
  return dayOfMonth(date) === daysInMonth(yearOf(date), monthOf(date));
}
