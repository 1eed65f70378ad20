import type { LoanFacts, Refinance } from '../facts/finance.ts';
import { type Cents, cents, ZERO_CENTS } from '../units/cents.ts';
import type { DecimalText } from '../units/rate-text.ts';
import type { SegmentTerms } from './loan-happenings.ts';
import { firstRate, SegmentRun } from './loan-segment.ts';
import type { LoanLevel, LoanRow, LoanSegment, LoanStep } from './loan-step.ts';

export type { LoanRow, LoanStep } from './loan-step.ts';

export type LoanBook = {
  /** The first level payment; zero where there never is one. */
  levelCents: Cents;
  /** Every level payment in the order in which it came into force. */
  levels: LoanLevel[];
  /** The loan as first made, then each that refinanced it. */
  segments: [LoanSegment, ...LoanSegment[]];
  /** The rate on the first day. */
  firstRate: DecimalText;
  /** All that happened and will happen, in order of days. */
  steps: LoanStep[];
  rows: LoanRow[];
};

const books = new WeakMap<LoanFacts, LoanBook>();

/**
 * The loan month by month, from its funding to the payment that clears it. Remembered by facts object: a projection asks hundreds of times.
 *
 * Records replace the scheduled payment of their calendar month; a month without one is taken as paid to schedule, and a month whose records are extra
 * principal alone keeps its scheduled payment. A payment pays interest due first. Interest that a short or missing payment leaves stays due, apart from
 * principal and without interest on it (as simple-interest loans do), and the next payment pays it first. Extra principal goes to principal whole; the
 * level payment stays and the term shortens, unless the payment says that the lender re-amortized. The last payment of the term clears the loan.
 *
 * Interest by 30/360 is a twelfth of a year from due day to due day, whenever in the month the payment was made, and 30/360 days up to a payment of principal
 * alone; by actual days it runs from payment to payment. Interest from funding to a month before the first payment joins the principal then. When the
 * payment is set anew (a promotion's end, an assumed prepayment's date, a re-amortization) interest that was left unpaid joins the principal. All of this is
 * common practice, no source.
 *
 * A lender's balance stands in the place of ours from its day on. A refinance pays the old loan off on its day: what is dated before it, or recorded on it, is
 * the old loan's; the payoff fee is that of the first contract alone. A balance below zero is an overpayment the lender owes back.
 */
export function loanBook(loan: LoanFacts): LoanBook {
  const known = books.get(loan);
  if (known) return known;
  const made = buildLoanBook(loan);
  books.set(loan, made);
  return made;
}

function buildLoanBook(loan: LoanFacts): LoanBook {
  const all = segmentTerms(loan);
  const steps: LoanStep[] = [];
  const rows: LoanRow[] = [];
  const levels: LoanLevel[] = [];
  for (const terms of all) {
    const run = new SegmentRun(terms).run();
    const closing = steps.at(-1);
    if (closing?.refinance) steps.push(openedBy(closing, terms.segment, closing.refinance));
    steps.push(...run.steps);
    rows.push(...run.rows);
    levels.push(...run.levels);
  }
  const [first, ...refinanced] = all;
  return {
    levelCents: levels[0]?.paymentCents ?? ZERO_CENTS,
    levels,
    segments: [first.segment, ...refinanced.map(({ segment }) => segment)],
    firstRate: firstRate(first),
    steps,
    rows,
  };
}

/** The first loan and each that refinanced it, with the payments and balances of its own days. */
function segmentTerms(loan: LoanFacts): [SegmentTerms, ...SegmentTerms[]] {
  const refinances = [...loan.refinances].sort((a, b) => (a.on < b.on ? -1 : 1));
  const within = (index: number) => {
    const opened = refinances[index - 1] ?? null;
    const refinance = refinances[index] ?? null;
    return {
      payments: loan.payments.filter(
        ({ on }) => (opened === null || on > opened.on) && (refinance === null || on <= refinance.on),
      ),
      balances: loan.balances.filter(
        ({ on }) => (opened === null || on >= opened.on) && (refinance === null || on < refinance.on),
      ),
      refinance,
    };
  };
  const { lender, principalCents, annualRate, termMonths, fundedOn, firstPaymentOn, dayCount, payoffFeeCents } = loan;
  const first: LoanSegment = {
    index: 0,
    lender,
    principalCents,
    annualRate,
    termMonths,
    fundedOn,
    firstPaymentOn,
    dayCount,
    payoffFeeCents,
  };
  const rest = refinances.map((one, at): SegmentTerms => {
    const index = at + 1;
    return { segment: refinancedSegment(one, index, loan), promotion: null, assumed: null, ...within(index) };
  });
  return [{ segment: first, promotion: loan.promotion, assumed: loan.assumedPrepayment, ...within(0) }, ...rest];
}

function refinancedSegment(refinance: Refinance, index: number, { dayCount }: LoanFacts): LoanSegment {
  const { lender, principalCents, annualRate, termMonths, on, firstPaymentOn } = refinance;
  return {
    index,
    lender,
    principalCents,
    annualRate,
    termMonths,
    fundedOn: on,
    firstPaymentOn,
    dayCount,
    payoffFeeCents: ZERO_CENTS,
  };
}

/** The new loan's money pays the old one off; the household pays the rest and the costs, or keeps what is over. */
function openedBy(closing: LoanStep, segment: LoanSegment, refinance: Refinance): LoanStep {
  const { principalCents } = segment;
  return {
    ...closing,
    kind: 'opened',
    segment,
    number: 0,
    dueOn: segment.firstPaymentOn,
    interestCents: ZERO_CENTS,
    principalCents: ZERO_CENTS,
    feeCents: ZERO_CENTS,
    balanceBeforeCents: ZERO_CENTS,
    balanceCents: principalCents,
    interestDueCents: ZERO_CENTS,
    unpaidInterestCents: ZERO_CENTS,
    accruedTo: refinance.on,
    rateAfter: segment.annualRate,
    cashCents: cents(principalCents - payoffOf(closing) - refinance.costsCents),
  };
}

/** What a refinance paid the old lender. */
export function payoffOf(closing: LoanStep): Cents {
  return cents(closing.principalCents + closing.interestCents + closing.feeCents);
}
