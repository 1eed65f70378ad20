import type { ReadChannel, RegisterRead } from '#shared/facts/papers.ts';
import type { Day } from '#shared/units/day.ts';
import { parseKwh, type Wh } from '#shared/units/energy.ts';
import type { RowReader } from './statement-row.ts';
import { channelOf, readTypeOf } from './statement-words.ts';

export type ReadRecord = { record: 'read'; channel: ReadChannel; read: RegisterRead | null; printedWh: Wh | null };

/** Dials of a register where neither the row nor its figures say more (common practice, no source). */
const SHORTEST_DIALS = 5;

/** Reads a row of a meter: its two figures, or only the kWh printed for it. Null with faults noted when it cannot be read. */
export function readOf(cells: RowReader, from: Day, to: Day): ReadRecord | null {
  const channel = cells.word('item', channelOf, 'import, export or production');
  cells.need('item', 'a read needs import, export or production in “item”.');
  const previous = cells.number('previous');
  const current = cells.number('current');
  const printed = cells.number('quantity');
  const multiplier = cells.number('multiplier') ?? '1';
  const type = cells.word('read_type', readTypeOf, 'actual or estimated') ?? 'actual';
  const readFrom = cells.date('read_from') ?? from;
  const readTo = cells.date('read_to') ?? to;
  const statedDials = cells.whole('dials', 3, 9);
  if (cells.faults.length > 0 || channel === null) return null;

  if (readFrom < from || readTo > to) {
    const column = readFrom < from ? 'read_from' : 'read_to';
    const day = readFrom < from ? readFrom : readTo;
    cells.fault(
      column,
      'outside-cycle',
      `Row ${cells.row}: the read of ${day} lies outside its cycle, ${from} to ${to}.`,
    );
  }
  if (readFrom >= readTo) {
    cells.fault('read_to', 'dates-order', `Row ${cells.row}: the read ends on ${readTo}, not after ${readFrom}.`);
  }
  if ((previous === null) !== (current === null)) {
    const column = previous === null ? 'previous' : 'current';
    cells.need(column, 'a read has both its previous and its current figure, or neither.');
  }
  if (previous === null && current === null)
    cells.need('quantity', 'a read needs its two figures, or the kWh printed for it.');
  const digits = Math.max(
    ...[cells.text('previous'), cells.text('current')].map(
      (text) => (/\d+/.exec(text.replace(/[,' ]/g, ''))?.[0] ?? '').length,
    ),
  );
  const dials = statedDials ?? Math.max(SHORTEST_DIALS, digits);
  if (dials > 9 || (statedDials !== null && digits > statedDials)) {
    cells.fault(
      'dials',
      'dials',
      `Row ${cells.row}: a read of ${digits} digits does not fit a register of ${Math.min(dials, 9)} dials.`,
    );
  }
  for (const column of ['previous', 'current', 'multiplier'] as const) {
    if (cells.number(column)?.startsWith('-'))
      cells.fault(column, 'below-zero', `Row ${cells.row}: ${column} cannot be below zero.`);
  }
  if (cells.faults.length > 0) return null;
  const read =
    previous === null || current === null
      ? null
      : {
          meter: cells.text('meter'),
          channel,
          from: readFrom,
          to: readTo,
          previous,
          current,
          dials,
          multiplier,
          type,
          row: cells.row,
        };
  return { record: 'read', channel, read, printedWh: printed === null ? null : parseKwh(printed) };
}
