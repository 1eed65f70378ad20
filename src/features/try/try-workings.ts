import type { ProjectedMonth } from '#shared/position/position.ts';
import type { Outcome } from '#shared/try/outcome.ts';
import { type Cents, dollarsText } from '#shared/units/cents.ts';
import type { Working } from '#shared/working.ts';
import { fullDate } from '#src/lib/format.ts';

const usd = (name: string, label: string, amount: Cents | readonly Cents[], source: string) => ({
  name,
  label,
  value: typeof amount === 'number' ? dollarsText(amount) : amount.map(dollarsText),
  unit: 'USD',
  source: { kind: 'figure' as const, name: source },
});

/** With the change less as things stand. */
export function differenceWorking(label: string, before: Cents, after: Cents): Working {
  return {
    words: `${label} with the change less ${label.toLowerCase()} as things stand.`,
    formula: 'changed - base',
    inputs: [
      usd('changed', 'With the change', after, 'the projection with the change'),
      usd('base', 'As things stand', before, 'the projection as things stand'),
    ],
    unit: 'USD',
    basis: 'estimated',
  };
}

/** Settled today at the last month; null where there is none. */
export function settledWorking({ months }: Outcome): Working | null {
  const last = months.at(-1);
  return last === undefined ? null : monthWorking(last);
}

/** Settled today at the close of a month, from its parts. */
export function monthWorking(month: ProjectedMonth): Working {
  const source = `the projected month to ${fullDate(month.on)}`;
  return {
    words:
      'Cash so far less the payoff of the loan, plus the credit still to come, the incentive owed and the utility bank.',
    formula: 'cash + payoff + credit + owed + bank',
    inputs: [
      usd('cash', 'Cash so far', month.cashSoFarCents, source),
      usd('payoff', 'Loan payoff', month.loanPayoffCents, source),
      usd('credit', 'Tax credit still to come', month.creditStillToComeCents, source),
      usd('owed', 'Incentive owed', month.incentiveOwedCents, source),
      usd('bank', 'Utility bank', month.utilityBankCents, source),
    ],
    unit: 'USD',
    basis: 'estimated',
  };
}

/** The bill avoided over the first twelve whole months; null where there are none. */
export function firstYearWorking({ months }: Outcome): Working | null {
  const year = months.slice(1, 13);
  const first = year[0];
  const last = year.at(-1);
  if (first === undefined || last === undefined) return null;
  return {
    words: 'The bill avoided in each of the first twelve whole months projected.',
    formula: 'sum(avoided)',
    inputs: [
      usd(
        'avoided',
        'Bill avoided, month by month',
        year.map((month) => month.books.billAvoided),
        `the projected months to ${fullDate(first.on)} through ${fullDate(last.on)}`,
      ),
    ],
    unit: 'USD',
    basis: 'estimated',
  };
}
