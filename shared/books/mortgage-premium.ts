import type { MortgageFacts } from '../facts/finance.ts';
import { type Cents, ZERO_CENTS } from '../units/cents.ts';
import type { Day } from '../units/day.ts';

/** The premium of a month by the day of its payment: the last that begins on or before it, else the one it started with; zero without insurance. */
export function premiumOn({ insurance, premiums }: MortgageFacts, on: Day): Cents {
  if (insurance === null) return ZERO_CENTS;
  let from: Day | null = null;
  let premium = insurance.premiumMonthlyCents;
  for (const one of premiums) {
    if (one.from > on || (from !== null && one.from < from)) continue;
    from = one.from;
    premium = one.premiumMonthlyCents;
  }
  return premium;
}
