import { describe, expect, it } from 'vitest';
import { creditCapCents, creditLaw, creditRate } from '#shared/books/credit-rate.ts';

// 26 U.S.C. 25D(g) and the laws before it; the years of 2006 to 2008 and their cap from memory.
const LAWS: [first: number, last: number, rate: string, law: string, cap: number | null][] = [
  [2006, 2008, '0.30', 'P.L. 109-58 §1335', 200_000],
  [2009, 2016, '0.30', 'P.L. 110-343 div. B §106', null],
  [2017, 2019, '0.30', 'P.L. 114-113 §304', null],
  [2020, 2021, '0.26', 'P.L. 116-260 §148', null],
  [2022, 2025, '0.30', 'P.L. 117-169 §13302', null],
];

describe('the rate of a year', () => {
  it('is that of the law in force, from its first year to its last', () => {
    for (const [first, last, rate, law, cap] of LAWS) {
      for (let year = first; year <= last; year += 1) {
        expect([creditRate(year), creditLaw(year), creditCapCents(year)], String(year)).toEqual([rate, law, cap]);
      }
    }
  });

  it('is nothing before there was a credit, and after it ended', () => {
    expect([creditRate(2005), creditLaw(2005), creditCapCents(2005)]).toEqual(['0', 'no credit in this year', null]);
    expect([creditRate(2026), creditLaw(2026), creditCapCents(2026)]).toEqual(['0', 'P.L. 119-21 §70506', null]);
  });
});
