import { describe, expect, it } from 'vitest';
import type { LeaseFacts } from '#shared/facts/finance.ts';
import { projectionBasis } from '#shared/position/basis.ts';
import { type Changes, NO_CHANGES } from '#shared/position/changes.ts';
import type { Projection } from '#shared/position/position.ts';
import { projectFrom } from '#shared/position/project.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, addMonths } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { BUILT_START, builtLedger } from './built-basis.ts';

const { basis, ledger, facts } = builtLedger({}, (built) => ({
  ...built,
  assumptions: { ...built.assumptions, horizonMonths: 60, upkeepYearlyCents: cents(14_000) },
}));

function changed(changes: Partial<Changes>, of = basis): Projection {
  const made = projectFrom(of, { ...NO_CHANGES, ...changes });
  if (!made.ok) throw new Error(made.why);
  return made.projection;
}

const base = changed({});

describe('a projection from its basis', () => {
  it('is the ledger’s own, from plain data that has been to text and back', () => {
    expect(base).toEqual(ledger.position.projection);
    expect(changed({}, projectionBasis.parse(JSON.parse(JSON.stringify(basis))))).toEqual(base);
  });

  it('leaves the basis as it was whatever is tried', () => {
    const before = JSON.stringify(basis);
    changed({ facts: { loan: null }, endsOn: addMonths(basis.close.on, 10), energy: (energy) => energy });
    expect(JSON.stringify(basis)).toBe(before);
  });

  it('adds money beside what the facts bring, on its day and in its book', () => {
    const on = addMonths(basis.close.on, 7);
    const with_ = changed({ flows: [{ on, book: 'costs', amountCents: cents(-180_000) }] });
    const month = with_.months.find((one) => one.on > on);
    const same = base.months.find((one) => one.on > on);
    expect((month?.books.costs ?? 0) - (same?.books.costs ?? 0)).toBe(-180_000);
    expect(with_.months.at(-1)?.settledTodayCents).toBe((base.months.at(-1)?.settledTodayCents ?? 0) - 180_000);
  });

  it('takes facts in the record’s place', () => {
    const bare = changed({ facts: { loan: null } });
    expect(bare.months.every((month) => month.books.loan === 0 && month.loanPayoffCents === 0)).toBe(true);
    const mixed = changed({ facts: { mortgage: null, credit: null, incentive: null } });
    expect(mixed.months.every((month) => month.creditStillToComeCents === 0 && month.books.insurance === 0)).toBe(true);
  });

  it('changes a month’s energy and a month’s plan', () => {
    const more = changed({
      energy: (energy) => ({
        ...energy,
        useWh: wh(energy.useWh + 300_000),
        importWh: wh(energy.importWh + 300_000),
      }),
    });
    // More use bought costs the same with the roof and without it, tax rounding apart.
    const saved = (of: Projection) => of.months.reduce((sum, month) => sum + month.books.billAvoided, 0);
    expect(Math.abs(saved(more) - saved(base))).toBeLessThan(2 * 60);
    const made = new WeakMap<RatePlan, RatePlan>();
    const cut = (plan: RatePlan): RatePlan => {
      const known = made.get(plan) ?? {
        ...plan,
        credits: plan.credits.map((credit) => ({
          ...credit,
          rates: credit.rates?.map((row) => ({ ...row, rate: '0' })) ?? null,
        })),
      };
      made.set(plan, known);
      return known;
    };
    expect(saved(changed({ plan: cut }))).toBeLessThan(saved(base));
  });
});

describe('a house sold', () => {
  const endsOn = addDays(addMonths(basis.close.on, 24), 5);
  const sold = changed({ endsOn, flows: [{ on: endsOn, book: 'costs', amountCents: cents(1_500_000) }] });
  const after = sold.months.filter((month) => month.on > addMonths(endsOn, 1));

  it('pays the loans off on the day, and owes nothing after it', () => {
    const month = sold.months.find((one) => one.on > endsOn);
    expect(month?.books.loan).toBeLessThan(-1_000_000);
    expect(month?.loanPayoffCents).toBe(0);
    expect(month?.books.costs).toBe(1_500_000);
  });

  it('has no bill, incentive, insurance or upkeep any more', () => {
    expect(after.length).toBeGreaterThan(30);
    expect(after.every((month) => month.addedCents === month.books.credit && month.utilityBankCents === 0)).toBe(true);
  });

  it('is the base up to then', () => {
    const upTo = (of: Projection) => of.months.filter((month) => month.on <= addMonths(endsOn, -1));
    expect(upTo(sold)).toEqual(upTo(base));
  });
});

describe('other money in the projection', () => {
  const lease: LeaseFacts = {
    kind: 'lease',
    company: '',
    firstPaymentOn: BUILT_START,
    termMonths: 40,
    monthlyCents: cents(9_000),
    ratePerKwh: null,
    yearlyRise: '0',
    documentId: null,
  };

  it('has a lease’s payments to their end, and a power-purchase agreement’s by what is made', () => {
    const leased = changed({ facts: { loan: null, lease } });
    const paid = leased.months.map((month) => month.books.loan);
    expect(paid.reduce((sum, one) => sum + one, 0)).toBe(-9_000 * (40 - 26));
    const bought = changed({
      facts: {
        loan: null,
        incentive: null,
        lease: { ...lease, kind: 'powerPurchase', ratePerKwh: '0.05', termMonths: 300 },
      },
    });
    // What was owed at the close is still collected in the first month.
    expect(bought.months.slice(1).every((month) => month.books.loan < 0 && month.books.incentive === 0)).toBe(true);
  });

  it('has the other loans’ payments and payoffs', () => {
    const { loan } = facts;
    if (!loan) throw new Error('the built household has a loan');
    const double = changed({ facts: { otherLoans: [{ id: 'two', kind: 'other', loan }] } });
    for (const [at, month] of double.months.entries()) {
      expect(month.books.loan).toBe(2 * (base.months[at]?.books.loan ?? 0));
      expect(month.loanPayoffCents).toBe(2 * (base.months[at]?.loanPayoffCents ?? 0));
    }
  });

  it('has costs that come again, and those dated ahead once', () => {
    const on = addMonths(basis.today, 3);
    const cost = { id: 'x', kind: 'insurance' as const, label: '', amountCents: cents(2_500), documentId: null };
    const every = changed({ facts: { costs: [{ ...cost, on, every: 'year', until: null }] } });
    const once = changed({ facts: { costs: [{ ...cost, on, every: null, until: null }] } });
    const upkeep = (of: Projection) => of.months.reduce((sum, month) => sum + month.books.upkeep, 0);
    expect(upkeep(base) - upkeep(once)).toBe(2_500);
    expect(upkeep(base) - upkeep(every)).toBe(5 * 2_500);
  });

  it('says why where no plan holds', () => {
    expect(projectFrom(basis, { ...NO_CHANGES, facts: { plans: [] } })).toEqual({
      ok: false,
      why: 'There is no rate plan for the months to come.',
    });
  });
});
