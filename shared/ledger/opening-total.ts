import type { OpeningBalance } from '../settlement/settlement.ts';
import { Exact, exact } from '../units/rate.ts';

/** The whole of a bank's balance in its unit, whether plain, by period or in lots. */
export function totalBalance(balance: OpeningBalance): Exact {
  if (typeof balance === 'string') return exact(balance);
  const values =
    'lots' in balance && Array.isArray(balance.lots)
      ? balance.lots.map((lot) => lot.amount)
      : Object.values(balance).map(String);
  return values.reduce((sum, value) => sum.plus(exact(value)), new Exact(0));
}
