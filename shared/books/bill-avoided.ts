import { sayMoney } from '../ledger/say.ts';
import { type Cents, subtractCents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { UnplacedEntry } from './book.ts';
import { stated, usdInput } from './inputs.ts';

/** How the use behind the bill without the roof is known; the same words as a cycle's `withoutRoof.method`. */
export type BillAvoidedMethod = 'measured' | 'sameMonthBefore' | 'yearlyMeanBefore';

export type BillAvoidedInput = {
  from: Day;
  to: Day;
  /** The bill for the same use without the roof. */
  withoutRoofCents: Cents;
  /** Current electric charges as billed, an incentive paid inside the bill added back. */
  asItWasCents: Cents;
  method: BillAvoidedMethod;
  estimated: boolean;
};

const LABELS: Record<BillAvoidedMethod, string> = {
  measured: 'Bill avoided, on the use as measured',
  sameMonthBefore: 'Bill avoided, on the use of the same month before the roof',
  yearlyMeanBefore: 'Bill avoided, on the mean use of the year before the roof',
};

/**
 * What credit sent to other service points took off their bills in a cycle, as the owner states it from those bills. Without that nothing is counted:
 * its worth there is not on this bill.
 */
export function sharedCreditEntry(to: Day, valueCents: Cents): UnplacedEntry {
  return {
    id: `shared-credit-${to}`,
    date: to,
    book: 'billAvoided',
    kind: 'sharedCredit',
    label: 'Saved on the bills of other service points',
    amountCents: valueCents,
    basis: 'avoided',
    estimated: false,
    working: {
      words: `${sayMoney(valueCents)} as printed on the other bill`,
      formula: 'printed',
      inputs: [usdInput('printed', 'As printed on the other bill', valueCents, stated('The other bill'))],
      unit: 'USD',
      basis: 'entered',
    },
  };
}

/** The cycle's entry in the first book: what the roof kept off the bill, dated on the cycle's `to`. */
export function billAvoidedEntry(input: BillAvoidedInput): UnplacedEntry {
  const estimated = input.estimated || input.method !== 'measured';
  return {
    id: `bill-avoided-${input.to}`,
    date: input.to,
    book: 'billAvoided',
    kind: 'avoided',
    label: LABELS[input.method],
    amountCents: subtractCents(input.withoutRoofCents, input.asItWasCents),
    basis: 'avoided',
    estimated,
    working: {
      words: `${sayMoney(input.withoutRoofCents)} without the roof − ${sayMoney(input.asItWasCents)} as it was`,
      formula: 'without - was',
      inputs: [
        usdInput('without', 'Bill without the roof', input.withoutRoofCents, stated('Bill without the roof')),
        usdInput('was', 'Bill as it was', input.asItWasCents, stated('Bill as it was')),
      ],
      unit: 'USD',
      basis: estimated ? 'estimated' : 'computed',
    },
  };
}
