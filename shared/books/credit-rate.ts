import { type Cents, cents } from '../units/cents.ts';
import type { DecimalText } from '../units/rate-text.ts';

/** Rows of 26 U.S.C. 25D(g) and the laws before it, by year placed in service; a year outside every row earns nothing. */
const RATES: readonly { from: number; to: number; rate: DecimalText; law: string; capCents: Cents | null }[] = [
  // 30 % with at most $2,000 a year for solar electric property: P.L. 109-58 §1335 (rate and cap from memory).
  { from: 2006, to: 2008, rate: '0.30', law: 'P.L. 109-58 §1335', capCents: cents(200_000) },
  { from: 2009, to: 2016, rate: '0.30', law: 'P.L. 110-343 div. B §106', capCents: null },
  { from: 2017, to: 2019, rate: '0.30', law: 'P.L. 114-113 §304', capCents: null },
  { from: 2020, to: 2021, rate: '0.26', law: 'P.L. 116-260 §148', capCents: null },
  // Ends for installations completed after 2025-12-31: P.L. 119-21 §70506.
  { from: 2022, to: 2025, rate: '0.30', law: 'P.L. 117-169 §13302', capCents: null },
];

/** The rate of the credit for a roof placed in service in a year, as fraction text; "0" where there is no credit. */
export function creditRate(year: number): DecimalText {
  return rowOf(year)?.rate ?? '0';
}

/** The most the credit of one year may be, where the law sets such a sum. */
export function creditCapCents(year: number): Cents | null {
  return rowOf(year)?.capCents ?? null;
}

/** The law that sets the year's rate, for a working's source. */
export function creditLaw(year: number): string {
  if (year > 2025) return 'P.L. 119-21 §70506';
  return rowOf(year)?.law ?? 'no credit in this year';
}

function rowOf(year: number) {
  return RATES.find((row) => year >= row.from && year <= row.to);
}
