import type { StatementBody } from '#shared/api/cycles.ts';
import { fieldValue, textOf } from '#src/lib/typed-values.ts';
import { isUnread, isUntouched, type StatementFormValues } from './statement-values.ts';

/** A statement as texts to change. A read that spans the cycle shows no dates of its own, so that it follows the cycle's. */
export function formOfStatement(body: StatementBody): StatementFormValues {
  return {
    from: body.from,
    to: body.to,
    days: textOf.whole(body.printedDays),
    statementOn: textOf.text(body.statementOn),
    dueOn: textOf.text(body.dueOn),
    reads: body.reads.map((read) => ({
      ...read,
      from: read.from === body.from ? '' : read.from,
      to: read.to === body.to ? '' : read.to,
      dials: String(read.dials),
    })),
    importKwh: textOf.wh(body.importWh),
    exportKwh: textOf.wh(body.exportWh),
    productionKwh: textOf.wh(body.productionWh),
    lines: body.lines.map((line) => ({
      component: line.component,
      kind: line.kind,
      label: line.label,
      quantity: textOf.text(line.quantity),
      unit: line.unit ?? '',
      rate: textOf.text(line.rate),
      amount: textOf.cents(line.amountCents),
      inDue: line.inDue,
      row: line.row,
    })),
    banks: body.banks.map((bank) => ({
      bank: bank.bank,
      label: bankLabel(body, bank.bank),
      unit: bank.unit,
      open: textOf.text(bank.open),
      close: textOf.text(bank.close),
      sentOut: textOf.text(bank.sentOut),
      sentValue: textOf.cents(bank.sentValueCents),
      row: bank.row,
    })),
    previousBalance: textOf.cents(body.previousBalanceCents),
    payments: textOf.cents(body.paymentsCents),
    due: textOf.cents(body.amountDueCents),
    budget: textOf.cents(body.budget?.instalmentCents ?? null),
    budgetBalance: textOf.cents(body.budget?.balanceCents ?? null),
    budgetSettled: textOf.cents(body.budget?.settledCents ?? null),
    reason: '',
  };
}

/** A bank by the name its own line has on the statement, or, where it is the only one, by that of the credit used; else its id. */
function bankLabel(body: StatementBody, id: string): string {
  const own = body.lines.find((line) => line.component === id);
  const used = body.banks.length === 1 ? body.lines.find((line) => line.kind === 'credit') : undefined;
  return (own ?? used)?.label ?? id;
}

/** The statement of a form that has passed its schema. Lines and reads left empty are not of it. */
export function statementOfForm(form: StatementFormValues): StatementBody {
  const from = fieldValue.day(form.from);
  const to = fieldValue.day(form.to);
  return {
    from,
    to,
    printedDays: fieldValue.wholeOrNull(form.days),
    statementOn: fieldValue.dayOrNull(form.statementOn),
    dueOn: fieldValue.dayOrNull(form.dueOn),
    reads: form.reads
      .filter((read) => !isUnread(read))
      .map((read) => ({
        meter: read.meter.trim(),
        channel: read.channel,
        from: fieldValue.dayOrNull(read.from) ?? from,
        to: fieldValue.dayOrNull(read.to) ?? to,
        previous: fieldValue.decimal(read.previous),
        current: fieldValue.decimal(read.current),
        dials: fieldValue.whole(read.dials),
        multiplier: fieldValue.decimal(read.multiplier),
        type: read.type,
        row: read.row,
      })),
    importWh: fieldValue.whOrNull(form.importKwh),
    exportWh: fieldValue.whOrNull(form.exportKwh),
    productionWh: fieldValue.whOrNull(form.productionKwh),
    lines: form.lines
      .filter((line) => !isUntouched(line))
      .map((line) => ({
        component: line.component,
        kind: line.kind,
        label: line.label.trim(),
        quantity: fieldValue.decimalOrNull(line.quantity),
        unit: line.unit === '' ? null : line.unit,
        rate: fieldValue.decimalOrNull(line.rate),
        amountCents: fieldValue.cents(line.amount),
        inDue: line.inDue,
        row: line.row,
      })),
    banks: form.banks.map((bank) => ({
      bank: bank.bank,
      unit: bank.unit,
      open: fieldValue.decimalOrNull(bank.open),
      close: fieldValue.decimalOrNull(bank.close),
      sentOut: fieldValue.decimalOrNull(bank.sentOut),
      sentValueCents: fieldValue.centsOrNull(bank.sentValue),
      row: bank.row,
    })),
    previousBalanceCents: fieldValue.centsOrNull(form.previousBalance),
    paymentsCents: fieldValue.centsOrNull(form.payments),
    amountDueCents: fieldValue.cents(form.due),
    budget: budgetOfForm(form),
  };
}

function budgetOfForm(form: StatementFormValues): StatementBody['budget'] {
  const instalmentCents = fieldValue.centsOrNull(form.budget);
  if (instalmentCents === null) return null;
  return {
    instalmentCents,
    balanceCents: fieldValue.centsOrNull(form.budgetBalance),
    settledCents: fieldValue.centsOrNull(form.budgetSettled),
  };
}
