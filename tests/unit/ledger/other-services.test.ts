import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { cents } from '#shared/units/cents.ts';
import { serviceLine } from '#tests/support/budget-household.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';

/** The middle statement with more lines, which the utility adds to what it asks for and brings into the next. */
function withServices(lines: readonly PrintedLine[]): HouseholdFacts {
  const facts = buildHousehold();
  const more = lines.reduce((sum, line) => sum + line.amountCents, 0);
  const statements = facts.statements.map((statement, at) => {
    if (at === 1) {
      return {
        ...statement,
        lines: [...lines.slice(0, 2), ...statement.lines, ...lines.slice(2)],
        amountDueCents: cents(statement.amountDueCents + more),
      };
    }
    if (at !== 2) return statement;
    return {
      ...statement,
      previousBalanceCents: cents((statement.previousBalanceCents ?? 0) + more),
      paymentsCents: cents((statement.paymentsCents ?? 0) - more),
    };
  });
  return { ...facts, statements };
}

/** A city bill: three services, the tax on two of them, and what is no service at all. Labels as such bills word them; invented figures. */
const CITY_BILL = [
  serviceLine('Water, 5,200 gallons', 4115),
  serviceLine('Sewer service', 2800),
  serviceLine('Refuse and recycling', 1900),
  serviceLine('Tax on water and sewer', 277),
  serviceLine('Late fee', 350, 'adjustment'),
  serviceLine('Security deposit', 5000, 'fixed'),
  serviceLine('Payment plan instalment 3 of 6', 2500, 'adjustment'),
  serviceLine('Returned check charge', 3000, 'fixed'),
];

describe('a city bill that carries water, sewer and refuse', () => {
  const ledger = computeLedger(withServices(CITY_BILL), { today: BUILT_TODAY });
  const plain = computeLedger(buildHousehold(), { today: BUILT_TODAY });
  const cycle = ledger.cycles[1];

  test('agrees: the other services are due, and are no difference', () => {
    expect(ledger.cycles.map((one) => one.checks.filter((check) => check.verdict === 'differs'))).toEqual([[], [], []]);
    expect(ledger.cycles.map((one) => one.state)).toEqual(['balanced', 'balanced', 'balanced']);
  });

  test('leaves them out of the bill avoided, late fees and deposits too, whatever kind they were given', () => {
    const avoided = (of: typeof ledger) => of.entries.filter((entry) => entry.book === 'billAvoided');
    expect(avoided(ledger)).toEqual(avoided(plain));
  });

  test('keeps them apart on the facing pages, with a total of their own', () => {
    const labels = cycle?.facing.map((line) => line.label) ?? [];
    expect(labels.slice(labels.indexOf('Electric charges'))).toEqual([
      'Electric charges',
      ...CITY_BILL.map((line) => line.label),
      'Other services',
      'Due',
    ]);
    const amount = (key: string) => cycle?.facing.find((line) => line.key === key)?.billed?.amountCents;
    expect(amount('subtotal:other')).toBe(4115 + 2800 + 1900 + 277 + 350 + 5000 + 2500 + 3000);
    expect((amount('subtotal:electric') ?? 0) + (amount('subtotal:other') ?? 0)).toBe(amount('due'));
  });

  test('shows each figure with a working that comes to it', () => {
    expect(everyWorking(ledger).filter((one) => !one.agrees)).toEqual([]);
  });

  test('shows one service without a total of its own, and none where there is none', () => {
    const one = computeLedger(withServices(CITY_BILL.slice(0, 1)), { today: BUILT_TODAY }).cycles[1];
    expect(one?.facing.map((line) => line.key).filter((key) => key.startsWith('subtotal'))).toEqual([
      'subtotal:electric',
    ]);
    expect(plain.cycles[1]?.facing.some((line) => line.key.startsWith('subtotal'))).toBe(false);
  });
});
