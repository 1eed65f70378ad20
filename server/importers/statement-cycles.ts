import type { StatementBody } from '#shared/api/cycles.ts';
import type { Fault } from '#shared/problem.ts';
import { type Cents, cents } from '#shared/units/cents.ts';
import { addDays, type Day, daysBetween } from '#shared/units/day.ts';
import { type Wh, wh } from '#shared/units/energy.ts';
import { fileFault } from './faults.ts';
import type { RecordOfRow } from './statement-records.ts';
import type { BalanceItem } from './statement-words.ts';

/** Dates and days that may stand on any row of a cycle; null where the row leaves them empty. */
export type CycleFacts = { statementOn: Day | null; dueOn: Day | null; printedDays: number | null };

/** The good rows of one cycle, in file order. `lostRows` counts rows of the cycle that could not be read. */
export type CycleRows = {
  from: Day;
  to: Day;
  rows: { row: number; what: RecordOfRow; facts: CycleFacts }[];
  firstRow: number;
  lastRow: number;
  lostRows: number;
};

/** A longer cycle is a slip in a year far more often than a bill (common practice, no source; the longest ordinary cycle is a quarter). */
const LONGEST_CYCLE_DAYS = 190;
/** A due date further off than this is a slip in a year. */
const LONGEST_TERM_DAYS = 190;

const ITEM_WORDS: Record<BalanceItem, string> = {
  previousBalance: 'the previous balance',
  payments: 'the payments',
  amountDue: 'the amount due',
  budgetAmount: 'the budget amount',
  budgetBalance: 'the budget balance',
  budgetSettlement: 'the budget settlement',
};

function budgetOf(stated: ReadonlyMap<BalanceItem, { amountCents: Cents }>): StatementBody['budget'] {
  const instalment = stated.get('budgetAmount');
  if (instalment === undefined) return null;
  return {
    instalmentCents: instalment.amountCents,
    balanceCents: stated.get('budgetBalance')?.amountCents ?? null,
    settledCents: stated.get('budgetSettlement')?.amountCents ?? null,
  };
}

/** Faults of a cycle's two dates, found before its rows are read. */
export function cycleDateFault(fileName: string, row: number, from: Day, to: Day): Fault | null {
  const days = daysBetween(from, to);
  if (days > 0 && days <= LONGEST_CYCLE_DAYS) return null;
  const message =
    days > 0
      ? `Row ${row}: a cycle from ${from} to ${to} would have ${days} days. Check the years.`
      : `Row ${row}: the cycle ends on ${to}, not after ${from}. service_from is the earlier read date, service_to the later.`;
  return fileFault(fileName, 'dates-order', message, { row, column: 'service_to', found: to });
}

function kwhOf(rows: CycleRows['rows'], channel: 'import' | 'export' | 'production'): Wh | null {
  let total: number | null = null;
  for (const { what } of rows) {
    if (what.record === 'read' && what.channel === channel && what.printedWh !== null)
      total = (total ?? 0) + what.printedWh;
  }
  return total === null ? null : wh(total);
}

/**
 * Puts a cycle's rows together. A balance or date that stands twice is a fault, and the first counts. Without a good amount due there is
 * no statement (null). An export line is part of the amount due unless its row or a USD bank in the same cycle says otherwise.
 */
export function assembleCycle(
  fileName: string,
  cycle: CycleRows,
): { statement: StatementBody | null; faults: Fault[] } {
  const faults: Fault[] = [];
  const fault = (code: string, row: number, column: string, message: string) =>
    faults.push(fileFault(fileName, code, `Row ${row}: ${message}`, { row, column }));

  const facts: CycleFacts = { statementOn: null, dueOn: null, printedDays: null };
  function take<K extends keyof CycleFacts>(key: K, value: CycleFacts[K], row: number, column: string) {
    if (value === null) return;
    if (facts[key] === null) facts[key] = value;
    else if (facts[key] !== value)
      fault('two-values', row, column, `${column} is ${value} here and ${facts[key]} above. Keep one.`);
  }
  for (const { row, facts: found } of cycle.rows) {
    take('statementOn', found.statementOn, row, 'statement_date');
    take('dueOn', found.dueOn, row, 'due_date');
    take('printedDays', found.printedDays, row, 'days');
  }
  const lastRow = cycle.lastRow;
  if (facts.statementOn !== null && facts.statementOn < cycle.from) {
    fault(
      'outside-cycle',
      lastRow,
      'statement_date',
      `the statement is dated ${facts.statementOn}, before its cycle begins (${cycle.from}).`,
    );
  }
  if (facts.dueOn !== null && (facts.dueOn < cycle.from || facts.dueOn > addDays(cycle.to, LONGEST_TERM_DAYS))) {
    fault(
      'outside-cycle',
      lastRow,
      'due_date',
      `the due date ${facts.dueOn} does not belong to the cycle ${cycle.from} to ${cycle.to}.`,
    );
  }

  let payments: Cents | null = null;
  const stated = new Map<BalanceItem, { amountCents: Cents; row: number }>();
  const lines: Extract<RecordOfRow, { record: 'line' }>['line'][] = [];
  const body = { reads: [] as StatementBody['reads'], banks: [] as StatementBody['banks'] };
  for (const { row, what } of cycle.rows) {
    if (what.record === 'line') lines.push(what.line);
    if (what.record === 'bank') {
      if (body.banks.some((bank) => bank.bank === what.bank.bank)) {
        fault('twice', row, 'item', `the bank “${what.bank.bank}” stands twice in this cycle. Keep one row for it.`);
      } else body.banks.push(what.bank);
    }
    if (what.record === 'read' && what.read !== null) {
      const read = what.read;
      const same = body.reads.find(
        (other) =>
          other.channel === read.channel && other.meter === read.meter && other.from < read.to && read.from < other.to,
      );
      if (same) {
        fault(
          'twice',
          row,
          'item',
          `the ${read.channel} register${read.meter === '' ? '' : ` of meter ${read.meter}`} is read twice over the same days (row ${same.row}). After a meter exchange, fill in read_from and read_to.`,
        );
      } else body.reads.push(read);
    }
    if (what.record === 'balance') {
      // A payment takes off what is owed, whichever sign the statement prints.
      if (what.item === 'payments') payments = cents((payments ?? 0) - Math.abs(what.amountCents));
      else if (!stated.has(what.item)) stated.set(what.item, { amountCents: what.amountCents, row });
      else fault('twice', row, 'item', `${ITEM_WORDS[what.item]} stands twice in this cycle. Keep one.`);
    }
  }
  const amountDue = stated.get('amountDue');
  if (amountDue === undefined) {
    const message = `the cycle ${cycle.from} to ${cycle.to} has no amount due. Add a row with record “balance” and item “amount due”.`;
    fault('no-amount-due', cycle.firstRow, 'item', message);
    return { statement: null, faults };
  }
  const budget = budgetOf(stated);
  const loose = stated.get('budgetBalance') ?? stated.get('budgetSettlement');
  if (budget === null && loose !== undefined) {
    fault(
      'no-budget-amount',
      loose.row,
      'item',
      'a budget balance or settlement needs the budget amount in a row too.',
    );
  }
  if (budget !== null && !lines.some((line) => line.kind !== 'otherService')) {
    const message = 'with a budget amount, add the real charges as lines: the amount due does not say them.';
    fault('budget-without-lines', stated.get('budgetAmount')?.row ?? lastRow, 'item', message);
    return { statement: null, faults };
  }
  const intoBank = body.banks.some((bank) => bank.unit === 'USD');
  const statement: StatementBody = {
    from: cycle.from,
    to: cycle.to,
    ...facts,
    reads: body.reads,
    importWh: kwhOf(cycle.rows, 'import'),
    exportWh: kwhOf(cycle.rows, 'export'),
    productionWh: kwhOf(cycle.rows, 'production'),
    lines: lines.map((line) => ({ ...line, inDue: line.inDue ?? !(line.kind === 'export' && intoBank) })),
    banks: body.banks,
    previousBalanceCents: stated.get('previousBalance')?.amountCents ?? null,
    paymentsCents: payments,
    amountDueCents: amountDue.amountCents,
    budget,
  };
  return { statement, faults };
}
