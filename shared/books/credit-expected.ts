import type { CreditFacts, CreditYear } from '../facts/finance.ts';
import type { Cents } from '../units/cents.ts';
import { addDays, type Day, dayOf } from '../units/day.ts';
import { creditCashOn, creditLinesOf } from './credit-entries.ts';

export type ExpectedCredit = { taxYear: number; on: Day; amountCents: Cents };

/**
 * The parts of the credit whose limit is typed and whose money has not come: on the day the owner states, else 15 April after the tax year (when a
 * calendar-year return is due: 26 U.S.C. 6072(a), from memory), and never before tomorrow. What no year plans for is not expected on any day.
 */
export function creditExpected(credit: CreditFacts, today: Day): ExpectedCredit[] {
  return creditLinesOf(credit).flatMap((line) => {
    const year = credit.years.find((one) => one.taxYear === line.taxYear);
    if (!year || line.line15Cents === null || line.line15Cents === 0) return [];
    const cameOn = creditCashOn(year);
    if (cameOn !== null && cameOn <= today) return [];
    const stated = statedDay(year) ?? dayOf(line.taxYear + 1, 4, 15);
    const isPast = stated <= today;
    return [{ taxYear: line.taxYear, on: isPast ? addDays(today, 1) : stated, amountCents: line.line15Cents }];
  });
}

function statedDay(year: CreditYear): Day | null {
  return year.asRefund ? year.refundOn : (year.refundOn ?? year.filedOn);
}
