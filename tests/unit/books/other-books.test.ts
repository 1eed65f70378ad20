import { describe, expect, it } from 'vitest';
import { billAvoidedEntry } from '#shared/books/bill-avoided.ts';
import { costEntries } from '#shared/books/costs.ts';
import { eligibleDays, incentiveEarned, incentiveOwed, incentiveReceived } from '#shared/books/incentive.ts';
import type { CostFacts } from '#shared/facts/house.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { incentiveOf } from './facts.ts';

const cycle = (from: string, to: string, kwh: number | null, billCredit: number | null = null) => ({
  from: day(from),
  to: day(to),
  productionWh: kwh === null ? null : wh(kwh * 1000),
  billCreditCents: billCredit === null ? null : cents(billCredit),
});

describe('the production incentive', () => {
  const cycles = [
    cycle('2024-12-14', '2025-01-14', 310),
    cycle('2025-01-14', '2025-02-14', 690),
    cycle('2025-02-14', '2025-03-14', null),
  ];

  it('is earned on the days of a cycle that lie in its term, both ends included, and rounded once', () => {
    const entries = incentiveEarned(incentiveOf(), cycles);
    // 10 to 13 January: 4 of 31 days; 310 × 0.045 × 4 / 31 = 1.80
    expect(entries.map((entry) => [entry.date, entry.amountCents, entry.basis])).toEqual([
      ['2025-01-14', 180, 'memo'],
      ['2025-02-14', 3_105, 'memo'],
    ]);
    for (const entry of entries) expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
  });

  it('counts the last day of the term and not the one after', () => {
    expect(eligibleDays(incentiveOf(), day('2033-01-01'), day('2033-02-01'))).toBe(9);
    expect(eligibleDays(incentiveOf(), day('2033-01-10'), day('2033-02-01'))).toBe(0);
  });

  it('may be negative: a rate below zero is a charge on production', () => {
    expect(incentiveEarned(incentiveOf({ ratePerKwh: '-0.01' }), cycles)[1]?.amountCents).toBe(-690);
  });

  it('is received on the days recorded, and owed is what was earned less that', () => {
    const received = [
      {
        id: 'r1',
        on: day('2025-02-20'),
        amountCents: cents(2_000),
        note: null,
        from: null,
        to: null,
        quantityWh: null,
        documentId: null,
      },
    ];
    const incentive = incentiveOf({ received });
    expect(incentiveReceived(incentive, cycles)).toMatchObject([
      { date: '2025-02-20', amountCents: 2_000, basis: 'cash' },
    ]);
    expect(incentiveOwed(incentive, cycles, day('2025-02-19')).amountCents).toBe(3_285);
    const owed = incentiveOwed(incentive, cycles, day('2025-02-20'));
    expect(owed.amountCents).toBe(1_285);
    expect(evaluateWorking(owed.working).eq(usdOf(owed.amountCents))).toBe(true);
  });

  it('names a receipt by its note, else by who paid it', () => {
    const receipt = {
      id: 'r1',
      on: day('2025-02-20'),
      amountCents: cents(2_000),
      note: null,
      from: null,
      to: null,
      quantityWh: null,
      documentId: null,
    };
    const label = (changes: Parameters<typeof incentiveOf>[0]) =>
      incentiveReceived(incentiveOf({ received: [receipt], ...changes }), cycles)[0]?.label;
    expect(label({})).toBe('Incentive from State programme');
    expect(label({ payer: '' })).toBe('Incentive from the payer');
    expect(label({ received: [{ ...receipt, note: 'Second quarter' }] })).toBe('Second quarter');
  });

  it('is below zero when more came than was earned', () => {
    const received = [
      {
        id: 'r1',
        on: day('2025-02-20'),
        amountCents: cents(9_000),
        note: null,
        from: null,
        to: null,
        quantityWh: null,
        documentId: null,
      },
    ];
    expect(incentiveOwed(incentiveOf({ received }), cycles, day('2025-03-01')).amountCents).toBe(3_285 - 9_000);
  });

  it('paid inside the bill, is received on the cycle’s close as the statement credits it', () => {
    const entries = incentiveReceived(incentiveOf({ paidAs: 'billCredit' }), [
      cycle('2025-01-14', '2025-02-14', 690, 3_105),
      cycle('2025-02-14', '2025-03-14', 700),
    ]);
    expect(entries).toMatchObject([{ date: '2025-02-14', amountCents: 3_105, kind: 'billCredit' }]);
  });
});

describe('the bill avoided', () => {
  it('is the bill without the roof less the bill as it was, dated on the close', () => {
    const entry = billAvoidedEntry({
      from: day('2025-08-14'),
      to: day('2025-09-14'),
      withoutRoofCents: cents(24_810),
      asItWasCents: cents(5_201),
      method: 'measured',
      estimated: false,
    });
    expect(entry).toMatchObject({ date: '2025-09-14', amountCents: 19_609, basis: 'avoided', estimated: false });
    expect(evaluateWorking(entry.working).toString()).toBe('196.09');
  });

  it('is called an estimate where the use is not measured', () => {
    const common = {
      from: day('2025-08-14'),
      to: day('2025-09-14'),
      withoutRoofCents: cents(1),
      asItWasCents: cents(2),
    };
    expect(billAvoidedEntry({ ...common, method: 'sameMonthBefore', estimated: false }).estimated).toBe(true);
  });
});

describe('costs and incomes', () => {
  const cost = (kind: CostFacts['kind'], on = '2025-05-01', documentId: string | null = null): CostFacts => ({
    id: kind,
    on: day(on),
    kind,
    label: kind,
    amountCents: cents(10_000),
    documentId,
    every: null,
    until: null,
  });

  it('are money out, incomes money in, each in its book', () => {
    const kinds = ['signing', 'repair', 'propertyTax', 'rebate', 'srec'] as const;
    const entries = costEntries(
      kinds.map((kind) => cost(kind)),
      day('2025-12-31'),
    );
    expect(entries.map((entry) => [entry.book, entry.kind, entry.amountCents])).toEqual([
      ['costs', 'signing', -10_000],
      ['upkeep', 'repair', -10_000],
      ['upkeep', 'propertyTax', -10_000],
      ['costs', 'rebate', 10_000],
      ['costs', 'srec', 10_000],
    ]);
    for (const entry of entries) expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
  });

  it('count from their own day on', () => {
    expect(costEntries([cost('permit', '2025-05-02')], day('2025-05-01'))).toEqual([]);
  });

  it('name their paper where there is one', () => {
    const [entry] = costEntries([cost('permit', '2025-05-01', 'd1')], day('2025-05-01'), [
      { id: 'd1', fileName: 'permit.pdf' },
    ]);
    expect(entry?.working.inputs[0]?.source).toMatchObject({ kind: 'document', fileName: 'permit.pdf' });
  });
});
