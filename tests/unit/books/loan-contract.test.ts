import { describe, expect, it } from 'vitest';
import { loanEntries, loanPayoff, loanSchedule, loanStateOn } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { prepaymentOutcomes } from '#shared/books/loan-outcomes.ts';
import type { LoanFacts } from '#shared/facts/finance.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { loanOf, paymentOf } from './facts.ts';

/** The 25-year solar loan of the checks: 38,400 at 4.99 % over 300 months, funded a month before its first payment. */
const solarOf = (changes: Partial<LoanFacts> = {}) =>
  loanOf({ principalCents: cents(3_840_000), annualRate: '0.0499', termMonths: 300, ...changes });

const ASSUMED = { amountCents: cents(1_152_000), byPayment: 18 };
const allWorkings = (loan: LoanFacts) => {
  for (const entry of loanEntries(loan, day('2100-01-01'))) {
    expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents)), entry.label).toBe(true);
  }
};

describe('how days are counted', () => {
  // 30,000 at 6.99 %: 30/360 month 174.75; actual/365 31 days 178.10, 28 days 160.87; actual/360 31 days 180.58 (own computation, exact fractions).
  const first = (dayCount: LoanFacts['dayCount'], fundedOn: string, firstPaymentOn: string) =>
    loanSchedule(loanOf({ dayCount, fundedOn: day(fundedOn), firstPaymentOn: day(firstPaymentOn) }))[0]?.interestCents;

  it('30/360 takes a twelfth of a year for every month', () => {
    expect(first('30/360', '2025-07-15', '2025-08-15')).toBe(17_475);
    expect(first('30/360', '2025-02-15', '2025-03-15')).toBe(17_475);
  });

  it('actual/365 and actual/360 take the days that passed', () => {
    expect(first('actual/365', '2025-07-15', '2025-08-15')).toBe(17_810);
    expect(first('actual/365', '2025-02-15', '2025-03-15')).toBe(16_087);
    expect(first('actual/360', '2025-07-15', '2025-08-15')).toBe(18_058);
  });

  it('by actual days a late payment owes more interest, by 30/360 it owes the month’s', () => {
    const late = { payments: [paymentOf('2024-07-25', 232.41)] };
    expect(loanSchedule(loanOf({ ...late, dayCount: 'actual/365' }))[0]?.interestCents).toBe(22_981);
    expect(loanSchedule(loanOf(late))[0]?.interestCents).toBe(17_475);
  });

  it('counts interest to the day of a payment of principal alone', () => {
    const rows = loanSchedule(loanOf({ payments: [paymentOf('2024-08-05', 10_000, 10_000)] }));
    // 29,942.34 for 20 days and 19,942.34 for 10, at 6.99 % of 360 days.
    expect(rows[1]?.interestCents).toBe(11_628 + 3_872);
    expect(rows[1]).toMatchObject({ paymentCents: 1_000_000 + 23_241, extraPrincipalCents: 1_000_000 });
  });

  it('takes the payoff’s days by the same count', () => {
    const loan = loanOf({ dayCount: 'actual/365' });
    expect(loanStateOn(loan, day('2024-08-15'), 'before').days).toBe(31);
    const payoff = loanPayoff(loan, day('2024-08-10'));
    expect(evaluateWorking(payoff.working).eq(usdOf(payoff.amountCents))).toBe(true);
    expect(payoff.working.formula).toContain('/ 365');
  });
});

describe('the days before the first month (common practice, no source)', () => {
  it('interest from funding joins the principal a month before the first payment, and the level payment clears it too', () => {
    const loan = loanOf({ fundedOn: day('2024-03-15') });
    const [begin, first] = loanSchedule(loan);
    // Three months of 30,000 at 6.99 %.
    expect(begin).toMatchObject({ number: 0, on: '2024-06-15', capitalisedCents: 52_425, balanceCents: 3_052_425 });
    expect(first).toMatchObject({ number: 1, on: '2024-07-15', paymentCents: 23_647 });
    expect(loanSchedule(loan).at(-1)).toMatchObject({ number: 240, balanceCents: 0 });
    expect(loanPayoff(loan, day('2024-05-15')).amountCents).toBe(3_000_000 + 34_950);
    allWorkings(loan);
  });

  it('a loan funded inside the first month owes interest from its funding only', () => {
    expect(loanSchedule(loanOf({ fundedOn: day('2024-06-25') }))[0]?.interestCents).toBe(11_650);
  });

  it('money paid before the months begin pays the interest so far first', () => {
    const loan = loanOf({ fundedOn: day('2024-03-15'), payments: [paymentOf('2024-04-15', 200)] });
    const steps = loanBook(loan).steps.slice(0, 2);
    expect(steps).toMatchObject([
      { kind: 'payment', number: 0, interestCents: 17_475, principalCents: 2_525 },
      { kind: 'capitalised', capitalisedCents: 34_921 },
    ]);
    expect(loanEntries(loan, day('2024-06-30'))[0]?.label).toBe('Loan payment before the first');
  });
});

describe('a promotional period', () => {
  it('of level payments has its own rate, then the balance is paid level over the rest of the term', () => {
    const rows = loanSchedule(loanOf({ promotion: { months: 12, annualRate: '0.0199', payment: 'level' } }));
    expect(rows[0]).toMatchObject({ interestCents: 4_975, paymentCents: 15_162 });
    expect(rows[11]?.paymentCents).toBe(15_162);
    expect(rows[12]?.paymentCents).toBeGreaterThan(22_000);
    expect(rows.at(-1)).toMatchObject({ number: 240, balanceCents: 0 });
  });

  it('of interest alone leaves the principal', () => {
    const loan = loanOf({ promotion: { months: 6, annualRate: '0.0699', payment: 'interest' } });
    const rows = loanSchedule(loan);
    expect(rows.slice(0, 6).every((row) => row.paymentCents === 17_475 && row.balanceCents === 3_000_000)).toBe(true);
    expect(loanBook(loan).levels).toMatchObject([{ fromNumber: 7, months: 234, reason: 'promotionEnd' }]);
    expect(rows.at(-1)).toMatchObject({ number: 240, balanceCents: 0 });
    allWorkings(loan);
  });

  it('without payments adds the interest of its months to the principal when it ends', () => {
    const loan = loanOf({ promotion: { months: 12, annualRate: '0.0699', payment: 'none' } });
    const rows = loanSchedule(loan);
    expect(rows[0]).toMatchObject({ paymentCents: 0, unpaidInterestCents: 17_475 });
    expect(rows[11]).toMatchObject({ paymentCents: 0, capitalisedCents: 209_700, balanceCents: 3_209_700 });
    expect(rows[12]).toMatchObject({ number: 13, on: '2025-07-15' });
    expect(loanEntries(loan, day('2025-06-30'))).toEqual([]);
    const payoff = loanPayoff(loan, day('2025-08-01'));
    expect(evaluateWorking(payoff.working).eq(usdOf(payoff.amountCents))).toBe(true);
    expect(rows.at(-1)).toMatchObject({ number: 240, balanceCents: 0 });
    allWorkings(loan);
  });

  it('as long as the term ends with one payment that clears the loan', () => {
    const loan = loanOf({ termMonths: 12, promotion: { months: 12, annualRate: '0', payment: 'none' } });
    expect(loanSchedule(loan).at(-1)).toMatchObject({ number: 12, paymentCents: 3_000_000, balanceCents: 0 });
    expect(loanBook(loan).levelCents).toBe(0);
    allWorkings(loan);
  });
});

describe('a payment that takes a prepayment for granted', () => {
  // Note 38,400, 4.99 %, 300 months, 11,520 assumed by payment 18 (own computation): 161.82; after 18 payments 38,360.08 is left.
  it('is the level payment that clears the loan if it is made', () => {
    const loan = solarOf({ assumedPrepayment: ASSUMED });
    expect(loanBook(loan).levelCents).toBe(16_182);
    expect(loanSchedule(loan)[17]).toMatchObject({ number: 18, balanceCents: 3_836_008 });
    allWorkings(loan);
  });

  it('stays if it is made, rises to 189.08 if 7,000 of it is, and to 231.28 if nothing is', () => {
    const outcomes = prepaymentOutcomes(solarOf({ assumedPrepayment: ASSUMED }), cents(700_000));
    expect(outcomes.map(({ prepaid, next }) => [prepaid, next?.amountCents])).toEqual([
      ['whole', 16_182],
      ['part', 18_908],
      ['nothing', 23_128],
    ]);
    const [whole, , nothing] = outcomes;
    expect(whole?.interest.amountCents).toBeLessThan(nothing?.interest.amountCents ?? 0);
    for (const { interest, next, clearedOn } of outcomes) {
      expect(clearedOn).toBe('2049-06-15');
      expect(next && evaluateWorking(next.working).eq(usdOf(next.amountCents))).toBe(true);
      expect(evaluateWorking(interest.working).eq(usdOf(interest.amountCents))).toBe(true);
    }
  });

  it('is half of it where nothing says how much the part is, and nothing is said of a loan without one', () => {
    expect(prepaymentOutcomes(solarOf({ assumedPrepayment: ASSUMED }))[1]?.prepaidCents).toBe(576_000);
    expect(prepaymentOutcomes(solarOf())).toEqual([]);
  });

  it('leaves extra principal as recorded out of the three outcomes, and keeps regular payments', () => {
    const payments = [paymentOf('2024-08-15', 5_161.82, 5_000), paymentOf('2024-09-20', 400, 400)];
    const plain = prepaymentOutcomes(solarOf({ assumedPrepayment: ASSUMED }));
    const recorded = prepaymentOutcomes(solarOf({ assumedPrepayment: ASSUMED, payments }));
    expect(recorded.map(({ next }) => next?.amountCents)).toEqual(plain.map(({ next }) => next?.amountCents));
  });

  it('is worked out anew by what was really prepaid up to then', () => {
    const early = solarOf({ assumedPrepayment: ASSUMED, payments: [paymentOf('2025-03-15', 7_161.82, 7_000)] });
    const late = solarOf({ assumedPrepayment: ASSUMED, payments: [paymentOf('2025-12-15', 7_161.82, 7_000)] });
    expect(loanSchedule(late)[18]?.paymentCents).toBe(18_908);
    expect(loanSchedule(early)[18]?.paymentCents).toBeLessThan(18_908);
    expect(loanBook(early).levels.map(({ reason }) => reason)).toEqual(['start', 'prepayment']);
  });

  it('counts on what is still to come of it when the lender re-amortizes before', () => {
    const whole = { ...paymentOf('2025-03-15', 11_681.82, 11_520), reamortize: true };
    const part = { ...paymentOf('2025-03-15', 5_161.82, 5_000), reamortize: true };
    const levels = (one: typeof whole) => loanBook(solarOf({ assumedPrepayment: ASSUMED, payments: [one] })).levels;
    expect(levels(whole)[1]).toMatchObject({ reason: 'reamortized', assumed: null, fromNumber: 10 });
    expect(levels(part)[1]).toMatchObject({ assumed: { amountCents: 652_000, withPayment: 9 } });
  });

  it('asks for nothing where the whole loan is taken for granted, and works without interest too', () => {
    const loan = solarOf({ annualRate: '0', assumedPrepayment: { amountCents: cents(3_840_000), byPayment: 2 } });
    expect(loanSchedule(loan)[0]).toMatchObject({ paymentCents: 0 });
    expect(loanSchedule(loan)[2]?.paymentCents).toBe(12_886);
    allWorkings(solarOf({ annualRate: '0', assumedPrepayment: ASSUMED }));
  });
});

describe('a payment with which the lender re-amortizes', () => {
  // Full payment 224.26; after 18 payments 37,195.54; 11,520 prepaid leaves 25,675.54, recast to 154.80 (own computation).
  const recast = solarOf({ payments: [{ ...paymentOf('2025-12-15', 11_744.26, 11_520), reamortize: true }] });

  it('sets the level payment over the months that remain', () => {
    const rows = loanSchedule(recast);
    expect(rows[17]?.balanceCents).toBe(2_567_554);
    expect(rows[18]?.paymentCents).toBe(15_480);
    expect(rows.at(-1)?.number).toBe(300);
    allWorkings(recast);
  });

  it('before the month’s own payment counts that one among the months that remain', () => {
    const early = solarOf({ payments: [{ ...paymentOf('2025-12-05', 11_520, 11_520), reamortize: true }] });
    expect(loanBook(early).levels[1]).toMatchObject({ fromNumber: 18, months: 283 });
  });

  it('adds interest that was left unpaid to the principal, but not what falls due with the next payment', () => {
    const missed = [paymentOf('2024-07-15', 0), { ...paymentOf('2024-08-20', 1_000, 1_000), reamortize: true }];
    const steps = loanBook(loanOf({ payments: missed })).steps;
    const joined = steps.find(({ kind }) => kind === 'capitalised');
    // Two months of 174.75 less a payment of 232.41; the five days to the 20th are not due yet.
    expect(joined?.capitalisedCents).toBe(11_709);
    expect(joined?.unpaidInterestCents).toBe(2_913);
  });

  it('before the first month is over the whole term', () => {
    const early = loanOf({
      fundedOn: day('2024-05-15'),
      payments: [{ ...paymentOf('2024-06-01', 5_000, 5_000), reamortize: true }],
    });
    expect(loanBook(early).levels).toMatchObject([{ fromNumber: 1, months: 240, balanceCents: 2_500_000 }]);
  });
});

describe('the lender’s own balance', () => {
  const drifted = loanOf({
    balances: [{ id: 'b', on: day('2024-08-31'), balanceCents: cents(2_988_751), documentId: null }],
  });

  it('stands in the place of ours from its day on, and the difference is a line of the schedule', () => {
    expect(loanSchedule(loanOf())[1]?.balanceCents).toBe(2_988_434);
    expect(loanSchedule(drifted)[1]).toMatchObject({ driftCents: 317, balanceCents: 2_988_751, paymentCents: 23_241 });
    expect(loanStateOn(drifted, day('2024-08-31'), 'before').balanceCents).toBe(2_988_434);
    expect(loanStateOn(drifted, day('2024-08-31')).balanceCents).toBe(2_988_751);
    expect(loanSchedule(drifted).at(-1)).toMatchObject({ number: 240, balanceCents: 0 });
  });

  it('moves no cash, and the payoff’s working names it', () => {
    const cash = (loan: LoanFacts) => loanEntries(loan, day('2024-12-31')).map(({ amountCents }) => amountCents);
    expect(cash(drifted)).toEqual(cash(loanOf()));
    const payoff = loanPayoff(drifted, day('2024-12-20'));
    expect(payoff.working.inputs.find(({ name }) => name === 'drift')?.value).toEqual(['3.17']);
    expect(evaluateWorking(payoff.working).eq(usdOf(payoff.amountCents))).toBe(true);
  });

  it('is that of the day’s close: a payment of the day comes first', () => {
    const balances = [{ id: 'b', on: day('2024-07-15'), balanceCents: cents(2_994_000), documentId: null }];
    const [first] = loanSchedule(loanOf({ balances }));
    expect(first).toMatchObject({ driftCents: -234, balanceCents: 2_994_000 });
  });

  it('can say that more is owed after the schedule came to its end', () => {
    const balances = [{ id: 'b', on: day('2024-10-20'), balanceCents: cents(50_000), documentId: null }];
    const loan = loanOf({ balances, payments: [paymentOf('2024-07-15', 30_174.75, 29_942.34)] });
    expect(
      loanBook(loan)
        .steps.slice(1)
        .map(({ kind, balanceCents }) => [kind, balanceCents]),
    ).toEqual([
      ['lender', 50_000],
      ['payment', 27_002],
      ['payment', 3_918],
      ['payment', 0],
    ]);
  });
});

describe('a payoff', () => {
  it('includes the contract’s fee while principal is owed, and none after', () => {
    const loan = loanOf({ payoffFeeCents: cents(7_500), termMonths: 12 });
    expect(loanPayoff(loan, day('2024-07-15')).amountCents).toBe(
      loanPayoff(loanOf({ termMonths: 12 }), day('2024-07-15')).amountCents + 7_500,
    );
    expect(loanPayoff(loan, day('2025-12-01')).amountCents).toBe(0);
    const before = loanPayoff(loan, day('2024-06-01'));
    expect(before.amountCents).toBe(0);
    expect(evaluateWorking(before.working).isZero()).toBe(true);
  });
});

describe('a refinance', () => {
  const refinanceOf = (principal: number, costs = 0) => ({
    id: 'r',
    on: day('2024-10-01'),
    lender: 'Northpoint Savings',
    principalCents: cents(principal),
    annualRate: '0.0449',
    termMonths: 120,
    firstPaymentOn: day('2024-11-01'),
    costsCents: cents(costs),
    documentId: null,
  });
  const payoffThen = loanPayoff(loanOf({ payoffFeeCents: cents(5_000) }), day('2024-10-01')).amountCents;

  it('pays the old loan off with its accrued interest and fee, and the payments of the new one count from 1', () => {
    const loan = loanOf({ payoffFeeCents: cents(5_000), refinances: [refinanceOf(payoffThen)] });
    const rows = loanSchedule(loan);
    expect(rows[3]).toMatchObject({ refinanced: true, on: '2024-10-01', balanceCents: 0 });
    expect(rows[4]).toMatchObject({ segment: 1, number: 1, on: '2024-11-01' });
    expect(loanStateOn(loan, day('2024-10-01'))).toMatchObject({ balanceCents: payoffThen, feeCents: 0 });
    expect(loanStateOn(loan, day('2024-10-01'), 'before').payoffCents).toBe(payoffThen);
    expect(loanEntries(loan, day('2024-10-31')).map(({ kind }) => kind)).toEqual(['payment', 'payment', 'payment']);
    expect(loanEntries(loan, day('2024-11-01')).at(-1)?.label).toBe(
      'Loan payment 1 of 120 of the refinanced loan, as scheduled',
    );
    allWorkings(loan);
  });

  it('pays out what is over, asks for what is short, and costs what it costs', () => {
    const cashOf = (principal: number, costs: number) =>
      loanEntries(
        loanOf({ payoffFeeCents: cents(5_000), refinances: [refinanceOf(principal, costs)] }),
        day('2024-10-01'),
      )
        .filter(({ kind }) => kind.startsWith('refinance'))
        .map(({ kind, amountCents }) => [kind, amountCents]);
    expect(cashOf(payoffThen + 100_000, 0)).toEqual([['refinance', 100_000]]);
    expect(cashOf(payoffThen - 100_000, 25_000)).toEqual([
      ['refinance', -100_000],
      ['refinanceCosts', -25_000],
    ]);
    allWorkings(loanOf({ refinances: [refinanceOf(2_000_000, 25_000)] }));
  });

  it('follows another, and each keeps the payments and balances of its own days', () => {
    const second = { ...refinanceOf(2_500_000), id: 's', on: day('2025-06-10'), firstPaymentOn: day('2025-08-10') };
    const loan = loanOf({
      refinances: [second, refinanceOf(2_900_000)],
      payments: [paymentOf('2024-09-20', 232.41), paymentOf('2025-01-05', 400)],
      balances: [{ id: 'b', on: day('2025-02-10'), balanceCents: cents(2_800_000), documentId: null }],
    });
    const book = loanBook(loan);
    expect(book.segments.map(({ index, principalCents }) => [index, principalCents])).toEqual([
      [0, 3_000_000],
      [1, 2_900_000],
      [2, 2_500_000],
    ]);
    expect(book.steps.filter(({ record }) => record).map(({ segment, number }) => [segment.index, number])).toEqual([
      [0, 3],
      [1, 3],
    ]);
    expect(book.rows.find(({ driftCents }) => driftCents !== 0)?.segment).toBe(1);
    expect(book.rows.at(-1)).toMatchObject({ segment: 2, number: 120, balanceCents: 0 });
    allWorkings(loan);
  });

  it('before the first payment pays off what was lent and its interest', () => {
    const early = { ...refinanceOf(3_000_000), on: day('2024-07-01'), firstPaymentOn: day('2024-08-01') };
    const [first] = loanBook(loanOf({ refinances: [early] })).steps;
    // 16 days of 360: 30,000 × 6.99 % × 16 / 360.
    expect(first).toMatchObject({ kind: 'paidOff', principalCents: 3_000_000, interestCents: 9_320 });
  });
});
