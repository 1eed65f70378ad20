import type { PlanBank, RatePlan } from '../settlement/plan.ts';
import { priceQuantity } from '../settlement/price.ts';
import type { Opening, OpeningBalance } from '../settlement/settlement.ts';
import type { Day } from '../units/day.ts';
import { Exact, exact, roundToCents } from '../units/rate.ts';

/**
 * What the utility's banks are worth after a month to come: dollar credits at face, kWh at the price of the charges they will offset, else at what a
 * true-up pays, else nothing. A bank that holds an incentive alone belongs to the incentive's book.
 */
export function bankWorth(plan: RatePlan, closing: Opening, from: Day, to: Day): number {
  let total = 0;
  for (const bank of plan.banks) {
    const balance = closing.banks[bank.id];
    if (balance === undefined || isIncentiveOnly(bank, plan)) continue;
    const held = wholeBalance(balance);
    if (held.isZero()) continue;
    total += bank.unit === 'USD' ? worthOfDollars(bank, held) : worthOfKwh(bank, plan, held, from, to);
  }
  return total;
}

function worthOfDollars(bank: PlanBank, held: Exact): number {
  const isSpendable = bank.offsets.length > 0 || bank.trueUps.some((trueUp) => trueUp.action === 'pay');
  return isSpendable ? roundToCents(held) : 0;
}

function worthOfKwh(bank: PlanBank, plan: RatePlan, held: Exact, from: Day, to: Day): number {
  let worth: number | null = null;
  for (const charge of bank.offsets) {
    const priced = priceQuantity(plan, charge, from, to, held.toString());
    if (priced) worth = (worth ?? 0) + priced.amountCents;
  }
  if (worth !== null) return worth;
  const payout = bank.trueUps.find((trueUp) => trueUp.action === 'pay' && trueUp.rates !== null);
  const rate = payout?.rates?.filter((row) => row.from <= to).at(-1)?.rate;
  return rate === undefined ? 0 : roundToCents(held.times(exact(rate)));
}

function isIncentiveOnly(bank: PlanBank, plan: RatePlan): boolean {
  const fed = plan.credits.filter((credit) => credit.to === bank.id);
  return bank.unit === 'USD' && fed.length > 0 && fed.every((credit) => credit.kind === 'incentive');
}

function wholeBalance(balance: OpeningBalance): Exact {
  if (typeof balance === 'string') return exact(balance);
  const parts =
    'lots' in balance && Array.isArray(balance.lots)
      ? balance.lots.map((lot) => lot.amount)
      : Object.values(balance).map(String);
  return parts.reduce((sum, part) => sum.plus(exact(part)), new Exact(0));
}
