import { STATEMENT_COLUMNS, type StatementColumn } from './statement-columns.ts';

/** Lines that begin with # are for the reader and are skipped. */
const GUIDE = [
  'One row per item of the statement. Several statements may follow one another. Lines that begin with # are skipped.',
  'service_from and service_to are the two read dates. If the bill prints the last day served (15 Jul to 13 Aug), service_to is the day after it. Leave both empty to mean the row above.',
  'Dates: 2025-08-14 or 8/14/2025. Money: 12.34. A credit has a minus: -12.34, or 12.34 CR.',
  'record: read, line, bank or balance. statement_date, due_date and days go on any row of the statement, once.',
  'read: item is import, export or production; previous and current are the register; quantity is the kWh printed. After a meter exchange, one row per meter with read_from and read_to.',
  'read: dials and multiplier may stay empty (5 or as many as printed; 1). read_type is actual or estimated; empty means actual.',
  'line: item is import, export credit, credit used, incentive, customer charge, non-bypassable, demand, tax, minimum, true-up, adjustment, or other service (water, sewer, refuse, lighting, a tax on those, late fee, deposit, payment plan, donation).',
  'line: credit used is what the credit bank paid of this bill. A line that is printed but not part of the amount due has no in in_due. An export credit counts as no when the statement shows a bank in USD.',
  'bank: item is credit bank, or the bank’s id in your rate plan; previous is its opening, current its closing balance; unit is USD or kWh. Credit sent to other service points goes in quantity, what it saved on their bills in amount.',
  'balance: item is previous balance, payments or amount due. Each statement needs its amount due.',
  'balance: on a budget (levelized) plan also budget amount, budget balance (with a minus where the utility owes you) and, once a year, budget settlement. The lines stay the real charges.',
  'The rows below are an example with invented figures. Write over them.',
];

const CYCLE = { service_from: '2025-07-15', service_to: '2025-08-14' };

/** One cycle that adds up: 498 × 0.1684, 204 × 0.0920, and tax of 4 % on what is left after the credit. */
const EXAMPLE: Partial<Record<StatementColumn, string>>[] = [
  {
    ...CYCLE,
    record: 'read',
    item: 'import',
    meter: 'H-204417',
    previous: '41288',
    current: '41786',
    dials: '5',
    read_type: 'actual',
    quantity: '498',
    unit: 'kWh',
    statement_date: '2025-08-16',
    due_date: '2025-09-08',
    days: '30',
  },
  {
    ...CYCLE,
    record: 'read',
    item: 'export',
    meter: 'H-204417',
    previous: '9120',
    current: '9324',
    dials: '5',
    read_type: 'actual',
    quantity: '204',
    unit: 'kWh',
  },
  {
    ...CYCLE,
    record: 'line',
    item: 'import',
    label: 'Energy delivered',
    quantity: '498',
    unit: 'kWh',
    rate: '0.1684',
    amount: '83.86',
  },
  { ...CYCLE, record: 'line', item: 'customer charge', label: 'Customer charge', amount: '14.50' },
  {
    ...CYCLE,
    record: 'line',
    item: 'export credit',
    label: 'Credit for energy received',
    quantity: '204',
    unit: 'kWh',
    rate: '0.0920',
    amount: '-18.77',
    in_due: 'no',
  },
  { ...CYCLE, record: 'line', item: 'credit used', label: 'Credit bank used', amount: '-31.10' },
  {
    ...CYCLE,
    record: 'line',
    item: 'tax',
    label: 'City utility tax',
    quantity: '67.26',
    unit: 'USD',
    rate: '4%',
    amount: '2.69',
  },
  { ...CYCLE, record: 'bank', item: 'credit bank', previous: '12.33', current: '0.00', unit: 'USD' },
  { ...CYCLE, record: 'balance', item: 'previous balance', amount: '58.20' },
  { ...CYCLE, record: 'balance', item: 'payments', amount: '-58.20' },
  { ...CYCLE, record: 'balance', item: 'amount due', amount: '69.95' },
];

const cell = (text: string) => (/[",\n;]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/** The statement layout as a CSV to fill in: how to, the columns, and one example cycle with invented figures that add up. */
export function statementTemplateCsv(): string {
  const lines = [
    ...GUIDE.map((text) => cell(`# ${text}`)),
    STATEMENT_COLUMNS.join(','),
    ...EXAMPLE.map((row) => STATEMENT_COLUMNS.map((column) => cell(row[column] ?? '')).join(',')),
  ];
  return `${lines.join('\r\n')}\r\n`;
}
