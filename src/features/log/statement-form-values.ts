import * as z from 'zod/mini';
import type { StatementBody } from '#shared/api/cycles.ts';
import { printedLine, readChannel } from '#shared/facts/papers.ts';
import { lineUnit } from '#shared/settlement/settlement.ts';
import { type Cents, cents, parseDollars } from '#shared/units/cents.ts';
import { fieldValue, textOf, typed, typedWhole } from '#src/lib/typed-values.ts';

const text = z.string();
const channel = readChannel;
const readRow = z.object({
  meter: text.check(z.trim(), z.minLength(1, { error: 'Write the meter’s number.' })),
  channel,
  from: text,
  to: text,
  previous: typed.kwh,
  current: typed.kwh,
  dials: typedWhole(3, 9),
  multiplier: typed.rate,
  type: z.enum(['actual', 'estimated']),
});
const lineRow = z.object({
  component: text,
  kind: printedLine.shape.kind,
  label: text.check(z.trim(), z.minLength(1, { error: 'Name the line as printed.' }), z.maxLength(160)),
  quantity: typed.rateOrNone,
  unit: z.union([lineUnit, z.literal('')]),
  rate: typed.rateOrNone,
  amount: typed.money,
  inDue: z.boolean(),
});
const bankRow = z.object({
  bank: text.check(z.trim(), z.minLength(1)),
  label: text,
  unit: z.enum(['kWh', 'USD']),
  open: typed.rateOrNone,
  close: typed.rateOrNone,
});

export const statementForm = z
  .object({
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
  })
  .check(
    z.refine((form) => form.from < form.to, { error: 'The later read must come after the earlier one.', path: ['to'] }),
  );
export type StatementFormValues = z.infer<typeof statementForm>;
export type LineRow = StatementFormValues['lines'][number];

export const emptyLine = (): LineRow => ({
  component: '',
  kind: 'adjustment',
  label: '',
  quantity: '',
  unit: '',
  rate: '',
  amount: '',
  inDue: true,
});

export function formOfStatement(body: StatementBody): StatementFormValues {
  return {
    from: body.from,
    to: body.to,
    days: textOf.whole(body.printedDays),
    statementOn: textOf.text(body.statementOn),
    dueOn: textOf.text(body.dueOn),
    reads: body.reads.map((read) => ({ ...read, from: read.from, to: read.to, dials: String(read.dials) })),
    importKwh: textOf.wh(body.importWh),
    exportKwh: textOf.wh(body.exportWh),
    productionKwh: textOf.wh(body.productionWh),
    lines: body.lines.map((line) => ({
      component: textOf.text(line.component),
      kind: line.kind,
      label: line.label,
      quantity: textOf.text(line.quantity),
      unit: line.unit ?? '',
      rate: textOf.text(line.rate),
      amount: textOf.cents(line.amountCents),
      inDue: line.inDue,
    })),
    banks: body.banks.map((bank) => ({
      bank: bank.bank,
      label: bank.bank,
      unit: bank.unit,
      open: textOf.text(bank.open),
      close: textOf.text(bank.close),
    })),
    previousBalance: textOf.cents(body.previousBalanceCents),
    payments: textOf.cents(body.paymentsCents),
    due: textOf.cents(body.amountDueCents),
  };
}

/** The statement of a form that has passed its schema. Rows of the file stay known where the form was filled in from one. */
export function statementOfForm(form: StatementFormValues, before: StatementBody | null): StatementBody {
  const from = fieldValue.day(form.from);
  const to = fieldValue.day(form.to);
  const sameDates = before !== null && before.from === from && before.to === to;
  return {
    from,
    to,
    printedDays: fieldValue.wholeOrNull(form.days),
    statementOn: fieldValue.dayOrNull(form.statementOn),
    dueOn: fieldValue.dayOrNull(form.dueOn),
    reads: form.reads.map((read, index) => ({
      meter: read.meter.trim(),
      channel: read.channel,
      // A read inside a cycle (a meter exchange) keeps its own dates; any other has those of the cycle.
      from: sameDates && read.from !== '' ? fieldValue.day(read.from) : from,
      to: sameDates && read.to !== '' ? fieldValue.day(read.to) : to,
      previous: fieldValue.decimal(read.previous),
      current: fieldValue.decimal(read.current),
      dials: fieldValue.whole(read.dials),
      multiplier: fieldValue.decimal(read.multiplier),
      type: read.type,
      row: before?.reads[index]?.row ?? null,
    })),
    importWh: fieldValue.whOrNull(form.importKwh),
    exportWh: fieldValue.whOrNull(form.exportKwh),
    productionWh: fieldValue.whOrNull(form.productionKwh),
    lines: form.lines.map((line, index) => ({
      component: line.component === '' ? null : line.component,
      kind: line.kind,
      label: line.label.trim(),
      quantity: fieldValue.decimalOrNull(line.quantity),
      unit: line.unit === '' ? null : line.unit,
      rate: fieldValue.decimalOrNull(line.rate),
      amountCents: fieldValue.cents(line.amount),
      inDue: line.inDue,
      row: before?.lines[index]?.row ?? null,
    })),
    banks: form.banks.map((bank, index) => ({
      bank: bank.bank,
      unit: bank.unit,
      open: fieldValue.decimalOrNull(bank.open),
      close: fieldValue.decimalOrNull(bank.close),
      row: before?.banks[index]?.row ?? null,
    })),
    previousBalanceCents: fieldValue.centsOrNull(form.previousBalance),
    paymentsCents: fieldValue.centsOrNull(form.payments),
    amountDueCents: fieldValue.cents(form.due),
  };
}

export type RunningSum = { linesCents: Cents; dueCents: Cents | null; unread: number };

/** What the typed lines in the amount due come to with the balance and payments, in whole cents; lines that do not read are counted apart. */
export function runningSum(
  form: Pick<StatementFormValues, 'lines' | 'previousBalance' | 'payments' | 'due'>,
): RunningSum {
  let total = 0;
  let unread = 0;
  const add = (amount: string, needed: boolean) => {
    const value = parseDollars(amount);
    if (value !== null) total += value;
    else if (needed || amount.trim() !== '') unread += 1;
  };
  for (const line of form.lines) if (line.inDue) add(line.amount, true);
  add(form.previousBalance, false);
  add(form.payments, false);
  return { linesCents: cents(total), dueCents: parseDollars(form.due), unread };
}

/** True for a line laid out beforehand and left without quantity and amount: this statement does not print it. */
export function isUntouched(line: LineRow): boolean {
  return line.label.trim() !== '' && line.amount.trim() === '' && line.quantity.trim() === '';
}
