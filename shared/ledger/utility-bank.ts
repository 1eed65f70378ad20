import { input, ownFigure } from '../metering/source.ts';
import { bankWorth } from '../position/bank-worth.ts';
import type { Figure } from '../position/position.ts';
import type { RatePlan } from '../settlement/plan.ts';
import type { Opening } from '../settlement/settlement.ts';
import { type Cents, cents, dollarsText, sumCents } from '../units/cents.ts';
import type { WorkingInput } from '../working.ts';
import type { CyclePaper } from './cycle-papers.ts';
import { totalBalance } from './opening-total.ts';

/**
 * What the utility holds for the house after a cycle: its banks (`bankWorth`). A credit balance of the account is not among them: a bill below
 * zero is counted in full as bill avoided when it is billed, and a payment never is, so that its balance would count twice. That dollar credits
 * are spent before they expire is taken for granted here; the projection settles it month by month.
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
    if (balance === undefined || plan === null) continue;
    const worth = cents(bankWorth(plan, { ...closing, banks: { [bank.id]: balance } }, paper.from, paper.to));
    const held = totalBalance(balance).toString();
    const label =
      bank.unit === 'USD'
        ? `${bank.label}, at face`
        : `${bank.label}, ${held} kWh at the price of what they will offset`;
    add(label, worth, ownFigure(`${bank.label} at the close of ${paper.to}`));
  }
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
