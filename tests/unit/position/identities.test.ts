import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BOOKS } from '#shared/books/book.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { ledgerReport } from '#shared/ledger/report.ts';
import type { ProjectionBasis } from '#shared/position/basis.ts';
import { projectFrom } from '#shared/position/project.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { addMonths, type Day } from '#shared/units/day.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { BUILT_START, builtLedger } from './built-basis.ts';

/** Households that differ in everything the position is made of; as many as a whole ledger each allows. */
const HOUSEHOLDS = Math.ceil(PROPERTY_RUNS * 0.15);
const HORIZON = 96;

type Drawn = {
  cycles: number;
  exportTo: 'bill' | 'creditBank';
  parts: { loan: boolean; mortgage: boolean; credit: boolean; incentive: boolean; other: boolean; lease: boolean };
  energy: number[];
  principal: number;
  prepaid: number;
  limit: number | null;
  upkeep: number;
  rate: number;
};

const household: fc.Arbitrary<Drawn> = fc.record({
  cycles: fc.integer({ min: 1, max: 14 }),
  exportTo: fc.constantFrom('bill', 'creditBank'),
  parts: fc.record({
    loan: fc.boolean(),
    mortgage: fc.boolean(),
    credit: fc.boolean(),
    incentive: fc.boolean(),
    other: fc.boolean(),
    lease: fc.boolean(),
  }),
  energy: fc.array(fc.integer({ min: 40, max: 180 }), { minLength: 14, maxLength: 14 }),
  principal: fc.integer({ min: 100_000, max: 6_000_000 }),
  prepaid: fc.integer({ min: 0, max: 90_000 }),
  limit: fc.option(fc.integer({ min: 0, max: 1_500_000 }), { nil: null }),
  upkeep: fc.integer({ min: 0, max: 40_000 }),
  rate: fc.integer({ min: 1, max: 4_000 }),
});

function build(drawn: Drawn) {
  const { cycles, exportTo, energy, parts } = drawn;
  return builtLedger(
    {
      cycles,
      exportTo,
      change: (cycle, index) => {
        const times = (kWh: number) => Math.round((kWh * (energy[index] ?? 100)) / 100);
        const productionKwh = times(cycle.productionKwh);
        return { ...cycle, productionKwh, exportKwh: Math.min(productionKwh, times(cycle.exportKwh)) };
      },
    },
    (facts) => changed(facts, drawn, parts),
  );
}

function changed(facts: HouseholdFacts, drawn: Drawn, parts: Drawn['parts']): HouseholdFacts {
  const { loan, credit } = facts;
  if (!loan || !credit) throw new Error('the built household is not whole');
  const solar = {
    ...loan,
    principalCents: cents(drawn.principal),
    dealerFeeCents: cents(0),
    payments:
      drawn.prepaid === 0
        ? []
        : [
            {
              id: 'extra',
              on: addMonths(BUILT_START, 1),
              amountCents: cents(drawn.prepaid),
              extraPrincipalCents: cents(drawn.prepaid),
              note: null,
              reamortize: false,
              documentId: null,
            },
          ],
  };
  return {
    ...facts,
    loan: parts.loan ? solar : null,
    otherLoans: parts.other ? [{ id: 'share', kind: 'mortgageShare', loan: { ...solar, payments: [] } }] : [],
    lease: parts.lease
      ? {
          kind: 'powerPurchase',
          company: '',
          firstPaymentOn: BUILT_START,
          termMonths: 300,
          monthlyCents: cents(0),
          ratePerKwh: '0.07',
          yearlyRise: '0.01',
          documentId: null,
        }
      : null,
    mortgage: parts.mortgage ? facts.mortgage : null,
    credit: parts.credit
      ? {
          ...credit,
          years: credit.years.map((year) => ({
            ...year,
            limitCents: drawn.limit === null ? null : cents(drawn.limit),
          })),
        }
      : null,
    incentive: parts.incentive ? facts.incentive : null,
    costs: [
      ...facts.costs,
      {
        id: 'every',
        on: addMonths(BUILT_START, 1),
        kind: 'insurance',
        label: 'Insurance of the roof',
        amountCents: cents(drawn.upkeep),
        documentId: null,
        every: 'quarter',
        until: null,
      },
    ],
    assumptions: { ...facts.assumptions, horizonMonths: HORIZON },
  };
}

describe('for any household', () => {
  it('the position is the same by entry, by cycle, by book and in the report, and settled today is its parts; the projection goes on from it', () => {
    fc.assert(
      fc.property(household, (drawn) => {
        const { ledger, basis } = build(drawn);
        const { points, cashSoFar, settledToday, settledParts, projection } = ledger.position;
        const byEntry = sumCents(ledger.entries.flatMap((one) => (one.basis === 'memo' ? [] : [one.amountCents])));
        const report = ledgerReport(ledger);
        const reported = Object.values(report.books).flatMap((entries) =>
          entries.flatMap((one) => (one.basis === 'memo' ? [] : [one.amountCents])),
        );
        expect([
          sumCents(points.map((point) => point.addedCents)),
          sumCents(BOOKS.map((book) => sumCents(points.map((point) => point.books[book])))),
          sumCents(reported),
          sumCents(report.position.byCycle.map((point) => point.addedCents)),
          sumCents(Object.values(report.position.byBook)),
          cashSoFar.amountCents,
        ]).toEqual(Array(6).fill(byEntry));
        expect(sumCents([cashSoFar, ...Object.values(settledParts)].map((part) => part.amountCents))).toBe(
          settledToday.amountCents,
        );
        const ahead = projection?.months ?? [];
        expect(ahead).toHaveLength(HORIZON);
        const apart = [...points, ...ahead].filter((one) => {
          const owed = one.loanPayoffCents + one.creditStillToComeCents + one.incentiveOwedCents + one.utilityBankCents;
          const books = BOOKS.reduce((sum, book) => sum + one.books[book], 0);
          return one.cashSoFarCents + owed !== one.settledTodayCents || books !== one.addedCents;
        });
        expect(apart).toEqual([]);
        expect(basis.close.cashSoFarCents + sumCents(ahead.map((month) => month.addedCents))).toBe(
          ahead.at(-1)?.cashSoFarCents,
        );
      }),
      { numRuns: HOUSEHOLDS },
    );
  }, 120_000);

  it('a higher price for export never makes even later, nor any month less', () => {
    fc.assert(
      fc.property(household, fc.integer({ min: 1, max: 2_000 }), (drawn, more) => {
        const { basis } = build({ ...drawn, cycles: 1 + (drawn.cycles % 3) });
        const low = projected(atExport(basis, drawn.rate));
        const high = projected(atExport(basis, drawn.rate + more));
        expect(sooner(high.evenOn, low.evenOn)).toBe(true);
        const less = high.months.filter(
          (month, at) => month.settledTodayCents < (low.months[at]?.settledTodayCents ?? Number.NEGATIVE_INFINITY),
        );
        expect(less).toEqual([]);
      }),
      { numRuns: HOUSEHOLDS },
    );
  }, 120_000);
});

function projected(basis: ProjectionBasis) {
  const made = projectFrom(basis);
  if (!made.ok) throw new Error(made.why);
  return made.projection;
}

/** The basis with its export credit at so many hundredths of a cent a kWh. */
function atExport(basis: ProjectionBasis, rate: number): ProjectionBasis {
  const text = `0.${String(rate).padStart(4, '0')}`;
  const plans = basis.facts.plans.map((one) => ({
    ...one,
    plan: {
      ...one.plan,
      credits: one.plan.credits.map((credit) => ({
        ...credit,
        rates: credit.rates?.map((row) => ({ ...row, rate: text })) ?? null,
      })),
    },
  }));
  return { ...basis, facts: { ...basis.facts, plans } };
}

function sooner(a: Day | null, b: Day | null): boolean {
  return b === null || (a !== null && a <= b);
}
