import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readPastedUse } from '#src/features/setup/pasted-use.ts';
import { fractionOfPercent, percentOfFraction, plainDecimal } from '#src/lib/typed-values.ts';

describe('numbers as people type them', () => {
  it.each([
    ['5.49', '0.0549'],
    ['6.125 %', '0.06125'],
    ['100', '1'],
    ['0', '0'],
    ['.5', '0.005'],
    ['-3', '-0.03'],
    ['12.50', '0.125'],
  ])('takes %s percent as the fraction %s by moving the point', (typed, fraction) => {
    expect(fractionOfPercent(typed)).toBe(fraction);
  });

  it.each(['', 'five', '1.2.3', '5 % x'])('does not read “%s” as a percent', (typed) => {
    expect(fractionOfPercent(typed)).toBeNull();
  });

  it('brings every fraction back from its percent', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 999_999 }), fc.integer({ min: 0, max: 8 }), (digits, decimals) => {
        const padded = String(digits).padStart(decimals + 1, '0');
        const at = padded.length - decimals;
        const text = decimals === 0 ? padded : `${padded.slice(0, at)}.${padded.slice(at)}`;
        const plain = text.includes('.') ? text.replace(/\.?0+$/, '') : text;
        expect(fractionOfPercent(percentOfFraction(text))).toBe(plain);
      }),
    );
  });

  it.each([
    ['$1,284.5', '1284.5'],
    ['.1684', '0.1684'],
    ['\u22120.02', '-0.02'],
    ['007', '7'],
  ])('reads %s as %s', (typed, plain) => {
    expect(plainDecimal(typed)).toBe(plain);
  });
});

describe('use pasted from a spreadsheet', () => {
  it('reads tabs, commas and American dates, and passes over a head line', () => {
    const pasted =
      'From\tTo\tkWh\n2023-08-14\t2023-09-14\t1,284\n9/14/2023, 10/13/2023, 990.5\n"2023-10-13","2023-11-14","870 kWh"\n';
    expect(readPastedUse(pasted)).toEqual({
      rows: [
        { from: '2023-08-14', to: '2023-09-14', kwh: '1,284' },
        { from: '2023-09-14', to: '2023-10-13', kwh: '990.5' },
        { from: '2023-10-13', to: '2023-11-14', kwh: '870' },
      ],
      faults: [],
    });
  });

  it('leaves what it cannot read with its line number, and never skips it', () => {
    const { rows, faults } = readPastedUse(
      '2023-08-14\t2023-09-14\t1284\n2023-09-31\t2023-10-13\t9\n2023-10-13\t2023-10-13\t9\nx',
    );
    expect(rows).toHaveLength(1);
    expect(faults.map((fault) => fault.number)).toEqual([2, 3, 4]);
  });
});
