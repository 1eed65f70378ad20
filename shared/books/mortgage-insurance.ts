import type { MortgageFacts } from '../facts/finance.ts';
import { sayMoney } from '../ledger/say.ts';
import type { Cents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { Working } from '../working.ts';
import type { UnplacedEntry } from './book.ts';
import { stated, usdInput } from './inputs.ts';
import { lastPaymentBy, mortgagePaymentDay } from './mortgage-balance.ts';
import { governingEnd } from './mortgage-ends.ts';
import { premiumOn } from './mortgage-premium.ts';

export { type GoverningEnd, governingEnd, type InsuranceEnd, insuranceEnds } from './mortgage-ends.ts';

/**
 * Premiums not paid because of the roof, one on each payment's due date from the removal to the day the insurance could have gone anyway (the last
 * one is due with the payment of that day), through a day. None while it is still paid, or where the roof was not the cause.
 */
export function insuranceEntries(mortgage: MortgageFacts, through: Day): UnplacedEntry[] {
  const { insurance } = mortgage;
  if (insurance === null || insurance.removedOn === null || !insurance.becauseOfRoof) return [];
  const ending = governingEnd(mortgage);
  const last = Math.min(ending.payment, lastPaymentBy(mortgage, through));
  const paidBefore = lastPaymentBy(mortgage, insurance.removedOn);
  const firstNumber = mortgagePaymentDay(mortgage, paidBefore) === insurance.removedOn ? paidBefore : paidBefore + 1;
  const workings = new Map<number, Working>();
  const workingOf = (premium: Cents): Working => {
    const known = workings.get(premium);
    if (known) return known;
    const made: Working = {
      words: `${sayMoney(premium)} a month, not paid because of the roof. ${ending.words}`,
      formula: 'premium',
      inputs: [usdInput('premium', 'Premium a month', premium, stated('Mortgage insurance as entered'))],
      unit: 'USD',
      basis: 'computed',
    };
    workings.set(premium, made);
    return made;
  };
  const entries: UnplacedEntry[] = [];
  for (let number = Math.max(1, firstNumber); number <= last; number += 1) {
    const date = mortgagePaymentDay(mortgage, number);
    const premium = premiumOn(mortgage, date);
    if (premium === 0) continue;
    entries.push({
      id: `insurance-${number}`,
      date,
      book: 'insurance',
      kind: 'premium',
      label: `Mortgage insurance not paid, with payment ${number}`,
      amountCents: premium,
      basis: 'avoided',
      estimated: false,
      working: workingOf(premium),
    });
  }
  return entries;
}
