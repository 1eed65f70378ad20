import type { StatementBody } from '#shared/api/cycles.ts';
import type { PrintedLine, RegisterRead, Statement } from '#shared/facts/papers.ts';
import { type Cents, cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { kwhText, parseKwh, type Wh } from '#shared/units/energy.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';

/** A statement as a person types it: every value a text. */
export type StatementValues = {
  from: string;
  to: string;
  printedDays: string;
  statementOn: string;
  dueOn: string;
  importWh: string;
  exportWh: string;
  productionWh: string;
  reads: {
    meter: string;
    channel: RegisterRead['channel'];
    from: string;
    to: string;
    previous: string;
    current: string;
    dials: string;
    multiplier: string;
    type: RegisterRead['type'];
    row: number | null;
  }[];
  lines: {
    label: string;
    kind: PrintedLine['kind'];
    component: string | null;
    quantity: string;
    unit: string;
    rate: string;
    amountCents: string;
    inDue: boolean;
    row: number | null;
  }[];
  banks: { bank: string; unit: 'kWh' | 'USD'; open: string; close: string; row: number | null }[];
  previousBalanceCents: string;
  paymentsCents: string;
  amountDueCents: string;
  reason: string;
};

/** The posted statement as texts to change. */
export function valuesOf(statement: Statement): StatementValues {
  return {
    from: statement.from,
    to: statement.to,
    printedDays: statement.printedDays === null ? '' : String(statement.printedDays),
    statementOn: statement.statementOn ?? '',
    dueOn: statement.dueOn ?? '',
    importWh: whWords(statement.importWh),
    exportWh: whWords(statement.exportWh),
    productionWh: whWords(statement.productionWh),
    reads: statement.reads.map((read) => ({ ...read, dials: String(read.dials) })),
    lines: statement.lines.map((line) => ({
      ...line,
      quantity: line.quantity ?? '',
      unit: line.unit ?? '',
      rate: line.rate ?? '',
      amountCents: dollarsText(line.amountCents),
    })),
    banks: statement.banks.map((bank) => ({ ...bank, open: bank.open ?? '', close: bank.close ?? '' })),
    previousBalanceCents: centsWords(statement.previousBalanceCents),
    paymentsCents: centsWords(statement.paymentsCents),
    amountDueCents: dollarsText(statement.amountDueCents),
    reason: '',
  };
}

function whWords(amount: Wh | null): string {
  return amount === null ? '' : kwhText(amount);
}

function centsWords(amount: Cents | null): string {
  return amount === null ? '' : dollarsText(amount);
}

const DECIMAL = /^-?\d{1,12}(\.\d{1,12})?$/;
const NO_DATE = 'Write a date that exists.';
const NO_AMOUNT = 'Write an amount such as 20.14 or −20.14.';
const NO_NUMBER = 'Write a number such as 0.1684.';
const UNITS = ['kWh', 'cycle', 'day', 'kW', 'USD'] as const;

/** Reads the typed values as a statement and a reason; every fault is named, none stops at the first. */
export function readStatementValues(values: StatementValues): Reading<{ statement: StatementBody; reason: string }> {
  const list = new FaultList();
  const day = (text: string, path: string) => list.optional(text, parseDay, path, NO_DATE);
  const dollars = (text: string, path: string) => list.optional(text, parseDollars, path, NO_AMOUNT);
  const energy = (text: string, path: string) => list.optional(text, parseKwh, path, 'Write kWh, such as 498.');
  const decimal = (text: string, path: string) => list.optional(text, plainDecimal, path, NO_NUMBER);
  const neededDay = (text: string, path: string) => list.needed(text, parseDay, path, NO_DATE, '1970-01-01' as Day);
  const neededDollars = (text: string, path: string) => list.needed(text, parseDollars, path, NO_AMOUNT, cents(0));
  const neededDecimal = (text: string, path: string) => list.needed(text, plainDecimal, path, NO_NUMBER, '0');

  const statement: StatementBody = {
    from: neededDay(values.from, 'from'),
    to: neededDay(values.to, 'to'),
    printedDays: list.optional(values.printedDays, wholeNumber, 'printedDays', 'Write a whole number.'),
    statementOn: day(values.statementOn, 'statementOn'),
    dueOn: day(values.dueOn, 'dueOn'),
    importWh: energy(values.importWh, 'importWh'),
    exportWh: energy(values.exportWh, 'exportWh'),
    productionWh: energy(values.productionWh, 'productionWh'),
    reads: values.reads.map((read, index) => ({
      meter: read.meter.trim(),
      channel: read.channel,
      from: neededDay(read.from, `reads.${index}.from`),
      to: neededDay(read.to, `reads.${index}.to`),
      previous: neededDecimal(read.previous, `reads.${index}.previous`),
      current: neededDecimal(read.current, `reads.${index}.current`),
      dials: list.needed(read.dials, dialsOf, `reads.${index}.dials`, 'Write 3 to 9.', 5),
      multiplier: neededDecimal(read.multiplier, `reads.${index}.multiplier`),
      type: read.type,
      row: read.row,
    })),
    lines: values.lines.map((line, index) => ({
      component: line.component,
      kind: line.kind,
      label: list.needed(line.label, (text) => text.trim(), `lines.${index}.label`, '', 'line'),
      quantity: decimal(line.quantity, `lines.${index}.quantity`),
      unit: UNITS.find((unit) => unit === line.unit) ?? null,
      rate: decimal(line.rate, `lines.${index}.rate`),
      amountCents: neededDollars(line.amountCents, `lines.${index}.amountCents`),
      inDue: line.inDue,
      row: line.row,
    })),
    banks: values.banks.map((bank, index) => ({
      bank: bank.bank,
      unit: bank.unit,
      open: decimal(bank.open, `banks.${index}.open`),
      close: decimal(bank.close, `banks.${index}.close`),
      row: bank.row,
    })),
    previousBalanceCents: dollars(values.previousBalanceCents, 'previousBalanceCents'),
    paymentsCents: dollars(values.paymentsCents, 'paymentsCents'),
    amountDueCents: neededDollars(values.amountDueCents, 'amountDueCents'),
  };
  if (list.faults.length === 0 && statement.to <= statement.from) list.add('to', 'The last day comes after the first.');
  const reason = values.reason.trim();
  if (reason === '') list.add('reason', 'Say why, in a few words.');
  return list.reading({ statement, reason });
}

function plainDecimal(text: string): string | null {
  const plain = text.trim().replaceAll('\u2212', '-').replaceAll(',', '').replace(/^\$/, '');
  return DECIMAL.test(plain) ? plain : null;
}

function wholeNumber(text: string): number | null {
  return /^\d{1,6}$/.test(text.trim()) ? Number(text.trim()) : null;
}

function dialsOf(text: string): number | null {
  const dials = wholeNumber(text);
  return dials !== null && dials >= 3 && dials <= 9 ? dials : null;
}
