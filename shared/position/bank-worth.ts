import { wholeBalance } from '../settlement/bank-state.ts';
import type { PlanBank, RatePlan } from '../settlement/plan.ts';
import { priceAmount } from '../settlement/price.ts';
import { compare, exactText, priced, type Qty, rateOf, roundedCents } from '../settlement/quantity.ts';
import type { Opening } from '../settlement/settlement.ts';
import type { Day } from '../units/day.ts';

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
    if (compare(held, 0) === 0) continue;
    total += bank.unit === 'USD' ? worthOfDollars(bank, held) : worthOfKwh(bank, plan, held, from, to);
  }
  return total;
}

function worthOfDollars(bank: PlanBank, held: Qty): number {
  const isSpendable = bank.offsets.length > 0 || bank.trueUps.some((trueUp) => trueUp.action === 'pay');
  return isSpendable ? roundedCents(held) : 0;
}

function worthOfKwh(bank: PlanBank, plan: RatePlan, held: Qty, from: Day, to: Day): number {
  let worth: number | null = null;
  for (const charge of bank.offsets) {
    const amountCents = priceAmount(plan, charge, from, to, exactText(held));
    if (amountCents !== null) worth = (worth ?? 0) + amountCents;
  }
  if (worth !== null) return worth;
  const payout = bank.trueUps.find((trueUp) => trueUp.action === 'pay' && trueUp.rates !== null);
  const rate = payout?.rates?.filter((row) => row.from <= to).at(-1)?.rate;
  return rate === undefined ? 0 : priced(held, 1, rateOf(rate), 'halfUp');
}

function isIncentiveOnly(bank: PlanBank, plan: RatePlan): boolean {
  const fed = plan.credits.filter((credit) => credit.to === bank.id);
  return bank.unit === 'USD' && fed.length > 0 && fed.every((credit) => credit.kind === 'incentive');
}
