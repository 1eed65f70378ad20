import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { leaseEntries, leaseFlows, leaseMissing, leasePayment, purchaseOfPeriod } from '#shared/books/lease.ts';
import type { LeaseFacts } from '#shared/facts/finance.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, addMonths, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';

function leaseOf(changes: Partial<LeaseFacts> = {}): LeaseFacts {
  return {
    kind: 'lease',
    company: 'Roof Lettings',
    firstPaymentOn: day('2024-01-31'),
    termMonths: 240,
    monthlyCents: cents(9_999),
    ratePerKwh: null,
    yearlyRise: '0.029',
    documentId: null,
    ...changes,
  };
}
const power = (changes: Partial<LeaseFacts> = {}) =>
  leaseOf({
    kind: 'powerPurchase',
    monthlyCents: cents(0),
    ratePerKwh: '0.1195',
    firstPaymentOn: day('2024-02-14'),
    ...changes,
  });

const cycle = (from: string, to: string, kwh: number | null) => ({
  from: day(from),
  to: day(to),
  productionWh: kwh === null ? null : wh(kwh * 1000),
});

describe('a lease', () => {
  it('is paid each month of its term, on the last day of a short month, and rises once a year', () => {
    const entries = leaseEntries(leaseOf({ termMonths: 14 }), [], day('2030-01-01'));
    expect(entries.map(({ date }) => date).slice(0, 3)).toEqual(['2024-01-31', '2024-02-29', '2024-03-31']);
    expect(entries).toHaveLength(14);
    // 99.99 × 1.029 = 102.88971
    expect(entries.map(({ amountCents }) => amountCents)).toEqual([...Array(12).fill(-9_999), -10_289, -10_289]);
    expect(entries.at(-1)).toMatchObject({
      book: 'loan',
      kind: 'payment',
      label: 'Lease payment 14 of 14',
      basis: 'cash',
    });
    for (const entry of entries) expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
  });

  it('has paid nothing before its first payment', () => {
    expect(leaseEntries(leaseOf(), [], day('2024-01-30'))).toEqual([]);
    expect(leaseMissing(leaseOf(), [cycle('2024-02-14', '2024-03-14', null)])).toEqual([]);
    expect(purchaseOfPeriod(leaseOf(), day('2024-03-01'), wh(500_000))).toBe(0);
  });

  it('pays to come what its entries have not paid yet, to the end of the term and no further', () => {
    fc.assert(
      fc.property(
        fc.record({
          term: fc.integer({ min: 1, max: 30 }),
          rise: fc.constantFrom('0', '0.029', '-0.01'),
          first: fc.integer({ min: 0, max: 2_000 }),
          today: fc.integer({ min: 0, max: 4_000 }),
        }),
        ({ term, rise, first, today }) => {
          const start = day('2020-01-01');
          const lease = leaseOf({ termMonths: term, yearlyRise: rise, firstPaymentOn: addDays(start, first) });
          const now = addDays(start, today);
          const paid = leaseEntries(lease, [], now);
          const end = addMonths(lease.firstPaymentOn, term);
          const left = leaseFlows(lease, addDays(now, 1), end);
          expect(paid.length + left.length).toBe(term);
          const whole = Array.from({ length: term }, (_, index) => -leasePayment(lease, index));
          expect([...paid, ...left].map(({ amountCents }) => amountCents)).toEqual(whole);
          expect(leaseFlows(lease, end, addMonths(end, 24))).toEqual([]);
        },
      ),
      { numRuns: PROPERTY_RUNS },
    );
  });
});

describe('a power-purchase agreement', () => {
  const cycles = [
    cycle('2024-01-14', '2024-02-14', 300),
    cycle('2024-02-14', '2024-03-14', 690),
    cycle('2024-03-14', '2024-04-14', null),
    cycle('2025-01-14', '2025-02-15', 520),
  ];

  it('is paid for what each cycle made, on its last day, at the price of the year that day lies in', () => {
    const entries = leaseEntries(power(), cycles, day('2025-12-01'));
    // 690 × 0.1195 = 82.455; 520 × 0.1195 × 1.029 = 63.94206
    expect(entries.map(({ id, date, amountCents }) => [id, date, amountCents])).toEqual([
      ['lease-2024-03-14', '2024-03-13', -8_246],
      ['lease-2025-02-15', '2025-02-14', -6_394],
    ]);
    for (const entry of entries) expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
    expect(leaseEntries(power(), cycles, day('2025-02-13'))).toHaveLength(1);
  });

  it('says which cycles are missing: a production that is not known is not zero', () => {
    expect(leaseMissing(power(), cycles)).toEqual(['2024-04-14']);
  });

  it('has an estimate where the production is one, with the production’s own source', () => {
    const estimated = {
      ...cycle('2024-02-14', '2024-03-14', 690),
      estimated: true,
      source: { kind: 'typed' as const, by: 'Priya', on: '2024-03-20' },
    };
    const [entry] = leaseEntries(power({ documentId: 'p' }), [estimated], day('2025-12-01'), [
      { id: 'p', fileName: 'agreement.pdf' },
    ]);
    expect(entry).toMatchObject({ estimated: true, working: { basis: 'estimated' } });
    expect(entry?.working.inputs.map(({ source }) => source.kind)).toEqual(['document', 'document', 'figure', 'typed']);
  });

  it('costs a period to come by the same price, and nothing outside the term', () => {
    expect(purchaseOfPeriod(power(), day('2025-02-15'), wh(520_000))).toBe(-6_394);
    expect(purchaseOfPeriod(power(), day('2024-02-14'), wh(520_000))).toBe(0);
    expect(purchaseOfPeriod(power({ termMonths: 12 }), day('2025-02-15'), wh(520_000))).toBe(0);
    expect(purchaseOfPeriod(power({ termMonths: 12 }), day('2025-02-14'), wh(520_000))).toBe(-6_214);
    expect(leaseFlows(power(), day('2024-01-01'), day('2030-01-01'))).toEqual([]);
  });

  it('without a price stated costs nothing', () => {
    const entries = leaseEntries(power({ ratePerKwh: null }), cycles, day('2024-12-01'));
    expect(entries.map(({ amountCents }) => amountCents)).toEqual([0]);
  });
});
