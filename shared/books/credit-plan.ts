import type { CreditFacts } from '../facts/finance.ts';
import type { Cents } from '../units/cents.ts';
import { creditLinesOf } from './credit-entries.ts';

/** A year for which no return is filed: what the owner expects its limit to be, and what that would use and leave. Null until a limit is typed. */
export type PlannedUse = {
  taxYear: number;
  expectedLimitCents: Cents | null;
  usesCents: Cents | null;
  leavesCents: Cents | null;
};

export type CreditPlan = {
  /** What the last filed return left, or what was carried in, with what is earned after it; null where a limit on the way is missing. */
  leftCents: Cents | null;
  years: PlannedUse[];
  /** What no year plans for; null where a planned year has no limit yet. */
  unplannedCents: Cents | null;
};

/** How the owner means to use what is left. A plan and no promise: the limit of a return comes from that return. */
export function creditPlan(credit: CreditFacts): CreditPlan {
  const lines = creditLinesOf(credit);
  const filed = new Set(credit.years.filter((year) => year.status !== 'planned').map((year) => year.taxYear));
  const ahead = lines.filter((line) => !filed.has(line.taxYear));
  const first = ahead[0];
  const last = lines.at(-1);
  const carried = last === undefined ? (credit.carriedIn?.amountCents ?? null) : last.line16Cents;
  return {
    leftCents: first === undefined ? carried : first.line13Cents,
    years: ahead.map((line) => ({
      taxYear: line.taxYear,
      expectedLimitCents: line.line14Cents,
      usesCents: line.line15Cents,
      leavesCents: line.line16Cents,
    })),
    unplannedCents: carried,
  };
}
