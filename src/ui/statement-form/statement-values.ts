import * as z from 'zod/mini';
import { printedLine, readChannel } from '#shared/facts/papers.ts';
import { lineUnit } from '#shared/settlement/settlement.ts';
import { MONEY_FAULT, NUMBER_FAULT, typed, typedWhole } from '#src/lib/typed-values.ts';

const text = z.string();
/** The row of the file a value was read from; null when typed. It goes with its value, whatever is taken out around it. */
const row = z.nullable(z.int());

const readRow = z
  .object({
    meter: text.check(z.trim()),
    channel: readChannel,
    /** Empty where the read has the dates of the cycle. */
    from: typed.dayOrNone,
    to: typed.dayOrNone,
    previous: typed.numberOrNone,
    current: typed.numberOrNone,
    dials: typedWhole(3, 9),
    multiplier: typed.number,
    type: z.enum(['actual', 'estimated']),
    row,
  })
  .check(
    // A file that names no meter is taken as it is; a person who types one is asked.
    z.refine((read) => isUnread(read) || read.row !== null || read.meter !== '', {
      error: 'Write the meter’s number.',
      path: ['meter'],
    }),
    z.refine((read) => isUnread(read) || read.previous.trim() !== '', {
      error: NUMBER_FAULT,
      path: ['previous'],
    }),
    z.refine((read) => read.from === '' || read.to === '' || read.from < read.to, {
      error: 'The later read must come after the earlier one.',
      path: ['to'],
    }),
  );

const lineRow = z
  .object({
    component: z.nullable(text),
    kind: printedLine.shape.kind,
    label: text.check(z.trim(), z.minLength(1, { error: 'Name the line as printed.' }), z.maxLength(160)),
    quantity: typed.numberOrNone,
    unit: z.union([lineUnit, z.literal('')]),
    rate: typed.rateOrNone,
    amount: typed.moneyOrNone,
    inDue: z.boolean(),
    row,
  })
  .check(z.refine((line) => isUntouched(line) || line.amount.trim() !== '', { error: MONEY_FAULT, path: ['amount'] }));

const bankRow = z.object({
  bank: text,
  label: text,
  unit: z.enum(['kWh', 'USD']),
  open: typed.numberOrNone,
  close: typed.numberOrNone,
  sentOut: typed.numberOrNone,
  sentValue: typed.moneyOrNone,
  row,
});

const fields = {
  from: typed.day,
  to: typed.day,
  days: typedWhole(1, 400, true),
  statementOn: typed.dayOrNone,
  dueOn: typed.dayOrNone,
  reads: z.array(readRow),
  importKwh: typed.kwhOrNone,
  exportKwh: typed.kwhOrNone,
  productionKwh: typed.kwhOrNone,
  lines: z.array(lineRow),
  banks: z.array(bankRow),
  previousBalance: typed.moneyOrNone,
  payments: typed.moneyOrNone,
  due: typed.money,
  /** Empty where the bill is not on a budget plan. */
  budget: typed.moneyOrNone,
  budgetBalance: typed.moneyOrNone,
  budgetSettled: typed.moneyOrNone,
  /** Why a posted statement is corrected; empty in any other. */
  reason: text,
};
const datesInOrder = z.refine<{ from: string; to: string }>((form) => form.from < form.to, {
  error: 'The later read must come after the earlier one.',
  path: ['to'],
});

type BudgetTexts = { budget: string; budgetBalance: string; budgetSettled: string };
const budgetNamed = z.refine<BudgetTexts>(
  (form) => form.budget.trim() !== '' || (form.budgetBalance.trim() === '' && form.budgetSettled.trim() === ''),
  { error: 'Write the budget amount of this bill too.', path: ['budget'] },
);
const budgetHasLines = z.refine<BudgetTexts & { lines: Pick<LineRow, 'kind' | 'label' | 'amount' | 'quantity'>[] }>(
  (form) => form.budget.trim() === '' || form.lines.some((line) => !isUntouched(line) && line.kind !== 'otherService'),
  { error: 'Add the real charges as lines above: the amount due does not say them.', path: ['budget'] },
);

/** A statement as a person types it: every value a text. */
export const statementForm = z.object(fields).check(datesInOrder, budgetNamed, budgetHasLines);
export type StatementFormValues = z.infer<typeof statementForm>;
export type LineRow = StatementFormValues['lines'][number];
export type ReadRow = StatementFormValues['reads'][number];

/** A posted statement being corrected: the same, and why. */
export const correctionForm = z
  .object({
    ...fields,
    reason: text.check(z.trim(), z.minLength(1, { error: 'Say why, in a few words.' }), z.maxLength(500)),
  })
  .check(datesInOrder, budgetNamed, budgetHasLines);

export const emptyLine = (): LineRow => ({
  component: null,
  kind: 'adjustment',
  label: '',
  quantity: '',
  unit: '',
  rate: '',
  amount: '',
  inDue: true,
  row: null,
});

/** A read to fill in, of the meter given where there is one. */
export const emptyRead = (like?: { meter: string; dials: string; multiplier: string }): ReadRow => ({
  meter: like?.meter ?? '',
  channel: 'import',
  from: '',
  to: '',
  previous: '',
  current: '',
  dials: like?.dials ?? '5',
  multiplier: like?.multiplier ?? '1',
  type: 'actual',
  row: null,
});

/** True for a line laid out beforehand and left without quantity and amount: this statement does not print it. */
export function isUntouched(line: Pick<LineRow, 'label' | 'amount' | 'quantity'>): boolean {
  return line.label.trim() !== '' && line.amount.trim() === '' && line.quantity.trim() === '';
}

/** True for a read laid out beforehand and left without its current figure: this statement does not print it. */
export function isUnread(read: { current: string }): boolean {
  return read.current.trim() === '';
}
