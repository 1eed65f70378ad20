import { describe, expect, it } from 'vitest';
import { readStatementCsv } from '#server/importers/statement-csv.ts';
import type { Fault } from '#shared/problem.ts';
import { faultWords } from '#src/features/log/fault-words.ts';

const fault = (given: Partial<Fault>): Fault => ({
  code: 'not-money',
  message: '',
  field: null,
  fileName: 'a.csv',
  row: null,
  column: null,
  found: null,
  ...given,
});

describe('a fault of a file', () => {
  it('says its place once, whether or not the message begins with it', () => {
    const said = { place: 'Row 3, amount', text: '“12,34x” is not an amount.' };
    expect(
      faultWords(fault({ row: 3, column: 'amount', message: 'Row 3, amount: “12,34x” is not an amount.' })),
    ).toEqual(said);
    expect(faultWords(fault({ row: 3, column: 'amount', message: 'Row 3: “12,34x” is not an amount.' }))).toEqual(said);
    expect(faultWords(fault({ row: 3, column: 'amount', message: '“12,34x” is not an amount.' }))).toEqual(said);
  });

  it('leaves a sentence about a row whole, and never takes row 3 for row 31', () => {
    const message = 'Row 31 has more cells than the header has columns.';
    expect(faultWords(fault({ row: 31, message }))).toEqual({ place: null, text: message });
    expect(faultWords(fault({ message: 'No row can be read.' }))).toEqual({
      place: 'The file',
      text: 'No row can be read.',
    });
  });

  it('says no place twice in what the reader of statements says of a spoilt file', () => {
    const text = [
      'service_from,service_to,record,item,amount,kind of thing',
      '2025-05-14,2025-06-13,line,import,12.34x,',
      '2025-05-14,2025-05-13,balance,amount due,80.00,',
      '2025-06-13,2025-07-14,line,nothing known,1.00,',
    ].join('\n');
    const file = { fileName: 'june.csv', bytes: new TextEncoder().encode(text) };
    const read = readStatementCsv(file, { keepGoodRows: true });
    const faults = read.ok ? read.value.faults : read.problem.faults;
    expect(faults.length).toBeGreaterThan(2);
    for (const one of faults) expect(faultWords(one).text).not.toMatch(/^Row \d+(, \w+)?:/);
  });
});
