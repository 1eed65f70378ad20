import { bodyOfStatement } from '#server/services/statements-in-force.ts';
import type { StatementBody } from '#shared/api/cycles.ts';
import type { IntervalDay, Statement } from '#shared/facts/papers.ts';
import { type Cents, dollarsText } from '#shared/units/cents.ts';

const ITEMS: Record<string, string> = {
  import: 'import',
  export: 'export credit',
  credit: 'credit used',
  fixed: 'customer charge',
  nonbypassable: 'non-bypassable',
  tax: 'tax',
};

type Row = Record<string, string>;

const COLUMNS = [
  'service_from',
  'service_to',
  'record',
  'item',
  'label',
  'amount',
  'quantity',
  'unit',
  'rate',
  'in_due',
  'meter',
  'previous',
  'current',
  'dials',
  'read_type',
  'statement_date',
  'due_date',
  'days',
  'component',
];

function rowsOf(body: StatementBody): Row[] {
  const dates = { service_from: body.from, service_to: body.to };
  const energy = { import: body.importWh, export: body.exportWh, production: body.productionWh };
  return [
    ...body.reads.map(
      (read, index): Row => ({
        ...dates,
        record: 'read',
        item: read.channel,
        meter: read.meter,
        previous: read.previous,
        current: read.current,
        dials: String(read.dials),
        read_type: read.type,
        quantity: String((energy[read.channel] ?? 0) / 1000),
        unit: 'kWh',
        ...(index === 0
          ? { statement_date: body.statementOn ?? '', due_date: body.dueOn ?? '', days: String(body.printedDays ?? '') }
          : {}),
      }),
    ),
    ...body.lines.map(
      (line): Row => ({
        ...dates,
        record: 'line',
        item: ITEMS[line.kind] ?? line.kind,
        label: line.label,
        amount: dollarsText(line.amountCents),
        quantity: line.quantity ?? '',
        unit: line.unit ?? '',
        rate: line.rate ?? '',
        in_due: line.inDue ? 'yes' : 'no',
        component: line.component ?? '',
      }),
    ),
    ...body.banks.map(
      (bank): Row => ({
        ...dates,
        record: 'bank',
        item: bank.bank,
        previous: bank.open ?? '',
        current: bank.close ?? '',
        quantity: bank.sentOut ?? '',
        amount: bank.sentValueCents === null ? '' : dollarsText(bank.sentValueCents),
        unit: bank.unit,
      }),
    ),
    ...(body.previousBalanceCents === null
      ? []
      : [{ ...dates, record: 'balance', item: 'previous balance', amount: dollarsText(body.previousBalanceCents) }]),
    ...(body.paymentsCents === null
      ? []
      : [{ ...dates, record: 'balance', item: 'payments', amount: dollarsText(body.paymentsCents) }]),
    ...budgetRows(body).map(
      ([item, amountCents]): Row => ({ ...dates, record: 'balance', item, amount: dollarsText(amountCents) }),
    ),
    { ...dates, record: 'balance', item: 'amount due', amount: dollarsText(body.amountDueCents) },
  ];
}

function budgetRows({ budget }: StatementBody): [string, Cents][] {
  const rows: [string, Cents | null][] = [
    ['budget amount', budget?.instalmentCents ?? null],
    ['budget balance', budget?.balanceCents ?? null],
    ['budget settlement', budget?.settledCents ?? null],
  ];
  return rows.flatMap(([item, amount]) => (amount === null ? [] : [[item, amount] as [string, Cents]]));
}

/** Statements as a file in the documented layout. */
export function statementFile(statements: readonly Statement[]): string {
  const rows = statements.flatMap((statement) => rowsOf(bodyOfStatement(statement)));
  const cell = (text: string) => (/[",]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);
  const lines = rows.map((row) => COLUMNS.map((column) => cell(row[column] ?? '')).join(','));
  return `${COLUMNS.join(',')}\n${lines.join('\n')}\n`;
}

/** Interval days of one channel as a file of local hours. */
export function intervalFile(days: readonly IntervalDay[]): string {
  const lines = days.flatMap((found) =>
    found.values.map((value, index) => {
      const minute = index * found.minutes;
      const clock = `${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;
      return `${found.day} ${clock},${value ?? ''}`;
    }),
  );
  return `Time,Energy (Wh)\n${lines.join('\n')}\n`;
}
