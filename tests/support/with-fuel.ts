import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { Statement } from '#shared/facts/papers.ts';
import { cents } from '#shared/units/cents.ts';
import { buildHousehold } from './build-household.ts';

/** A rider of the utility's fuel, in ten-thousandths of a dollar per kWh, another price on each bill (ledger.md §3: learned from the bill). */
export const FUEL = [112, 97, 134, 88];

/** The built household with a fuel rider outside the tax, billed in whole numbers at each bill's own price. */
export function withFuel({ printed = true, wrong = 0 } = {}): HouseholdFacts {
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
