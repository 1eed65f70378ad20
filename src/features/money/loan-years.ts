import type { LoanScheduleRow, LoanView } from '#shared/api/money-loan.ts';
import { type Cents, sumCents } from '#shared/units/cents.ts';

/** A calendar year of the schedule; what a new loan paid off is not among what was paid. */
export type LoanYear = {
  year: string;
  rows: LoanScheduleRow[];
  paidCents: Cents;
  interestCents: Cents;
  principalCents: Cents;
  leftCents: Cents;
  past: boolean;
};

export function loanYears(loan: Pick<LoanView, 'schedule'>): LoanYear[] {
  const years = new Map<string, LoanScheduleRow[]>();
  for (const row of loan.schedule) {
    const year = row.on.slice(0, 4);
    years.set(year, [...(years.get(year) ?? []), row]);
  }
  return [...years].map(([year, rows]) => {
    const paid = rows.filter((row) => !row.refinanced);
    return {
      year,
      rows,
      paidCents: sumCents(paid.map((row) => row.payment.amountCents)),
      interestCents: sumCents(paid.map((row) => row.interestCents)),
      principalCents: sumCents(paid.map((row) => row.principalCents)),
      leftCents: rows.at(-1)?.balanceCents ?? sumCents([]),
      past: rows.every((row) => row.past),
    };
  });
}
