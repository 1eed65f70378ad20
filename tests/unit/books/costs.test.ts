import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { costDays } from '#shared/books/cost-days.ts';
import { costEntries, costFlows, costToDate } from '#shared/books/costs.ts';
import { type CostFacts, costKind, INCOME_KINDS } from '#shared/facts/house.ts';
import { cents } from '#shared/units/cents.ts';
import {
  addDays,
  addMonths,
  type Day,
  day,
  dayOfMonth,
  daysBetween,
  daysInMonth,
  monthOf,
  yearOf,
} from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';

function costOf(changes: Partial<CostFacts> = {}): CostFacts {
  return {
    id: 'c',
    on: day('2025-01-31'),
    kind: 'upkeep',
    label: 'Care contract',
    amountCents: cents(1_500),
    documentId: null,
    every: null,
    until: null,
    ...changes,
  };
}

describe('a cost that comes once', () => {
  it('has one entry on its day, and none before it', () => {
    expect(costEntries([costOf()], day('2025-01-30'))).toEqual([]);
    expect(costEntries([costOf()], day('2025-01-31'))).toMatchObject([
      { id: 'cost-c', date: '2025-01-31', book: 'upkeep', kind: 'upkeep', amountCents: -1_500, basis: 'cash' },
    ]);
  });

  it('whatever its last day says: that belongs to one that comes again', () => {
    expect(costDays(costOf({ until: day('2024-01-01') }), day('2026-01-01'))).toEqual(['2025-01-31']);
  });
});

describe('a cost that comes again', () => {
  it('falls on the last day of a month too short for its own, and on its own again after it', () => {
    expect(costDays(costOf({ every: 'month' }), day('2025-05-31'))).toEqual([
      '2025-01-31',
      '2025-02-28',
      '2025-03-31',
      '2025-04-30',
      '2025-05-31',
    ]);
  });

  it('comes every quarter or year, through its last day and through today, whichever is first', () => {
    expect(costDays(costOf({ every: 'quarter' }), day('2025-10-30'))).toEqual([
      '2025-01-31',
      '2025-04-30',
      '2025-07-31',
    ]);
    const yearly = costOf({ on: day('2024-02-29'), every: 'year', until: day('2026-02-28') });
    expect(costDays(yearly, day('2030-01-01'))).toEqual(['2024-02-29', '2025-02-28', '2026-02-28']);
    expect(costDays(costOf({ every: 'year' }), day('2025-01-30'))).toEqual([]);
  });

  it('numbers its entries from the first, so that their ids stay when more come', () => {
    const cost = costOf({ every: 'month' });
    const early = costEntries([cost], day('2025-02-28'));
    expect(early.map(({ id }) => id)).toEqual(['cost-c-1', 'cost-c-2']);
    expect(costEntries([cost], day('2025-04-30')).slice(0, 2)).toEqual(early);
    expect(early[0]?.working.words).toBe('Paid every month, as entered');
  });

  const recurring = fc.record({
    on: fc.integer({ min: 0, max: 3_000 }).map((number) => addDays(day('2000-01-01'), number)),
    kind: fc.constantFrom(...costKind.options),
    amountCents: fc.integer({ min: 1, max: 10_000_000 }).map(cents),
    every: fc.constantFrom('month' as const, 'quarter' as const, 'year' as const, null),
    span: fc.option(fc.integer({ min: 0, max: 4_000 }), { nil: null }),
    through: fc.integer({ min: 0, max: 6_000 }).map((number) => addDays(day('2000-01-01'), number)),
    cut: fc.integer({ min: 0, max: 6_000 }).map((number) => addDays(day('2000-01-01'), number)),
  });
  const months = { month: 1, quarter: 3, year: 12 };

  it('has as many entries as its months allow, each of the same amount, none after its end or today', () => {
    fc.assert(
      fc.property(recurring, ({ span, through, cut: _, ...given }) => {
        const until = given.every === null || span === null ? null : addDays(given.on, span);
        const cost = costOf({ ...given, until });
        const entries = costEntries([cost], through);
        const last = until !== null && until < through ? until : through;
        const wanted = dayOfMonth(cost.on);
        const onItsDay = (date: Day) => dayOfMonth(date) === Math.min(wanted, daysInMonth(yearOf(date), monthOf(date)));
        expect(entries.every(({ date }) => date >= cost.on && date <= last && onItsDay(date))).toBe(true);
        const step = cost.every === null ? null : months[cost.every];
        const next: Day = step === null ? cost.on : addMonths(cost.on, entries.length * step);
        if (step !== null || entries.length === 0) expect(next > last).toBe(true);
        const size = INCOME_KINDS.includes(cost.kind) ? cost.amountCents : -cost.amountCents;
        const total = entries.reduce((sum, entry) => sum + entry.amountCents, 0);
        expect(total).toBe(size * entries.length || 0);
        expect(costToDate(cost, through)).toBe(Math.abs(total));
        expect(new Set(entries.map(({ id }) => id)).size).toBe(entries.length);
        for (const entry of entries.slice(0, 1)) {
          expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
        }
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });

  it('moves after a day exactly what its entries to a horizon have that its entries to that day have not', () => {
    fc.assert(
      fc.property(recurring, ({ span, through, cut, ...given }) => {
        const cost = costOf({
          ...given,
          until: given.every === null || span === null ? null : addDays(given.on, span),
        });
        const [from, to] = cut < through ? [cut, through] : [through, cut];
        if (daysBetween(from, to) === 0) return;
        const before = costEntries([cost], from);
        const all = costEntries([cost], to);
        expect(costFlows([cost], addDays(from, 1), addDays(to, 1))).toEqual(
          all.slice(before.length).map(({ date, book, amountCents }) => ({ on: date, book, amountCents })),
        );
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });
});

describe('where a cost stands', () => {
  it('is upkeep where it keeps the roof up, a deposit lost to an installer beside the other costs', () => {
    const books = costKind.options.map((kind) => [kind, costEntries([costOf({ kind })], day('2026-01-01'))[0]?.book]);
    expect(books.filter(([, book]) => book === 'upkeep').map(([kind]) => kind)).toEqual([
      'repair',
      'upkeep',
      'insurance',
      'propertyTax',
    ]);
    expect(Object.fromEntries(books).depositLost).toBe('costs');
    expect(costEntries([costOf({ kind: 'depositLost' })], day('2026-01-01'))[0]?.amountCents).toBe(-1_500);
  });

  it('is before income tax where it is an income', () => {
    for (const kind of INCOME_KINDS) {
      const [entry] = costEntries([costOf({ kind })], day('2026-01-01'));
      expect(entry).toMatchObject({ amountCents: 1_500, book: 'costs' });
      expect(entry?.working.words).toBe('Received, as entered; before income tax');
    }
  });

  it('names its paper where one that is kept stands behind it', () => {
    const papers = [{ id: 'p1', fileName: 'invoice.pdf' }];
    const sourceOf = (documentId: string | null) =>
      costEntries([costOf({ documentId })], day('2026-01-01'), papers)[0]?.working.inputs[0]?.source;
    expect(sourceOf('p1')).toEqual({
      kind: 'document',
      documentId: 'p1',
      fileName: 'invoice.pdf',
      place: 'the whole file',
    });
    expect(sourceOf('p2')).toEqual({ kind: 'figure', name: 'Costs and incomes as entered' });
    expect(sourceOf(null)).toEqual({ kind: 'figure', name: 'Costs and incomes as entered' });
  });
});
