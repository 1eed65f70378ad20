import { input, ownFigure, paperSourceOf } from '../metering/source.ts';
import type { Figure } from '../position/position.ts';
import type { PlanBank, RatePlan } from '../settlement/plan.ts';
import { priceQuantity } from '../settlement/price.ts';
import type { Opening } from '../settlement/settlement.ts';
import { type Cents, cents, dollarsText, sumCents, ZERO_CENTS } from '../units/cents.ts';
import { type Exact, exact, roundToCents } from '../units/rate.ts';
import type { WorkingInput } from '../working.ts';
import type { CyclePaper } from './cycle-papers.ts';
import { totalBalance } from './opening-total.ts';

/**
 * What the utility holds for the house after a cycle (ledger.md §5.7): dollar credits at face, kWh at the price of the charges they will offset (else
 * the payout rate, else nothing), and a credit balance of the account at face. A bank that only gathers an incentive belongs to the incentive.
 */
export function utilityBank(paper: CyclePaper, plan: RatePlan | null, closing: Opening): Figure {
  const inputs: WorkingInput[] = [];
  const parts: Cents[] = [];
  const add = (label: string, amount: Cents, source: WorkingInput['source']) => {
    if (amount === 0) return;
    parts.push(amount);
    inputs.push(input(`part${parts.length}`, label, dollarsText(amount), 'USD', source));
  };
  for (const bank of plan?.banks ?? []) {
    const balance = closing.banks[bank.id];
    if (balance === undefined || plan === null || isIncentiveOnly(bank, plan)) continue;
    const held = totalBalance(balance);
    if (bank.unit === 'USD') {
      if (isSpendable(bank)) add(`${bank.label}, at face`, roundToCents(held), ownFigure(`${bank.label} at the close`));
    } else {
      const worth = worthOfKwh(bank, plan, paper, held);
      add(
        `${bank.label}, ${held.toString()} kWh at what they will offset`,
        worth,
        ownFigure(`${bank.label} at the close`),
      );
    }
  }
  const { amountDueCents, source } = paper.statement;
  if (amountDueCents < 0) add('Credit balance of the account', cents(-amountDueCents), paperSourceOf(source, null));
  return {
    amountCents: sumCents(parts),
    working: {
      words: parts.length === 0 ? 'The utility holds no credit' : inputs.map((one) => one.label).join(' + '),
      formula: parts.length === 0 ? '0' : inputs.map((one) => one.name).join(' + '),
      inputs,
      unit: 'USD',
      basis: 'computed',
    },
  };
}

function isSpendable(bank: PlanBank): boolean {
  return bank.offsets.length > 0 || bank.trueUps.some((trueUp) => trueUp.action === 'pay');
}

function isIncentiveOnly(bank: PlanBank, plan: RatePlan): boolean {
  const fed = plan.credits.filter((credit) => credit.to === bank.id);
  return bank.unit === 'USD' && fed.length > 0 && fed.every((credit) => credit.kind === 'incentive');
}

function worthOfKwh(bank: PlanBank, plan: RatePlan, paper: CyclePaper, held: Exact): Cents {
  if (held.isZero()) return ZERO_CENTS;
  const priced = bank.offsets.flatMap((charge) => {
    const one = priceQuantity(plan, charge, paper.from, paper.to, held.toString());
    return one === null ? [] : [one.amountCents];
  });
  if (priced.length > 0) return sumCents(priced);
  const payout = bank.trueUps.find((trueUp) => trueUp.action === 'pay' && trueUp.rates !== null);
  const rate = payout?.rates?.filter((row) => row.from <= paper.to).at(-1)?.rate;
  return rate === undefined ? ZERO_CENTS : roundToCents(held.times(exact(rate)));
}
