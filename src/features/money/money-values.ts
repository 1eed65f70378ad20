import type * as z from 'zod/mini';
import type { receiptBody } from '#shared/api/money.ts';
import { type Cents, cents, parseDollars } from '#shared/units/cents.ts';
import { addDays, type Day, parseDay } from '#shared/units/day.ts';
import { parseKwh, type Wh } from '#shared/units/energy.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';

const NO_DATE = 'Write a date that exists.';
const NO_AMOUNT = 'Write an amount such as 244.93.';
const SOME_DAY = '1970-01-01' as Day;

/** `from` and `to` are the first and the last day paid for, as people write them; the body's `to` is the day after. */
export type ReceiptValues = {
  on: string;
  amountCents: string;
  note: string;
  from: string;
  to: string;
  quantityWh: string;
  documentId: string;
};

const NO_LAST_DAY = 'Write the last day it covers as well, or neither.';
const NO_FIRST_DAY = 'Write the first day it covers as well, or neither.';

export function readReceipt(values: ReceiptValues): Reading<z.infer<typeof receiptBody>> {
  const list = new FaultList();
  const from = list.optional(values.from, parseDay, 'from', NO_DATE);
  const last = list.optional(values.to, parseDay, 'to', NO_DATE);
  if (values.from.trim() !== '' && values.to.trim() === '') list.add('to', NO_LAST_DAY);
  if (values.from.trim() === '' && values.to.trim() !== '') list.add('from', NO_FIRST_DAY);
  if (from !== null && last !== null && last < from) {
    list.add('to', 'The last day it covers cannot come before the first.');
  }
  return list.reading({
    on: list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY),
    amountCents: list.needed(values.amountCents, parseDollars, 'amountCents', NO_AMOUNT, cents(0)),
    note: noteOf(values.note),
    from,
    to: last === null ? null : addDays(last, 1),
    quantityWh: list.optional(values.quantityWh, kwhFromZero, 'quantityWh', 'Write kWh such as 3,120.'),
    documentId: paperOf(values.documentId),
  });
}

function _aboveZero(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount > 0 ? amount : null;
}

function kwhFromZero(text: string): Wh | null {
  const amount = parseKwh(text);
  return amount !== null && amount >= 0 ? amount : null;
}

/** An empty choice is no paper. */
function paperOf(text: string): string | null {
  return text === '' ? null : text;
}

function noteOf(text: string): string | null {
  return text.trim() === '' ? null : text.trim();
}
