import type { Outcome } from '#shared/try/outcome.ts';
import { type Cents, cents, dollarsText } from '#shared/units/cents.ts';
import { type Day, daysBetween, monthsBetween } from '#shared/units/day.ts';
import type { Working } from '#shared/working.ts';
import { fullDate, monthYear } from '#src/lib/format.ts';

/** A cell of the table: an amount with what stands behind it, a day, or words where there is neither. */
export type Cell =
  | { kind: 'money'; cents: Cents; working: Working | null }
  | { kind: 'day'; text: string }
  | { kind: 'none'; text: string };
/** How a change differs from things as they stand. `good` is null where it is neither. */
export type Difference =
  | { kind: 'money'; cents: Cents; working: Working; good: boolean | null }
  | { kind: 'words'; text: string; good: boolean | null };
export type TryRow = {
  key: string;
  label: string;
  cell: (outcome: Outcome) => Cell;
  /** Null where the two cannot be set against each other. */
  difference: (base: Outcome, changed: Outcome) => Difference | null;
};

/** What a change is judged by, row by row. */
export function tryRows(years: number): TryRow[] {
  return [
    {
      key: 'even',
      label: 'Even',
      cell: ({ evenOn }) =>
        evenOn === null ? none(`not within ${years} years`) : { kind: 'day', text: monthYear(evenOn) },
      difference: (base, changed) => sooner(base.evenOn, changed.evenOn, 'months'),
    },
    moneyRow('settled', 'Settled at the end', 1, (outcome) => outcome.settledCents, settledWorking, '–'),
    moneyRow('interest', 'Interest still to pay', -1, (outcome) => outcome.interestCents, null, 'none'),
    {
      key: 'paidOff',
      label: 'Loan paid off',
      cell: ({ paidOffOn, paymentCents }) =>
        paidOffOn === null
          ? none(paymentCents === null ? 'no loan' : 'not by its schedule')
          : { kind: 'day', text: fullDate(paidOffOn) },
      // Neither good nor bad by itself: a lower payment is paid for longer.
      difference: (base, changed) => {
        const difference = sooner(base.paidOffOn, changed.paidOffOn, 'days');
        return difference && { ...difference, good: null };
      },
    },
    moneyRow('payment', 'Payment a month', null, (outcome) => outcome.paymentCents, null, 'no loan'),
    moneyRow(
      'firstYear',
      'Bill avoided in the first year',
      1,
      (outcome) => outcome.firstYearAvoidedCents,
      firstYearWorking,
      'not a whole year',
    ),
  ];
}

const none = (text: string): Cell => ({ kind: 'none', text });

/** `better` is the sign of a difference that is good for the owner. */
function moneyRow(
  key: string,
  label: string,
  better: 1 | -1 | null,
  amountOf: (outcome: Outcome) => Cents | null,
  workingOf: ((outcome: Outcome) => Working | null) | null,
  missing: string,
): TryRow {
  return {
    key,
    label,
    cell: (outcome) => {
      const amount = amountOf(outcome);
      return amount === null
        ? none(missing)
        : { kind: 'money', cents: amount, working: workingOf ? workingOf(outcome) : null };
    },
    difference: (base, changed) => {
      const before = amountOf(base);
      const after = amountOf(changed);
      if (before === null || after === null) return null;
      const more = cents(after - before);
      return {
        kind: 'money',
        cents: more,
        working: differenceWorking(label, before, after),
        good: better === null || more === 0 ? null : more > 0 === better > 0,
      };
    },
  };
}

/** "8 months sooner", "2 years and 3 months later"; days where months are too coarse. */
function sooner(before: Day | null, after: Day | null, least: 'months' | 'days'): Difference | null {
  if (before === null && after === null) return null;
  if (before === null) return { kind: 'words', text: 'now within', good: true };
  if (after === null) return { kind: 'words', text: 'no longer', good: false };
  const months = Math.abs(monthsBetween(before, after));
  const isSame = least === 'months' ? months === 0 : before === after;
  if (isSame) return { kind: 'words', text: 'the same', good: null };
  const days = Math.abs(daysBetween(before, after));
  const said = months === 0 ? counted(days, 'day') : monthsWords(months);
  return { kind: 'words', text: `${said} ${after < before ? 'sooner' : 'later'}`, good: after < before };
}

function monthsWords(months: number): string {
  const years = Math.floor(months / 12);
  const rest = months % 12;
  return [years > 0 ? counted(years, 'year') : null, rest > 0 ? counted(rest, 'month') : null]
    .filter((part) => part !== null)
    .join(' and ');
}

const counted = (count: number, what: string) => `${count} ${what}${count === 1 ? '' : 's'}`;

const usd = (name: string, label: string, amount: Cents | readonly Cents[], source: string) => ({
  name,
  label,
  value: typeof amount === 'number' ? dollarsText(amount) : amount.map(dollarsText),
  unit: 'USD',
  source: { kind: 'figure' as const, name: source },
});

function differenceWorking(label: string, before: Cents, after: Cents): Working {
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

function settledWorking({ months }: Outcome): Working | null {
  const last = months.at(-1);
  if (last === undefined) return null;
  const source = `the projected month to ${fullDate(last.on)}`;
  return {
    words:
      'Cash so far less the payoff of the loan, plus the credit still to come, the incentive owed and the utility bank.',
    formula: 'cash + payoff + credit + owed + bank',
    inputs: [
      usd('cash', 'Cash so far', last.cashSoFarCents, source),
      usd('payoff', 'Loan payoff', last.loanPayoffCents, source),
      usd('credit', 'Tax credit still to come', last.creditStillToComeCents, source),
      usd('owed', 'Incentive owed', last.incentiveOwedCents, source),
      usd('bank', 'Utility bank', last.utilityBankCents, source),
    ],
    unit: 'USD',
    basis: 'estimated',
  };
}

function firstYearWorking({ months }: Outcome): Working | null {
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
