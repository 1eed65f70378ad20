import type { ProjectedMonth } from '#shared/position/position.ts';
import type { Outcome } from '#shared/try/outcome.ts';
import { type Cents, cents } from '#shared/units/cents.ts';
import { type Day, daysBetween, monthsBetween } from '#shared/units/day.ts';
import type { Working } from '#shared/working.ts';
import { fullDate, monthYear } from '#src/lib/format.ts';
import { differenceWorking, firstYearWorking, monthWorking, settledWorking } from './try-workings.ts';

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
  cell: (one: Judged) => Cell;
  /** Null where the two cannot be set against each other. */
  difference: (base: Outcome, changed: Judged) => Difference | null;
};
/** What a row reads: an outcome, and the day of a sale in it. */
export type Judged = { outcome: Outcome; soldOn: Day | null };

/**
 * What changes are judged by, row by row. `sales` are the days of the sales among them: what is settled on such a day stands against what would be settled
 * then as things stand, not against the horizon.
 */
export function tryRows(years: number, sales: readonly Day[] = []): TryRow[] {
  const rows = plainRows(years);
  return sales.length === 0 ? rows : [...rows.slice(0, 1), saleRow(new Set(sales)), ...rows.slice(1)];
}

function plainRows(years: number): TryRow[] {
  return [
    {
      key: 'even',
      label: 'Even',
      cell: ({ outcome: { evenOn } }) =>
        evenOn === null ? none(`not within ${years} years`) : { kind: 'day', text: monthYear(evenOn) },
      difference: (base, { outcome }) => sooner(base.evenOn, outcome.evenOn, 'months'),
    },
    unlessSold(moneyRow('settled', 'Settled at the end', 1, (outcome) => outcome.settledCents, settledWorking, '–')),
    moneyRow('interest', 'Interest still to pay', -1, (outcome) => outcome.interestCents, null, 'none'),
    {
      key: 'paidOff',
      label: 'Loan paid off',
      cell: ({ outcome: { paidOffOn, paymentCents } }) =>
        paidOffOn === null
          ? none(paymentCents === null ? 'no loan' : 'not by its schedule')
          : { kind: 'day', text: fullDate(paidOffOn) },
      // Neither good nor bad by itself: a lower payment is paid for longer.
      difference: (base, { outcome }) => {
        const difference = sooner(base.paidOffOn, outcome.paidOffOn, 'days');
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

/** A sale ends the counting, so its last figure is no figure of the horizon. */
function unlessSold(row: TryRow): TryRow {
  return {
    ...row,
    cell: (one) => (one.soldOn === null ? row.cell(one) : none('sold before')),
    difference: (base, changed) => (changed.soldOn === null ? row.difference(base, changed) : null),
  };
}

/** Settled on the day of a sale, against the close of that month as things stand. */
function saleRow(sales: ReadonlySet<Day>): TryRow {
  const [only] = sales.size === 1 ? sales : [];
  return {
    key: 'sold',
    label: 'Settled on the day of the sale',
    cell: ({ outcome, soldOn }) => {
      const month = soldOn === null && only === undefined ? undefined : monthOf(outcome, soldOn ?? only ?? null);
      return month === undefined
        ? none('the days differ')
        : { kind: 'money', cents: month.settledTodayCents, working: monthWorking(month) };
    },
    difference: (base, { outcome, soldOn }) => {
      const before = monthOf(base, soldOn);
      const after = monthOf(outcome, soldOn);
      if (before === undefined || after === undefined) return null;
      const more = cents(after.settledTodayCents - before.settledTodayCents);
      return {
        kind: 'money',
        cents: more,
        working: differenceWorking('Settled on that day', before.settledTodayCents, after.settledTodayCents),
        good: more === 0 ? null : more > 0,
      };
    },
  };
}

/** The projected month that a day falls in; undefined without a day. */
function monthOf({ months }: Outcome, on: Day | null): ProjectedMonth | undefined {
  return on === null ? undefined : months.find((month) => month.on >= on);
}

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
    cell: ({ outcome }) => {
      const amount = amountOf(outcome);
      return amount === null
        ? none(missing)
        : { kind: 'money', cents: amount, working: workingOf ? workingOf(outcome) : null };
    },
    difference: (base, { outcome }) => {
      const before = amountOf(base);
      const after = amountOf(outcome);
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
