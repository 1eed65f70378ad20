import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { toCsv } from '#src/lib/csv.ts';

describe('a table exported as CSV', () => {
  it('starts no formula in a spreadsheet, and leaves negative numbers as numbers', () => {
    expect(toCsv([['=1+1', '+A1', '@x', '-20.14', '-A1']])).toBe("'=1+1,'+A1,'@x,-20.14,'-A1\r\n");
  });

  it('comes back as it went out, but for the apostrophe of the guard', () => {
    fc.assert(
      fc.property(fc.array(fc.array(fc.string(), { minLength: 2, maxLength: 4 }), { minLength: 1 }), (rows) => {
        const back = Papa.parse<string[]>(toCsv(rows).slice(0, -2), { newline: '\r\n', delimiter: ',' }).data;
        expect(back.map((row) => row.map((cell) => cell.replace(/^'/, '')))).toEqual(
          rows.map((row) => row.map((cell) => cell.replace(/^'/, ''))),
        );
      }),
    );
  });
});
