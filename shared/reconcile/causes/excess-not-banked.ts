import { sayMoney } from '../../ledger/say.ts';
import type { PlanBank } from '../../settlement/plan.ts';
import type { SettledBank } from '../../settlement/settlement.ts';
import { decimalTextOf, Exact, exact, roundToCents } from '../../units/rate.ts';
import { withClose } from './bank-move.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';

/**
 * What the cycle earned beyond its own use is not put into the bank (net-metering.md §4, "missed rollover": N < 0 ⇒ earned = −N). Tried with the
 * earning left out of the statement, with it shown and not added, and for dollars with only the part spent in the cycle shown.
 */
export const excessNotBanked = hypothesis('excessNotBanked', (place) =>
  place.cycle.plan.banks.flatMap((bank) => editsFor(place, bank)),
);

function editsFor({ truth }: Place, bank: PlanBank): Edit[] {
  const pockets = truth.settlement.banks.filter((pocket) => pocket.bank === bank.id);
  const lost = pockets.reduce((sum, pocket) => sum.plus(leftOver(pocket, bank)), new Exact(0));
  if (lost.lte(0)) return [];
  const amount = bank.unit === 'USD' ? sayMoney(roundToCents(lost)) : `${decimalTextOf(lost)} kWh`;
  const words = `${amount} of this cycle were not added to ${bank.label}.`;
  return [true, false].map((asEarned) =>
    edit(
      `${bank.id}:${asEarned}`,
      { after: (settled) => withClose(settled, bank, (pocket) => leftOver(pocket, bank).neg(), asEarned) },
      words,
      { bank: bank.id, amount: decimalTextOf(lost) },
    ),
  );
}

/** What this cycle added to the balance: its earnings less what was taken of them at once. */
function leftOver({ move }: SettledBank, { sameCycle }: PlanBank): Exact {
  const earned = exact(move.earned);
  return Exact.max(sameCycle ? earned.minus(exact(move.used)) : earned, 0);
}
