import type { Fault } from '#shared/problem.ts';
import type { Cents } from '#shared/units/cents.ts';
import type { Day } from '#shared/units/day.ts';
import type { DecimalText } from '#shared/units/rate-text.ts';
import { fileFault, shortened } from './faults.ts';
import { type DecimalMark, readDate, readMoney, readNumber } from './statement-cells.ts';
import type { StatementColumn, StatementHeader } from './statement-columns.ts';

/**
 * One row while it is read. Each getter gives null for an empty cell, and for a cell that cannot be read it notes a fault: so a row is good
 * exactly when `faults` stayed empty.
 */
export type RowReader = {
  row: number;
  faults: Fault[];
  text: (column: StatementColumn) => string;
  money: (column: StatementColumn) => Cents | null;
  number: (column: StatementColumn) => DecimalText | null;
  date: (column: StatementColumn) => Day | null;
  whole: (column: StatementColumn, least: number, most: number) => number | null;
  /** A word from a list: `read` gives its meaning or null, `offer` names what may stand there. */
  word: <T>(column: StatementColumn, read: (text: string) => T | null, offer: string | (() => string)) => T | null;
  fault: (column: StatementColumn, code: string, message: string) => void;
  /** Notes a fault when a cell that the record needs is empty. */
  need: (column: StatementColumn, what: string) => void;
};

const quoted = (text: string) => `“${shortened(text)}”`;

export function rowReader(
  fileName: string,
  row: number,
  cells: string[],
  header: StatementHeader,
  mark: DecimalMark,
): RowReader {
  const faults: Fault[] = [];
  const text = (column: StatementColumn) => (cells[header.at.get(column) ?? -1] ?? '').trim();
  const nameOf = (column: StatementColumn) => header.cells[header.at.get(column) ?? -1] ?? column;
  const fault = (column: StatementColumn, code: string, message: string) => {
    const found = text(column);
    faults.push(
      fileFault(fileName, code, message, { row, column: nameOf(column), found: found === '' ? null : found }),
    );
  };
  function cell<T>(
    column: StatementColumn,
    read: (found: string) => T | null,
    code: string,
    wrong: string | (() => string),
  ): T | null {
    const found = text(column);
    if (found === '') return null;
    const value = read(found);
    if (value === null)
      fault(
        column,
        code,
        `Row ${row}, ${nameOf(column)}: ${quoted(found)} ${typeof wrong === 'string' ? wrong : wrong()}`,
      );
    return value;
  }
  const example = mark === ',' ? ['12,34', '0,1684'] : ['12.34', '0.1684'];
  return {
    row,
    faults,
    text,
    fault,
    money: (column) =>
      cell(
        column,
        (found) => readMoney(found, mark),
        'not-money',
        `is not an amount of money. Write it like ${example[0]} or −${example[0]}.`,
      ),
    number: (column) =>
      cell(
        column,
        (found) => readNumber(found, mark),
        'not-number',
        `is not a number. Write it like 498 or ${example[1]}.`,
      ),
    date: (column) => cell(column, readDate, 'not-date', 'is not a date. Write it like 2025-08-14 or 8/14/2025.'),
    whole: (column, least, most) =>
      cell(
        column,
        (found) => (/^\d{1,4}$/.test(found) && Number(found) >= least && Number(found) <= most ? Number(found) : null),
        'not-whole',
        `is not a whole number from ${least} to ${most}.`,
      ),
    word: (column, read, offer) =>
      cell(column, read, 'not-known', () => `is not understood. Write ${typeof offer === 'string' ? offer : offer()}.`),
    need: (column, what) => {
      if (text(column) === '') fault(column, 'missing-value', `Row ${row}: ${what}`);
    },
  };
}
