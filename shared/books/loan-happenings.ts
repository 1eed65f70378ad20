import type { LenderBalance, LoanMore, LoanPayment, Refinance } from '../facts/finance.ts';
import { addMonths, type Day, monthsBetween } from '../units/day.ts';
import type { LoanSegment } from './loan-step.ts';

/** All that happens to one loan between its funding and a refinance. */
export type SegmentTerms = {
  segment: LoanSegment;
  promotion: LoanMore['promotion'];
  assumed: LoanMore['assumedPrepayment'];
  payments: readonly LoanPayment[];
  balances: readonly LenderBalance[];
  /** The new loan that pays this one off. */
  refinance: Refinance | null;
};

/** What is not on the schedule. `begin` is a month before the first payment, when the months of the schedule begin. */
export type Happening =
  | { kind: 'record'; on: Day; record: LoanPayment }
  | { kind: 'begin'; on: Day }
  | { kind: 'balance'; on: Day; balance: LenderBalance };

const ORDER: Record<Happening['kind'], number> = { record: 0, begin: 1, balance: 2 };

/**
 * What happens in each calendar month, 0 for that of the first payment, in order of days; on one day payments come before the lender's balance, which is
 * that of the day's close.
 */
export function happeningsByMonth(terms: SegmentTerms): Map<number, Happening[]> {
  const { segment, refinance } = terms;
  const all: Happening[] = [
    ...terms.payments.map((record): Happening => ({ kind: 'record', on: record.on, record })),
    ...terms.balances.map((balance): Happening => ({ kind: 'balance', on: balance.on, balance })),
  ];
  const begin = addMonths(segment.firstPaymentOn, -1);
  if (segment.fundedOn < begin && (refinance === null || begin < refinance.on)) all.push({ kind: 'begin', on: begin });
  all.sort((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : ORDER[a.kind] - ORDER[b.kind]));
  const months = new Map<number, Happening[]>();
  for (const one of all) {
    const month = monthsBetween(segment.firstPaymentOn, one.on);
    const held = months.get(month);
    if (held) held.push(one);
    else months.set(month, [one]);
  }
  return months;
}

/** Wholly extra principal is paid beside the month's payment, not in its place; a record of nothing says that the month was missed. */
export function replacesSchedule(record: LoanPayment): boolean {
  return record.amountCents !== record.extraPrincipalCents || record.amountCents === 0;
}
