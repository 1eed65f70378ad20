import { describe, expect, it } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { BUILT_TODAY } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { FUEL, withFuel } from '#tests/support/with-fuel.ts';

const states = (facts: HouseholdFacts) =>
  computeLedger(facts, { today: BUILT_TODAY }).cycles.map((cycle) => cycle.state);

describe('a rider learned from the bill', () => {
  it('is settled at each bill’s own price, so that every cycle balances', () => {
    expect(states(withFuel())).toEqual(FUEL.map(() => 'balanced'));
    const ledger = computeLedger(withFuel(), { today: BUILT_TODAY });
    const rates = ledger.cycles.map((cycle) => cycle.settlement?.lines.find((line) => line.component === 'fuel')?.rate);
    expect(rates.map(Number)).toEqual([0.0112, 0.0097, 0.0134, 0.0088]);
    expect(everyWorking(ledger).filter((one) => !one.agrees)).toEqual([]);
  });

  it('is part of the bill without the roof at the same price', () => {
    const [cycle] = computeLedger(withFuel(), { today: BUILT_TODAY }).cycles;
    const line = cycle?.withoutRoof?.settlement.lines.find((one) => one.component === 'fuel');
    expect(Number(line?.rate)).toBe(0.0112);
  });

  it('has its arithmetic checked: a cent off is within rounding, three are not', () => {
    expect(states(withFuel({ wrong: 3 }))).toEqual(FUEL.map(() => 'differs'));
  });

  it('comes from amount over quantity where the bill prints no price', () => {
    expect(states(withFuel({ printed: false }))).toEqual(FUEL.map(() => 'balanced'));
  });

  it('goes on at the last price in the projection', () => {
    const rider = withFuel();
    const last = FUEL.at(-1) ?? 0;
    const fixed = {
      ...rider,
      plans: rider.plans.map((one) => ({
        ...one,
        plan: {
          ...one.plan,
          charges: one.plan.charges.map((charge) =>
            charge.id === 'fuel'
              ? { ...charge, learned: false, rates: charge.rates.map((row) => ({ ...row, rate: `0.00${last}` })) }
              : charge,
          ),
        },
      })),
    };
    const months = (facts: HouseholdFacts) =>
      computeLedger(facts, { today: BUILT_TODAY }).position.projection?.months.map((month) => month.books.billAvoided);
    expect(months(rider)?.length).toBeGreaterThan(100);
    expect(months(rider)).toEqual(months(fixed));
  });
});
