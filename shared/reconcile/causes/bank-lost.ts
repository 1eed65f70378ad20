import { sayMoney } from '../../ledger/say.ts';
import type { Opening, OpeningBalance, SettledBank } from '../../settlement/settlement.ts';
import { decimalTextOf, Exact, exact, roundToCents } from '../../units/rate.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { eachAndAll } from './plan-edit.ts';

/** A bank, or one period of it, opens empty though the statement before closed with something (net-metering.md §4, "lost at rate or supplier change"). */
export const bankLost = hypothesis('bankLost', editsOf);

function editsOf(place: Place): Edit[] {
  const held = place.truth.settlement.banks.filter((bank) => !exact(bank.move.open).isZero());
  const when = whenOf(place);
  const ids = [...new Set(held.map((bank) => bank.bank))];
  const whole = eachAndAll(ids).map((lost) => {
    const said = lost.map((id) => sayLost(held.filter((bank) => bank.bank === id)));
    const opening = (before: Opening) => emptied(before, lost, () => '0');
    return edit(lost.join(), { opening }, `${said.join(' ')}${when}`, { banks: lost.join(', ') });
  });
  const periods = held.flatMap((bank) => {
    const { period } = bank;
    if (period === null) return [];
    const opening = (before: Opening) => emptied(before, [bank.bank], (balance) => withoutPeriod(balance, period));
    return [edit(`${bank.bank}:${period}`, { opening }, `${sayLost([bank])}${when}`, { banks: bank.bank, period })];
  });
  return [...whole, ...periods];
}

function sayLost(banks: readonly SettledBank[]): string {
  const sum = banks.reduce((total, bank) => total.plus(bank.move.open), new Exact(0));
  const [name] = banks.map((bank) =>
    bank.period !== null && banks.length === 1 ? `${bank.label}, ${bank.period},` : bank.label,
  );
  const [unit] = banks.map((bank) => bank.unit);
  const amount = unit === 'USD' ? sayMoney(roundToCents(sum)) : `${decimalTextOf(sum)} kWh`;
  return `${name} opens with nothing; the statement before closed with ${amount}.`;
}

/** At what the balance went lost, where the inputs show it. */
function whenOf({ planBefore, cycle: { plan, usage }, truth }: Place): string {
  // A plan with a rider's price put in is still the same plan.
  const same = planBefore === null || (planBefore.name === plan.name && planBefore.banks === plan.banks);
  if (!same) return ' The rate plan changed with this cycle.';
  const change = truth.settlement.lines.some((line) => line.from !== null && line.from > usage.from);
  return change ? ' A price changed in this cycle.' : '';
}

function emptied(
  before: Opening,
  ids: readonly string[],
  change: (balance: OpeningBalance) => OpeningBalance,
): Opening {
  const banks = { ...before.banks };
  for (const [id, balance] of Object.entries(before.banks)) if (ids.includes(id)) banks[id] = change(balance);
  return { ...before, banks };
}

function withoutPeriod(balance: OpeningBalance, period: string): OpeningBalance {
  const left = Object.entries(balance).filter(([name]) => name !== period);
  return Object.fromEntries(left);
}
