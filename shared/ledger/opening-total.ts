import { wholeBalance } from '../settlement/bank-state.ts';
import { exactText } from '../settlement/quantity.ts';
import type { OpeningBalance } from '../settlement/settlement.ts';
import { type Exact, exact } from '../units/rate.ts';

/** The whole of a bank's balance in its unit, whether plain, by period, in lots, or in lots by period. */
export function totalBalance(balance: OpeningBalance): Exact {
  return exact(exactText(wholeBalance(balance)));
}
