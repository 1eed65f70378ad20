import { closingBalance } from '../../settlement/bank-state.ts';
import type { PlanBank } from '../../settlement/plan.ts';
import type { SettledAmounts } from '../../settlement/settle.ts';
import type { Lot, SettledBank } from '../../settlement/settlement.ts';
import { dollarsText } from '../../units/cents.ts';
import type { Day } from '../../units/day.ts';
import { decimalTextOf, Exact, roundToCents } from '../../units/rate.ts';

/**
 * A settled cycle in which a bank closes with more or less than it should: `more` says how much, for each of its balances. Under `asEarned` it is
 * shown as earned. Null where the bank was trued up at this close, for then what would have become of the rest is not known.
 */
export function withClose(
  settled: SettledAmounts,
  bank: PlanBank,
  more: (pocket: SettledBank) => Exact,
  asEarned: boolean,
): SettledAmounts | null {
  const { settlement, closing } = settled;
  const own = settlement.banks.filter((pocket) => pocket.bank === bank.id);
  if (own.some(isTruedUp)) return null;
  const life = bank.lotLife === null ? 0 : bank.lotLife.cycles;
  const moved = new Map(own.map((pocket) => [pocket, moveClose(pocket, more(pocket), asEarned, settlement.to, life)]));
  return {
    settlement: { ...settlement, banks: settlement.banks.map((pocket) => moved.get(pocket) ?? pocket) },
    closing: { ...closing, banks: { ...closing.banks, [bank.id]: closingBalance([...moved.values()]) } },
  };
}

function isTruedUp({ move, lots }: SettledBank): boolean {
  return !new Exact(move.paid).isZero() || (lots === null && !new Exact(move.expired).isZero());
}

function moveClose(pocket: SettledBank, more: Exact, asEarned: boolean, to: Day, life: number): SettledBank {
  const say = (value: Exact) => (pocket.unit === 'USD' ? dollarsText(roundToCents(value)) : decimalTextOf(value));
  const { move, lots } = pocket;
  return {
    ...pocket,
    move: {
      ...move,
      earned: asEarned ? say(more.plus(move.earned)) : move.earned,
      close: say(more.plus(move.close)),
    },
    lots: lots === null ? null : moveLot(lots, more, to, life, say),
  };
}

/** What a cycle earned is its own lot. */
function moveLot(lots: readonly Lot[], more: Exact, to: Day, life: number, say: (value: Exact) => string): Lot[] {
  const amount = lots.filter((lot) => lot.earned === to).reduce((sum, lot) => sum.plus(lot.amount), more);
  const others = lots.filter((lot) => lot.earned !== to);
  return amount.gt(0) ? [...others, { earned: to, amount: say(amount), cyclesLeft: life }] : others;
}
