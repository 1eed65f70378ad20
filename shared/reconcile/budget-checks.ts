import { electricCents, electricLines } from '../ledger/due-parts.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import { cents, dollarsText, ZERO_CENTS } from '../units/cents.ts';
import { balanceCauses, eitherOf } from './budget-causes.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareCents, nothingToCompare } from './make-check.ts';
import { totalToleranceCents } from './tolerance.ts';

const TITLE = 'Budget balance carries over';

/**
 * On a budget plan: balance = last balance + the real charges for electricity − budget amount − settlement (common practice, no source). The
 * statement's whole lines are taken, also where its cycle is split at switch-on. Null where neither this statement nor the last is on a plan.
 */
export function budgetChainCheck({ paper: { statement, previous } }: CheckContext): Check | null {
  const { budget } = statement;
  const last = previous === null ? null : previous.budget;
  if (budget === null) {
    if (previous === null || last === null || last.balanceCents === null || last.balanceCents === 0) return null;
    return nothingToCompare('budgetChain', '', 'USD', {
      title: TITLE,
      found: dollarsText(last.balanceCents),
      cause: `The statement of ${sayDate(previous.statementOn ?? previous.to)} left a budget balance of ${sayMoney(last.balanceCents)}; this one is on no budget plan.`,
      advice: 'Look for a settlement on this bill and add it, or ask the utility what became of the balance.',
    });
  }
  const { instalmentCents, balanceCents } = budget;
  const settledCents = budget.settledCents ?? ZERO_CENTS;
  const lastCents = previous === null ? null : last === null ? ZERO_CENTS : last.balanceCents;
  if (balanceCents === null || lastCents === null) {
    return nothingToCompare('budgetChain', '', 'USD', {
      title: TITLE,
      stated: balanceCents === null ? null : dollarsText(balanceCents),
      cause:
        balanceCents === null
          ? 'The statement prints no budget balance.'
          : 'No earlier statement prints a budget balance to go on from.',
    });
  }
  const charges = electricCents(statement.lines);
  const found = cents(lastCents + charges - instalmentCents - settledCents);
  const tolerance = cents(totalToleranceCents(electricLines(statement.lines).length));
  // A plan that begins here begins at nothing; whether it does, a statement before without budget figures does not say.
  if (last === null && Math.abs(balanceCents - found) > tolerance) {
    return nothingToCompare('budgetChain', '', 'USD', {
      title: TITLE,
      stated: dollarsText(balanceCents),
      cause: `The statement before has no budget figures. Had the plan begun with this one, its balance would be ${sayMoney(found)}.`,
      advice: 'Add the budget amount and balance to the earlier statement.',
    });
  }
  return compareCents('budgetChain', '', TITLE, { stated: balanceCents, found, tolerance }, () => {
    const figures = { instalment: instalmentCents, settled: settledCents, charges, balance: balanceCents };
    const settling = settledCents === 0 ? '' : ` − ${sayMoney(settledCents)} settled`;
    return {
      cause: eitherOf(
        balanceCauses(figures, lastCents, cents(balanceCents - found)),
        `${sayMoney(lastCents)} carried + ${sayMoney(charges)} of charges − ${sayMoney(instalmentCents)}${settling} comes to ${sayMoney(found)}; the statement prints ${sayMoney(balanceCents)}.`,
      ),
      advice: 'Ask the utility for the budget plan’s own account, month by month.',
    };
  });
}
