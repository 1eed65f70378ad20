import { loanClearedOn } from '../books/loan.ts';
import { loanBook } from '../books/loan-book.ts';
import type { BasisFacts } from '../position/basis.ts';
import { loansOf } from '../position/loans.ts';
import type { ProjectedMonth } from '../position/position.ts';
import { keptAt } from '../settlement/place.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import { type Day, latestDay } from '../units/day.ts';

/** What a projection comes to, in the figures a change is judged by. */
export type Outcome = {
  months: readonly ProjectedMonth[];
  /** The first day from which settled today stays at or above zero; null where it does not within the horizon. */
  evenOn: Day | null;
  /** Settled today at the horizon, or on the day of a sale. */
  settledCents: Cents;
  /** Interest of the loans still to be paid. */
  interestCents: Cents;
  /** The regular payment a month in force after everything that changes it; null without a loan. */
  paymentCents: Cents | null;
  /** The day from which no loan is owed for good; null without a loan, or where its schedule does not end. */
  paidOffOn: Day | null;
  /** Bill avoided over the first twelve whole months to come; null where the horizon is shorter. */
  firstYearAvoidedCents: Cents | null;
};

/** The figures of projected months under these facts, counted from `from` (the last close) to `endsOn` (a sale) or the horizon. */
export function outcomeOf(
  facts: BasisFacts,
  projected: { months: readonly ProjectedMonth[]; evenOn: Day | null },
  from: Day,
  endsOn: Day | null,
): Outcome {
  const { months, evenOn } = projected;
  const loans = loansOf(facts);
  const last = keptAt(months, months.length - 1);
  const until = endsOn ?? last.on;
  const interest = loans.flatMap((loan) =>
    loanBook(loan)
      .steps.filter((step) => step.on >= from && step.on < until)
      .map((step) => step.interestCents),
  );
  const payments = loans.map((loan) => loanBook(loan).levels.at(-1)?.paymentCents ?? cents(0));
  const cleared = loans.map((loan) => loanClearedOn(loan));
  return {
    months,
    evenOn,
    settledCents: last.settledTodayCents,
    interestCents: sumCents(interest),
    paymentCents: loans.length === 0 ? null : sumCents(payments),
    paidOffOn: paidOff(cleared, endsOn),
    firstYearAvoidedCents:
      months.length < 13 ? null : sumCents(months.slice(1, 13).map((month) => month.books.billAvoided)),
  };
}

/** The last of the loans to be cleared; a sale clears each that runs on past it. */
function paidOff(cleared: readonly (Day | null)[], endsOn: Day | null): Day | null {
  const known = cleared.map((on) => (on === null || (endsOn !== null && endsOn < on) ? endsOn : on));
  const [first, ...others] = known.filter((on) => on !== null);
  return first === undefined || known.includes(null) ? null : latestDay(first, ...others);
}
