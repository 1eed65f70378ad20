import type { PrintedBank, PrintedLine } from '#shared/facts/papers.ts';
import type { Cents } from '#shared/units/cents.ts';
import type { Day } from '#shared/units/day.ts';
import { nearestName } from './faults.ts';
import { KNOWN_ITEMS, keptApart, kindOf, OFFERED_ITEMS } from './statement-kinds.ts';
import { type ReadRecord, readOf } from './statement-reads.ts';
import type { RowReader } from './statement-row.ts';
import { type BalanceItem, balanceItemOf, bankIdOf, plainWords, recordOf, unitOf, yesOrNo } from './statement-words.ts';

/** What one row says about its cycle. `inDue` is null where the row leaves it to the rule in `statement-cycles.ts`. */
export type RecordOfRow =
  | { record: 'statement' }
  | ReadRecord
  | { record: 'line'; line: Omit<PrintedLine, 'inDue'> & { inDue: boolean | null } }
  | { record: 'bank'; bank: PrintedBank }
  | { record: 'balance'; item: BalanceItem; amountCents: Cents };

const LONGEST_LABEL = 160;
const KWH_KINDS = new Set<PrintedLine['kind']>(['import', 'export', 'nonbypassable', 'incentive']);

/** What may stand in `item`, the nearest word first: said only where a word was not understood. */
function kindOffer(found: string): string {
  const near = nearestName(plainWords(found), KNOWN_ITEMS);
  const offer = `one of: ${OFFERED_ITEMS.join(', ')}`;
  return near === null ? offer : `“${near}”, or ${offer}`;
}

function lineOf(cells: RowReader): RecordOfRow | null {
  cells.need('item', 'a line needs what it is in “item”, such as import or customer charge.');
  cells.need('amount', 'a line needs its amount. A credit is written with a minus: −12.34.');
  if (balanceItemOf(cells.text('item'))?.startsWith('budget')) {
    const message = `Row ${cells.row}: write “balance” in “record” for the budget amount, its balance and its settlement; the lines are the real charges.`;
    cells.fault('record', 'wrong-record', message);
    return null;
  }
  const kind = cells.word('item', kindOf, () => kindOffer(cells.text('item')));
  const amountCents = cells.money('amount');
  let quantity = cells.number('quantity');
  let unit = cells.word('unit', unitOf, 'kWh, kW, day, cycle or USD');
  const rate = cells.number('rate');
  const inDue = cells.word('in_due', yesOrNo, 'yes or no');
  const component = cells.text('component');
  const label = cells.text('label') || cells.text('item');
  if (label.length > LONGEST_LABEL)
    cells.fault('label', 'too-long', `Row ${cells.row}: the label has more than ${LONGEST_LABEL} letters.`);
  if (kind === 'previousBalance' || kind === 'payment') {
    cells.fault(
      'record',
      'wrong-record',
      `Row ${cells.row}: write “balance” in “record” for a previous balance or a payment.`,
    );
  }
  if ((kind === 'export' || kind === 'credit') && amountCents !== null && amountCents > 0) {
    const message = `Row ${cells.row}, amount: a credit is written with a minus, −${cells.text('amount')}. A charge on exports is an adjustment.`;
    cells.fault('amount', 'credit-sign', message);
  }
  if (cells.faults.length > 0 || kind === null || amountCents === null) return null;
  // Some bills print sent-out kWh with a minus; the direction is already in the kind.
  if (kind === 'export' && quantity?.startsWith('-')) quantity = quantity.slice(1);
  if (unit === null && quantity !== null && KWH_KINDS.has(kind)) unit = 'kWh';
  return {
    record: 'line',
    line: {
      component: component === '' ? null : component,
      kind: keptApart(kind, label),
      label,
      quantity,
      unit,
      rate,
      amountCents,
      inDue,
      row: cells.row,
    },
  };
}

function bankOf(cells: RowReader): RecordOfRow | null {
  const bank = bankIdOf(cells.text('item'));
  if (bank === null) {
    cells.fault(
      'item',
      'not-known',
      `Row ${cells.row}: write “credit bank”, or the bank’s id in the rate plan, in “item”.`,
    );
  }
  const open = cells.number('previous');
  const close = cells.number('current');
  const stated = cells.word(
    'unit',
    (text) => {
      const unit = unitOf(text);
      return unit === 'kWh' || unit === 'USD' ? unit : null;
    },
    'kWh or USD',
  );
  const dollars = `${cells.text('previous')}${cells.text('current')}`.includes('$');
  const unit = stated ?? (dollars ? 'USD' : null);
  if (unit === null && cells.text('unit') === '') cells.need('unit', 'a bank needs kWh or USD in “unit”.');
  if (open === null && close === null) {
    cells.need('current', 'a bank needs its opening balance in “previous”, its closing balance in “current”, or both.');
  }
  const sentOut = cells.number('quantity');
  const sentValueCents = cells.money('amount');
  if (sentOut?.startsWith('-')) {
    cells.fault('quantity', 'below-zero', `Row ${cells.row}: what went to other service points cannot be below zero.`);
  }
  if (cells.faults.length > 0 || bank === null || unit === null) return null;
  return { record: 'bank', bank: { bank, unit, open, close, sentOut, sentValueCents, row: cells.row } };
}

function balanceOf(cells: RowReader): RecordOfRow | null {
  cells.need('item', 'a balance needs previous balance, payments or amount due in “item”.');
  cells.need('amount', 'a balance needs its amount.');
  const offer = 'previous balance, payments, amount due, budget amount, budget balance or budget settlement';
  const item = cells.word('item', balanceItemOf, offer);
  const amountCents = cells.money('amount');
  if (cells.faults.length > 0 || item === null || amountCents === null) return null;
  return { record: 'balance', item, amountCents };
}

/** Reads what a row says; null with faults noted on `cells` when it cannot be read. */
export function readRecord(cells: RowReader, from: Day, to: Day): RecordOfRow | null {
  cells.need('record', 'write statement, read, line, bank or balance in “record”.');
  const record = cells.word('record', recordOf, 'statement, read, line, bank or balance');
  switch (record) {
    case 'read':
      return readOf(cells, from, to);
    case 'line':
      return lineOf(cells);
    case 'bank':
      return bankOf(cells);
    case 'balance':
      return balanceOf(cells);
    case 'statement':
      return { record };
    case null:
      return null;
  }
}
