import fc from 'fast-check';
import { TWO_SEASONS } from './plans.ts';

export const PERIODS = [
  { id: 'peak', label: 'Peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' },
];

/** Days on which prices may change: some fall inside the cycles of `usages`. */
const CHANGE_DAYS = ['2026-01-10', '2026-02-01', '2026-06-01', '2026-06-20', '2026-07-04'];

/** What a price goes by. */
export type By = { season: boolean; period: boolean; tiers: number };

export const PLAIN: By = { season: false, period: false, tiers: 0 };

/** Text of a price of up to `most`, to five places. */
export function rate(most: number, least = 0): fc.Arbitrary<string> {
  return fc
    .integer({ min: least * 100_000, max: most * 100_000 })
    .map((value) => `${value < 0 ? '-' : ''}${Math.floor(Math.abs(value) / 100_000)}.${fiveDigits(Math.abs(value))}`);
}

function fiveDigits(value: number): string {
  return String(value % 100_000).padStart(5, '0');
}

/** Rows with one price from 2025 on and up to two changes, for each of the names an item is priced by. */
export function rows(most: number, by: By = PLAIN, least = 0): fc.Arbitrary<object[]> {
  const seasons = by.season ? TWO_SEASONS.map(({ id }) => ({ season: id })) : [{}];
  const periods = by.period ? PERIODS.map(({ id }) => ({ period: id })) : [{}];
  const tiers = by.tiers > 0 ? Array.from({ length: by.tiers }, (_, at) => ({ tier: at + 1 })) : [{}];
  const keys = seasons.flatMap((season) =>
    periods.flatMap((period) => tiers.map((tier) => ({ ...season, ...period, ...tier }))),
  );
  return fc
    .subarray(CHANGE_DAYS, { maxLength: 2 })
    .chain((days) =>
      fc.tuple(
        ...['2025-01-01', ...days].flatMap((from) =>
          keys.map((key) => rate(most, least).map((price) => ({ from, ...key, rate: price }))),
        ),
      ),
    );
}
