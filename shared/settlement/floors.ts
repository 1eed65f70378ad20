import { type Cents, sumCents } from '../units/cents.ts';
import { Exact, exact, roundToCents, usdOf } from '../units/rate.ts';
import { type Owed, owedInputs } from './charges.ts';
import type { Cycle } from './cycle-flows.ts';
import { dayInputs, mustPrice } from './energy-share.ts';
import { splitCycle } from './parts.ts';
import type { PreparedCharge } from './prepare.ts';
import { ONE_UNIT, priced } from './quantity.ts';
import type { SettledLine } from './settlement.ts';

/** What a floor asks for in the whole cycle, to the cent: rate, × days if per day; each part of a split cycle by its days. */
export function floorCents(cycle: Cycle, item: PreparedCharge): Cents {
  const parts = splitCycle(cycle, item.pricing, false);
  const [only] = parts;
  if (only && parts.length === 1) {
    const { rate } = mustPrice(item, item.charge.label, only, null, null);
    return priced(
      item.charge.per === 'day' ? cycle.days * ONE_UNIT : ONE_UNIT,
      1,
      rate,
      cycle.prepared.plan.rounding.money,
    );
  }
  let least = new Exact(0);
  for (const part of parts) {
    const { rate } = mustPrice(item, item.charge.label, part, null, null);
    const times = item.charge.per === 'day' ? new Exact(part.days) : new Exact(part.days).div(cycle.days);
    least = least.plus(exact(rate.text).times(times));
  }
  return roundToCents(least, cycle.prepared.plan.rounding.money);
}

/** The lines of a floor: what its base lacks after credits, or 0.00; in a split cycle each part's floor faces its days' share of the base. */
export function floorLines(cycle: Cycle, item: PreparedCharge, base: Owed): SettledLine[] {
  const { charge } = item;
  const { round, plan } = cycle.prepared;
  const due = usdOf(sumCents(base.amounts)).minus(usdOf(base.paid));
  const dueFormula = base.paid === 0 ? 'sum(lines)' : '(sum(lines) - paid)';
  const parts = splitCycle(cycle, item.pricing, false);
  return parts.map((part): SettledLine => {
    const price = mustPrice(item, charge.label, part, null, null);
    const split = parts.length > 1;
    const perDay = charge.per === 'day';
    // Over the cycle's days, so that nothing is divided before it is rounded.
    const least = exact(price.rate.text)
      .times(part.days)
      .times(perDay ? cycle.days : 1);
    const missing = Exact.max(least.minus(due.times(part.days)), 0).div(cycle.days);
    const leastFormula = perDay ? 'rate * days * allDays' : 'rate * days';
    return {
      component: charge.id,
      kind: charge.kind,
      label: charge.label,
      period: null,
      tier: null,
      from: split ? part.from : null,
      to: split ? part.to : null,
      quantity: null,
      unit: null,
      rate: null,
      amountCents: roundToCents(missing, plan.rounding.money),
      inDue: !cycle.prepared.taken.has(charge.id),
      working: {
        words: `what is missing to $${price.rate.text} a ${charge.per}`,
        formula: `${round}(max(${leastFormula} - ${dueFormula} * days, 0) / allDays)`,
        inputs: [...owedInputs(base), ...price.inputs, ...dayInputs(part.days, cycle.days)],
        unit: 'USD',
        basis: 'computed',
      },
    };
  });
}
