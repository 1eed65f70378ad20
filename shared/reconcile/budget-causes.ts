import { sayMoney } from '../ledger/say.ts';
import type { Cents } from '../units/cents.ts';

/** What a bill on a budget plan says of it, and its real charges for electricity. */
export type BudgetFigures = {
  instalment: Cents;
  settled: Cents;
  charges: Cents;
  /** The balance after this bill as printed; null where it is not. */
  balance: Cents | null;
};

type Try = { gives: number; words: string };

/**
 * Why an amount due is off by `difference`, found by trying: each mistake that alone gives the printed cents, in words. Empty where none does.
 * (The mistakes are common practice, no source.)
 */
export function dueCauses({ instalment, settled, charges, balance }: BudgetFigures, difference: Cents): string[] {
  return reproducing(difference, [
    { gives: instalment, words: `The budget amount of ${sayMoney(instalment)} is charged twice.` },
    { gives: -instalment, words: `The budget amount of ${sayMoney(instalment)} is left out.` },
    { gives: charges, words: `The real charges of ${sayMoney(charges)} are charged on top of the budget amount.` },
    {
      gives: charges - instalment,
      words: `The real charges of ${sayMoney(charges)} are asked for in place of the budget amount.`,
    },
    { gives: settled, words: `The settlement of ${sayMoney(settled)} is counted twice.` },
    { gives: -settled, words: `The settlement of ${sayMoney(settled)} is left out.` },
    ...(balance === null
      ? []
      : [{ gives: balance, words: `The budget balance of ${sayMoney(balance)} is charged as if it were due.` }]),
  ]);
}

/** Why a printed budget balance is off by `difference`, found by trying; `last` is what the statement before closed with. */
export function balanceCauses(
  { instalment, settled, charges }: BudgetFigures,
  last: Cents,
  difference: Cents,
): string[] {
  return reproducing(difference, [
    { gives: -last, words: `The balance of ${sayMoney(last)} was not carried from the last statement.` },
    { gives: -charges, words: `The real charges of ${sayMoney(charges)} were not put into it.` },
    { gives: instalment, words: `The budget amount of ${sayMoney(instalment)} was not taken off it.` },
    { gives: -instalment, words: `The budget amount of ${sayMoney(instalment)} was taken off it twice.` },
    { gives: charges, words: `The real charges of ${sayMoney(charges)} were put into it twice.` },
    { gives: instalment - charges, words: 'It stands still: neither the charges nor the budget amount moved it.' },
    { gives: settled, words: `The settlement of ${sayMoney(settled)} was not taken off it.` },
    { gives: -2 * (last + charges - instalment - settled), words: 'Its sign is turned round.' },
  ]);
}

/** A mistake that changes nothing explains nothing. */
function reproducing(difference: Cents, tries: readonly Try[]): string[] {
  return tries.flatMap(({ gives, words }) => (gives !== 0 && gives === difference ? [words] : []));
}

/** One mistake as it is; several as what they are: each would do. */
export function eitherOf(words: readonly string[], otherwise: string): string {
  const [only] = words;
  if (only === undefined) return otherwise;
  return words.length === 1 ? only : `Any one of these gives exactly what is printed: ${words.join(' Or: ')}`;
}
