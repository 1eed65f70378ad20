import type { SettledAmounts } from '../../settlement/settle.ts';
import type { SettledBank } from '../../settlement/settlement.ts';
import { type Cents, cents, dollarsText } from '../../units/cents.ts';
import { decimalTextOf, Exact, roundToCents } from '../../units/rate.ts';
import type { BankShort } from './cause.ts';

/** What was asked for or withheld too much, over all cycles: current charges billed − due, and payouts due − paid. */
export function overbilled(truth: readonly SettledAmounts[], made: readonly SettledAmounts[]): Cents {
  return cents(taken(made) - taken(truth));
}

function taken(cycles: readonly SettledAmounts[]): number {
  let sum = 0;
  for (const { settlement } of cycles) {
    for (const line of settlement.lines) {
      if (line.inDue && line.kind !== 'previousBalance' && line.kind !== 'payment') sum += line.amountCents;
    }
    for (const payout of settlement.payouts) sum -= payout.amountCents;
  }
  return sum;
}

/** What each bank of the last cycle lacks at its close. */
export function bankShort(truth: readonly SettledAmounts[], made: readonly SettledAmounts[]): BankShort[] {
  const held = made.slice(-1).flatMap(({ settlement }) => settlement.banks);
  return truth.slice(-1).flatMap(({ settlement }) =>
    settlement.banks.map((bank) => {
      const same = held.filter((one) => one.bank === bank.bank && one.period === bank.period);
      return { bank: bank.bank, period: bank.period, unit: bank.unit, short: shortOf(bank, same) };
    }),
  );
}

function shortOf({ unit, move }: SettledBank, held: readonly SettledBank[]): string {
  const short = held.reduce((left, bank) => left.minus(bank.move.close), new Exact(move.close));
  return unit === 'USD' ? dollarsText(roundToCents(short)) : decimalTextOf(short);
}
