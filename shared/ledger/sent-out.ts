import type { PrintedBank, Statement } from '../facts/papers.ts';
import { closingBalance } from '../settlement/bank-state.ts';
import { compare, exactText, lesser, minus, qtyOfText } from '../settlement/quantity.ts';
import type { Lot, SettledBank } from '../settlement/settlement.ts';
import { dollarsText, parseDollars } from '../units/cents.ts';
import type { SentOut } from './cycle.ts';
import type { Settled } from './settle-cycle.ts';

/** What the statement says was sent out of its banks, by the plan's id of each where `idOf` knows one; nothing where it says nothing. */
export function sentOutOf(statement: Statement, idOf: (printed: PrintedBank) => string | null): SentOut[] {
  return statement.banks.flatMap((printed) => {
    const { sentOut, sentValueCents, unit } = printed;
    if (sentOut === null || compare(qtyOfText(sentOut), 0) <= 0) return [];
    return [{ bank: idOf(printed) ?? printed.bank, unit, amount: sentOut, valueCents: sentValueCents }];
  });
}

/**
 * A settled cycle with its banks closing at what is left once credit went to other service points: close = open + earned − used − expired − paid −
 * sent out. What was sent is a stated fact: no rate plan says it. A bank kept by period is left as it is, since one printed figure does not say of
 * which period it is.
 */
export function withSentOut(settled: Settled, sent: readonly SentOut[]): Settled {
  if (sent.length === 0) return settled;
  const { settlement, closing } = settled;
  const banks = settlement.banks.map((bank) => {
    const own = sent.find((one) => one.bank === bank.bank && one.unit === bank.unit);
    return own === undefined || bank.period !== null ? bank : lessBy(bank, own.amount);
  });
  const balances = { ...closing.banks };
  for (const [at, bank] of banks.entries()) {
    if (bank !== settlement.banks[at]) balances[bank.bank] = closingBalance([bank]);
  }
  return { settlement: { ...settlement, banks }, closing: { ...closing, banks: balances } };
}

function lessBy(bank: SettledBank, amount: string): SettledBank {
  const { move, lots, unit } = bank;
  return {
    ...bank,
    move: { ...move, close: difference(move.close, amount, unit) },
    lots: lots && lotsLessBy(lots, amount, unit),
  };
}

/** Oldest lots first, as the bank itself spends them. */
function lotsLessBy(lots: readonly Lot[], amount: string, unit: 'kWh' | 'USD'): Lot[] {
  let left = qtyOfText(amount);
  return lots.flatMap((lot) => {
    const part = lesser(qtyOfText(lot.amount), left);
    left = minus(left, part);
    const rest = difference(lot.amount, exactText(part), unit);
    return compare(qtyOfText(rest), 0) === 0 ? [] : [{ ...lot, amount: rest }];
  });
}

function difference(from: string, less: string, unit: 'kWh' | 'USD'): string {
  const rest = exactText(minus(qtyOfText(from), qtyOfText(less)));
  // A bank in dollars is written to the cent; what is not whole cents stays as it was stated.
  const cents = unit === 'USD' ? parseDollars(rest) : null;
  return cents === null ? rest : dollarsText(cents);
}
