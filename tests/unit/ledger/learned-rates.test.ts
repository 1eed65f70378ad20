import { describe, expect, it } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { Statement } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { cents } from '#shared/units/cents.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';

// A rider of the utility's fuel, in ten-thousandths of a dollar per kWh, another price on each bill (ledger.md §3: learned from the bill).
const FUEL = [112, 97, 134, 88];

/** The built household with a fuel rider outside the tax, billed in whole numbers at each bill's own price. */
function withFuel({ printed = true, wrong = 0 } = {}): HouseholdFacts {
  const facts = buildHousehold({ cycles: FUEL.length });
  const [first] = facts.plans;
  if (!first) throw new Error('the built household has a plan');
  const [energy] = first.plan.charges;
  if (!energy) throw new Error('the built plan has charges');
  const rates = energy.rates.map((row) => ({ ...row, rate: '0.0100' }));
  const fuel = { ...energy, id: 'fuel', label: 'Fuel rider', kind: 'adjustment' as const, rates, learned: true };
  let owedBefore = 0;
  const statements = facts.statements.map((statement, at): Statement => {
    const kwh = Number(statement.lines[0]?.quantity ?? 0);
    const price = FUEL[at] ?? 0;
    const amount = Math.floor((kwh * price + 50) / 100) + wrong;
    const line = {
      component: 'fuel',
      kind: 'adjustment' as const,
      label: 'Fuel rider',
      quantity: String(kwh),
      unit: 'kWh' as const,
      rate: printed ? `0.${String(price).padStart(4, '0')}` : null,
      amountCents: cents(amount),
      inDue: true,
      row: null,
    };
    const previous = statement.previousBalanceCents;
    const moved = {
      previousBalanceCents: previous === null ? null : cents(previous + owedBefore),
      paymentsCents: statement.paymentsCents === null ? null : cents(statement.paymentsCents - owedBefore),
    };
    owedBefore = amount;
    return {
      ...statement,
      ...moved,
      lines: [...statement.lines, line],
      amountDueCents: cents(statement.amountDueCents + amount),
    };
  });
  const plan = { ...first.plan, charges: [...first.plan.charges, fuel] };
  return { ...facts, plans: [{ ...first, plan }], statements };
}

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
