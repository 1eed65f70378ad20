import { describe, expect, it } from 'vitest';
import { projectFrom } from '#shared/position/project.ts';
import { cents } from '#shared/units/cents.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { creditCost, creditOf, creditYear } from '../books/facts.ts';
import { assuming, builtLedger } from './built-basis.ts';

const { basis } = builtLedger({ cycles: 14 });

/** `value, source` of an assumption by its name. */
function stated(of: typeof basis, name: string): string[] {
  const made = projectFrom(of);
  if (!made.ok) throw new Error(made.why);
  return made.projection.assumptions
    .filter((one) => one.name === name)
    .map(({ value, source }) => `${value}; ${source}`);
}

describe('what a projection takes for granted', () => {
  it('names its published source while it is the default, however the number is written', () => {
    expect(stated(basis, 'degradation')[0]).toContain('Jordan and Kurtz');
    expect(stated(basis, 'priceRise')[0]).toContain('EIA');
    expect(stated(basis, 'discountRate')[0]).toContain('customary');
    expect(stated(basis, 'horizonMonths')[0]).toBe('300; 25 years, the usual output warranty of modules');
    expect(stated(basis, 'upkeepYearlyCents')[0]).toBe('$0.00; None stated');
    const { degradation } = basis.facts.assumptions;
    expect(stated(assuming(basis, { degradation: `${degradation}0` }), 'degradation')[0]).toContain('Jordan and Kurtz');
  });

  it('is the owner’s own where it was changed', () => {
    const own = assuming(basis, {
      degradation: '0.0101',
      priceRise: '-0.01',
      discountRate: '0.04',
      horizonMonths: 299,
      upkeepYearlyCents: cents(100),
    });
    expect(stated(own, 'degradation')).toEqual(['1.01 %; Your own figure']);
    expect(stated(own, 'priceRise')).toEqual(['-1 %; Your own figure']);
    expect(stated(own, 'discountRate')).toEqual(['4 %; Your own figure']);
    expect(stated(own, 'horizonMonths')).toEqual(['299; Your own figure']);
    expect(stated(own, 'upkeepYearlyCents')).toEqual(['$1.00; Your own figure']);
  });

  it('says of how many calendar months the record tells, and what stands in for the others', () => {
    expect(stated(basis, 'use')[0]).toMatch(/^12 months from the record; /);
    const half = { ...basis, cycles: basis.cycles.slice(-5) };
    const july = { from: day('2024-07-01'), to: day('2024-08-01'), importWh: wh(900_000) };
    const before = { ...half, facts: { ...half.facts, usageBefore: [july] } };
    expect(stated(half, 'use')[0]).toMatch(/^6 months from the record, 6 at the record’s mean; /);
    expect(stated(before, 'use')[0]).toMatch(
      /^6 months from the record, 1 from the bills before the roof, 5 at the record’s mean; /,
    );
    expect(stated(half, 'production')[0]).toMatch(
      /^6 months from the record, 6 from the installer’s estimate, scaled to the record; /,
    );
  });

  it('says what of the tax credit has no planned year, and nothing where all of it has', () => {
    const credit = creditOf({
      placedInServiceOn: day('2025-01-10'),
      costs: [creditCost('Roof', 1_000_000, 'qualified')],
    });
    const of = (limitCents: number | null) => ({
      ...basis,
      facts: { ...basis.facts, credit: { ...credit, years: [creditYear(2025, limitCents, {})] } },
    });
    expect(stated(of(300_000), 'credit')[0]).toMatch(/^\$3,000\.00 in the years planned; /);
    expect(stated(of(300_100), 'credit')[0]).toMatch(/^\$3,000\.00 in the years planned; /);
    expect(stated(of(299_900), 'credit')[0]).toMatch(
      /^\$2,999\.00 in the years planned; \$1\.00 has no planned year with a limit and is not projected as cash; /,
    );
  });

  it('leaves the incentive and the credit out where there is none', () => {
    const none = { ...basis, facts: { ...basis.facts, incentive: null, credit: null } };
    expect([...stated(none, 'incentive'), ...stated(none, 'credit')]).toEqual([]);
    expect(stated(basis, 'incentive')).toHaveLength(1);
  });
});

describe('money since the last close', () => {
  it('is collected on the day after the close where the close is yet to come', () => {
    const early = { ...basis, today: addMonths(basis.close.on, -1), since: [] };
    const late = { ...basis, today: addMonths(basis.close.on, 2), since: [] };
    const incentive = (of: typeof basis) => {
      const made = projectFrom(of);
      if (!made.ok) throw new Error(made.why);
      return made.projection.months.map((month) => month.books.incentive);
    };
    const owed = basis.close.incentiveOwedCents;
    expect(owed).toBeGreaterThan(0);
    const settled = { ...basis, close: { ...basis.close, incentiveOwedCents: cents(0) }, since: [] };
    const plain = incentive(settled);
    expect(
      incentive(early)
        .map((one, at) => one - (plain[at] ?? 0))
        .slice(0, 4),
    ).toEqual([owed, 0, 0, 0]);
    expect(
      incentive(late)
        .map((one, at) => one - (plain[at] ?? 0))
        .slice(0, 4),
    ).toEqual([0, 0, owed, 0]);
  });
});
