import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { basisEffect } from '#shared/books/credit-basis.ts';
import { creditChecks } from '#shared/books/credit-checks.ts';
import { creditPlan } from '#shared/books/credit-plan.ts';
import { creditSummary } from '#shared/books/credit-summary.ts';
import { creditVintages, undatedCosts } from '#shared/books/credit-vintages.ts';
import { creditEarnedBy, creditLinesOf, creditParts, creditStillToCome } from '#shared/books/tax-credit.ts';
import type { CreditCost, CreditFacts } from '#shared/facts/finance.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { creditCost, creditOf, creditYear } from './facts.ts';

/** $20,000 completed with the roof in 2021 and $10,000 added in 2023. */
function twoVintages(changes: Partial<CreditFacts> = {}): CreditFacts {
  return creditOf({
    placedInServiceOn: day('2021-08-05'),
    costs: [
      creditCost('Roof', 2_000_000, 'qualified'),
      { ...creditCost('Second array', 1_000_000, 'qualified'), placedInServiceOn: day('2023-06-01') },
    ],
    years: [creditYear(2021, 200_000, {}), creditYear(2022, 100_000, {}), creditYear(2023, 300_000, {})],
    ...changes,
  });
}

describe('vintages of the credit', () => {
  it('take each cost at the rate of the year in which it was completed', () => {
    expect(
      creditVintages(twoVintages()).map((one) => [one.year, one.rate, one.line1Cents, one.line6bCents, one.state]),
    ).toEqual([
      [2021, '0.26', 2_000_000, 520_000, 'counts'],
      [2023, '0.30', 1_000_000, 300_000, 'counts'],
    ]);
    expect(
      creditLinesOf(twoVintages()).map((line) => [
        line.taxYear,
        line.line6bCents,
        line.line12Cents,
        line.line15Cents,
        line.line16Cents,
      ]),
    ).toEqual([
      [2021, 520_000, 0, 200_000, 320_000],
      [2022, 0, 320_000, 100_000, 220_000],
      [2023, 300_000, 220_000, 300_000, 220_000],
    ]);
  });

  it('give none to what was completed after 2025, and leave the carryforward of the rest alone', () => {
    const credit = twoVintages();
    const late = { ...creditCost('Third array', 900_000, 'qualified'), placedInServiceOn: day('2026-02-01') };
    const with2026 = { ...credit, costs: [...credit.costs, late] };
    expect(creditVintages(with2026).at(-1)).toMatchObject({
      year: 2026,
      state: 'noCredit',
      line1Cents: 0,
      line6bCents: 0,
    });
    expect(creditLinesOf(with2026)).toEqual(creditLinesOf(credit));
  });

  it('are those completed by a day: a part completed later in the year is not yet earned', () => {
    const credit = creditOf({
      costs: [
        creditCost('Roof', 2_000_000, 'qualified'),
        { ...creditCost('Last string', 500_000, 'qualified'), placedInServiceOn: day('2024-10-01') },
      ],
    });
    expect(creditEarnedBy(credit, day('2024-05-21'))).toBe(0);
    expect(creditEarnedBy(credit, day('2024-05-22'))).toBe(600_000);
    expect(creditEarnedBy(credit, day('2024-10-01'))).toBe(750_000);
    expect(creditLinesOf(credit)[0]?.line6bCents).toBe(750_000);
  });

  it('have a law behind their rate, or none where no year had a credit', () => {
    const before = creditOf({ placedInServiceOn: day('2005-06-01'), years: [] });
    expect(creditVintages(before)).toMatchObject([{ state: 'noCredit', law: 'no credit in this year' }]);
  });

  it('are each named where the credit of several is still to come', () => {
    const label = creditStillToCome(twoVintages(), day('2024-01-01')).working.inputs[0]?.label;
    expect(label).toBe('Line 6b of 2021 and 2023');
  });

  it('may have no roof beside them: a part completed on a day of its own is named by the credit alone', () => {
    const part = { ...creditCost('Second array', 1_000_000, 'qualified'), placedInServiceOn: day('2023-06-01') };
    const credit = creditOf({ placedInServiceOn: null, costs: [part], years: [] });
    const figure = creditStillToCome(credit, day('2024-01-01'));
    expect(figure.amountCents).toBe(300_000);
    expect(figure.working.inputs[0]?.label).toBe('Credit earned');
  });

  it('need a day of completion: a cost without one earns nothing and is named', () => {
    const credit = creditOf({ placedInServiceOn: null, years: [] });
    expect(creditVintages(credit)).toEqual([]);
    expect(undatedCosts(credit).map(({ label }) => label)).toEqual(['Contract', 'Permit', 'Dealer fee']);
    expect(creditLinesOf(credit)).toEqual([]);
    expect(creditSummary(credit).undated).toHaveLength(3);
    expect(creditPlan(credit)).toEqual({ leftCents: null, years: [], unplannedCents: null });
    expect(creditStillToCome(credit, day('2026-01-01')).working.inputs[0]?.label).toBe('Credit earned');
  });

  it('keep the dealer fee out, take reductions off and count the share for the home', () => {
    const credit = creditOf({
      homeShare: '0.60',
      costs: [
        creditCost('Contract', 2_400_000, 'qualified'),
        creditCost('Subsidy', 400_000, 'reduction', 'Paid by the utility'),
        creditCost('Dealer fee', 760_000, 'leftOut', 'A cost of borrowing'),
      ],
    });
    expect(creditVintages(credit)).toMatchObject([
      {
        grossCents: 2_400_000,
        reductionCents: 400_000,
        share: '0.6',
        line1Cents: 1_200_000,
        law: 'P.L. 117-169 §13302',
      },
    ]);
  });
});

describe('what a return before the record carried in', () => {
  const carried = twoVintages({
    carriedIn: { taxYear: 2022, amountCents: cents(220_000) },
    years: [creditYear(2021, 200_000, {}), creditYear(2023, 300_000, { status: 'filed', filedOn: day('2024-03-01') })],
  });

  it('stands on line 12 of the first year after it, and holds the vintages and years before', () => {
    expect(creditLinesOf(carried).map((line) => [line.taxYear, line.line12Cents, line.line13Cents])).toEqual([
      [2023, 220_000, 520_000],
    ]);
    expect(creditVintages(carried).map((one) => [one.year, one.state])).toEqual([
      [2021, 'inCarriedIn'],
      [2023, 'counts'],
    ]);
  });

  it('is there to be used once its year is over, and is carried forward until a return uses it', () => {
    expect(creditEarnedBy(carried, day('2022-12-31'))).toBe(0);
    expect(creditEarnedBy(carried, day('2023-01-01'))).toBe(220_000);
    expect(creditEarnedBy(carried, day('2023-06-01'))).toBe(520_000);
    expect(creditParts(carried, day('2023-02-01'))).toEqual({
      notYetFiledCents: 0,
      awaitedCents: 0,
      carriedForwardCents: 220_000,
    });
    expect(creditStillToCome(carried, day('2024-02-01')).working.inputs[0]?.label).toContain('line 16 of 2022');
    expect(creditStillToCome(carried, day('2024-03-01')).amountCents).toBe(220_000);
  });

  it('is checked against line 12 and counted in the total', () => {
    const checks = creditChecks(creditLinesOf(carried), carried.carriedIn);
    expect(checks.map((check) => [check.label, check.agrees])).toEqual([
      ['Line 12 of 2023 is line 16 of 2022', true],
      ['Line 6b and what was carried in are used on line 15 or carried on the last line 16', true],
    ]);
    expect(creditChecks(creditLinesOf(carried), { taxYear: 2022, amountCents: cents(1) })[0]?.agrees).toBe(false);
  });

  it('alone is a credit to carry, with no form of its own yet', () => {
    const alone = creditOf({
      placedInServiceOn: null,
      costs: [],
      years: [],
      carriedIn: { taxYear: 2024, amountCents: cents(50_000) },
    });
    expect(creditPlan(alone)).toEqual({ leftCents: 50_000, years: [], unplannedCents: 50_000 });
    expect(creditChecks(creditLinesOf(alone), alone.carriedIn)).toEqual([]);
    expect(basisEffect(alone)).toBeNull();
  });
});

describe('the years of the form', () => {
  it('a year missing between two is said, unless nothing was left to carry through it', () => {
    const gap = creditOf({ years: [creditYear(2024, 415_000, {}), creditYear(2027, 900_000, {})] });
    expect(creditChecks(creditLinesOf(gap))[0]).toMatchObject({ label: 'A return for 2025, 2026', agrees: null });
    const used = creditOf({ years: [creditYear(2024, 2_000_000, {}), creditYear(2027, 900_000, {})] });
    expect(creditChecks(creditLinesOf(used)).map(({ label }) => label)).not.toContain('A return for 2025, 2026');
  });
});

describe('the plan for what is left', () => {
  it('is what the limits expected would use and leave, and what no year plans for', () => {
    const plan = creditPlan(
      creditOf({
        years: [
          creditYear(2024, 415_000, { status: 'filed', filedOn: day('2025-03-10') }),
          creditYear(2025, 300_000, {}),
          creditYear(2026, 200_000, {}),
        ],
      }),
    );
    expect(plan).toEqual({
      leftCents: 692_000,
      years: [
        { taxYear: 2025, expectedLimitCents: 300_000, usesCents: 300_000, leavesCents: 392_000 },
        { taxYear: 2026, expectedLimitCents: 200_000, usesCents: 200_000, leavesCents: 192_000 },
      ],
      unplannedCents: 192_000,
    });
  });

  it('does not know what is left where a limit on the way is missing', () => {
    const plan = creditPlan(creditOf({ years: [creditYear(2024, null, {})] }));
    expect(plan).toMatchObject({ leftCents: 1_107_000, unplannedCents: null });
  });
});

describe('the home’s basis (26 U.S.C. 25D(f))', () => {
  it('rises by the cost less the subsidy less the credit: so far, and with all of it', () => {
    const credit = creditOf();
    credit.costs.push(creditCost('Subsidy', 150_000, 'reduction', 'Not income'));
    const effect = basisEffect(credit);
    // $36,900 − $1,500 = $35,400; 30 % of it is $10,620, of which $4,150 and $5,050 are used on filed returns.
    expect(effect?.soFar.amountCents).toBe(3_690_000 - 150_000 - 920_000);
    expect(effect?.whole.amountCents).toBe(3_690_000 - 150_000 - 1_062_000);
    for (const figure of [effect?.soFar, effect?.whole]) {
      if (!figure) throw new Error('both figures');
      expect(evaluateWorking(figure.working).eq(usdOf(figure.amountCents))).toBe(true);
    }
  });

  it('takes nothing off for a filed return whose credit is not known', () => {
    const credit = creditOf({ years: [creditYear(2024, null, { status: 'filed', filedOn: day('2025-03-10') })] });
    expect(basisEffect(credit)?.soFar.amountCents).toBe(3_690_000);
  });

  it('is not known where nothing earns, or an earlier return used a part', () => {
    expect(basisEffect(creditOf({ placedInServiceOn: day('2026-03-01') }))).toBeNull();
    expect(basisEffect(creditOf({ carriedIn: { taxYear: 2023, amountCents: cents(1) } }))).toBeNull();
  });
});

const anyCost = fc
  .record({
    amount: fc.integer({ min: 0, max: 4_000_000 }),
    year: fc.option(fc.integer({ min: 2019, max: 2027 })),
    treatment: fc.constantFrom('qualified', 'qualified', 'reduction', 'leftOut'),
  })
  .map(
    ({ amount, year, treatment }): CreditCost => ({
      ...creditCost('Cost', amount, treatment as CreditCost['treatment']),
      placedInServiceOn: year === null ? null : day(`${year}-05-01`),
    }),
  );
const anyCredit = fc
  .record({
    costs: fc.array(anyCost, { maxLength: 6 }),
    limits: fc.uniqueArray(fc.tuple(fc.integer({ min: 2019, max: 2030 }), fc.integer({ min: 0, max: 900_000 })), {
      selector: ([year]) => year,
      maxLength: 8,
    }),
    carriedIn: fc.option(fc.tuple(fc.integer({ min: 2018, max: 2024 }), fc.integer({ min: 0, max: 900_000 }))),
    share: fc.constantFrom('1', '0.85', '0.60'),
  })
  .map(({ costs, limits, carriedIn, share }) =>
    creditOf({
      costs: costs.map((cost, index) => ({ ...cost, id: `c${index}` })),
      homeShare: share,
      years: limits.map(([taxYear, limit]) => creditYear(taxYear, limit, {})),
      carriedIn: carriedIn && { taxYear: carriedIn[0], amountCents: cents(carriedIn[1] - (carriedIn[1] % 100)) },
    }),
  );

describe('for any costs, limits and carryforward', () => {
  it('the credit used and carried is the credit earned and carried in', () => {
    fc.assert(
      fc.property(anyCredit, (credit) => {
        const lines = creditLinesOf(credit);
        fc.pre(lines.length > 0 && lines.every((line) => line.line15Cents !== null));
        const used = sumCents(lines.map((line) => line.line15Cents ?? cents(0)));
        const earned = sumCents(lines.map((line) => line.line6bCents));
        expect(used + (lines.at(-1)?.line16Cents ?? 0)).toBe(earned + (credit.carriedIn?.amountCents ?? 0));
        expect(creditChecks(lines, credit.carriedIn).every(({ agrees }) => agrees !== false)).toBe(true);
      }),
      { numRuns: 400 },
    );
  });

  it('the order in which costs and years are entered changes nothing', () => {
    fc.assert(
      fc.property(anyCredit, (credit) => {
        const turned = { ...credit, costs: [...credit.costs].reverse(), years: [...credit.years].reverse() };
        expect(creditLinesOf(turned)).toEqual(creditLinesOf(credit));
        const figures = (of: CreditFacts) => creditVintages(of).map(({ costs: _, ...rest }) => rest);
        expect(figures(turned)).toEqual(figures(credit));
      }),
      { numRuns: 200 },
    );
  });

  it('all of it is earned in the end, no more and no less', () => {
    fc.assert(
      fc.property(anyCredit, (credit) => {
        const lines = creditLinesOf(credit);
        const entered = sumCents(lines.map((line) => line.line6bCents));
        expect(creditEarnedBy(credit, day('2099-01-01'))).toBe(entered + (credit.carriedIn?.amountCents ?? 0));
      }),
      { numRuns: 200 },
    );
  });
});
