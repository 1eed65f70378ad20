import fc from 'fast-check';
import { dayCount, type LoanFacts } from '#shared/facts/finance.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, addMonths, day } from '#shared/units/day.ts';
import { loanOf } from './facts.ts';

const rateText = fc.integer({ min: 0, max: 1_500 }).map((rate) => `0.${String(rate).padStart(4, '0')}`);
const FIRST = day('2024-07-15');

/** Days a month or so around each payment, counted from the first. */
const someDay = fc
  .record({ month: fc.integer({ min: 0, max: 60 }), late: fc.integer({ min: 0, max: 12 }) })
  .map(({ month, late }) => addDays(addMonths(FIRST, month), late));

const payment = fc.record({
  on: someDay,
  regular: fc.integer({ min: 0, max: 90_000 }),
  extra: fc.integer({ min: 0, max: 60_000 }),
  reamortize: fc.boolean(),
});

const refinance = fc.record({
  on: someDay,
  principal: fc.integer({ min: 100_000, max: 9_000_000 }),
  annualRate: rateText,
  termMonths: fc.integer({ min: 12, max: 240 }),
  costs: fc.integer({ min: 0, max: 200_000 }),
});

/** Any loan by its terms alone: every day count, with or without a promotion and an assumed prepayment, funded up to months before or days after the month begins. */
export const anyContract: fc.Arbitrary<LoanFacts> = fc
  .record({
    principal: fc.integer({ min: 100_000, max: 9_000_000 }),
    annualRate: rateText,
    termMonths: fc.integer({ min: 12, max: 300 }),
    fundedBefore: fc.integer({ min: 1, max: 200 }),
    dayCount: fc.constantFrom(...dayCount.options),
    promotion: fc.option(
      fc.record({
        months: fc.integer({ min: 1, max: 24 }),
        annualRate: rateText,
        payment: fc.constantFrom('level' as const, 'interest' as const, 'none' as const),
      }),
    ),
    assumed: fc.option(
      fc.record({ share: fc.integer({ min: 1, max: 60 }), byPayment: fc.integer({ min: 1, max: 24 }) }),
    ),
    payoffFee: fc.constantFrom(0, 5_000),
  })
  .map(({ principal, assumed, ...terms }) =>
    loanOf({
      principalCents: cents(principal),
      annualRate: terms.annualRate,
      termMonths: terms.termMonths,
      fundedOn: addDays(FIRST, -terms.fundedBefore),
      firstPaymentOn: FIRST,
      dayCount: terms.dayCount,
      promotion: terms.promotion,
      payoffFeeCents: cents(terms.payoffFee),
      assumedPrepayment: assumed && {
        amountCents: cents(Math.ceil((principal * assumed.share) / 100)),
        byPayment: assumed.byPayment,
      },
    }),
  );

/** The same with a record: payments as made, balances by the lender, perhaps a refinance. */
export const anyRecordedLoan: fc.Arbitrary<LoanFacts> = fc
  .record({
    loan: anyContract,
    payments: fc.array(payment, { maxLength: 8 }),
    balances: fc.array(fc.record({ on: someDay, balance: fc.integer({ min: 0, max: 9_000_000 }) }), { maxLength: 3 }),
    refinances: fc.array(refinance, { maxLength: 2 }),
  })
  .map(({ loan, payments, balances, refinances }) => ({
    ...loan,
    payments: payments.map((one, index) => ({
      id: `p${index}`,
      on: one.on,
      amountCents: cents(one.regular + one.extra),
      extraPrincipalCents: cents(one.extra),
      note: null,
      reamortize: one.reamortize,
      documentId: null,
    })),
    balances: balances.map(({ on, balance }, index) => ({
      id: `b${index}`,
      on,
      balanceCents: cents(balance),
      documentId: null,
    })),
    refinances: refinances.map((one, index) => ({
      id: `r${index}`,
      on: one.on,
      lender: 'Northpoint Savings',
      principalCents: cents(one.principal),
      annualRate: one.annualRate,
      termMonths: one.termMonths,
      firstPaymentOn: addMonths(one.on, 1),
      costsCents: cents(one.costs),
      documentId: null,
    })),
  }));
