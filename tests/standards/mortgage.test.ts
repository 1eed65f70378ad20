import { describe, expect, it } from 'vitest';
import {
  amortizationMidpoint,
  mortgageBalanceAfter,
  mortgageBook,
  mortgagePaymentDay,
  paymentReaching,
} from '#shared/books/mortgage-balance.ts';
import { insuranceEnds } from '#shared/books/mortgage-insurance.ts';
import { type InsuranceEndRule, type MortgageFacts, mortgageMore } from '#shared/facts/finance.ts';
import { type Cents, cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { readVectors } from './vectors.ts';

/**
 * `mortgage_vectors.json`: the thresholds of the Homeowners Protection Act, 12 U.S.C. 4901(2) (80 % on request, by schedule or by actual payments),
 * 4902(b) (78 % by the initial schedule) and 4902(c) (first of the month after the amortization midpoint), on invented level-payment mortgages.
 */
type Reached = {
  by: string;
  payment: number;
  due: string;
  balanceBefore: string;
  balanceAfter: string;
  threshold: string;
};
type MortgageVector = {
  id: string;
  principal: string;
  payment: string;
  annualRate: string;
  originalValue: string;
  firstPayment: string;
  extraPrincipalMonthly: string;
  months: number;
  request80: Reached;
  automatic78: Reached;
  actualBalanceReaches78?: { payment: number; due: string };
  midpoint: { payment: number; balanceAfter: string; governs: boolean; terminationFirstOf: string };
};

const vectors = readVectors<MortgageVector>('mortgage_vectors.json');

describe('Mortgage insurance ends as 12 U.S.C. 4901–4910 says', () => {
  it('has vectors to check', () => {
    expect(vectors.length).toBeGreaterThan(0);
  });

  it.each(vectors.map((vector) => [vector.id, vector] as const))('%s', (_id, vector) => {
    const mortgage = mortgageOf(vector);
    const book = mortgageBook(mortgage);
    const ends = insuranceEnds(mortgage);
    const endOf = (rule: InsuranceEndRule) => ends.find((end) => end.rule === rule);
    const request = endOf('request80');
    const automatic = endOf('automatic78');
    const middle = endOf('midpoint');

    expect(dollarsText(book.paymentCents)).toBe(vector.payment);

    const initialBalance = (number: number) =>
      number > 0 ? (book.initial[number - 1]?.balanceCents ?? cents(-1)) : mortgage.principalCents;
    const requestBalance = (number: number) =>
      request?.by === 'actual payments' ? mortgageBalanceAfter(mortgage, number) : initialBalance(number);
    expect({
      by: request?.by,
      payment: request?.payment,
      due: request?.on,
      balanceBefore: dollarsText(requestBalance((request?.payment ?? 0) - 1)),
      balanceAfter: dollarsText(requestBalance(request?.payment ?? 0)),
    }).toEqual(without(vector.request80));
    expect({
      by: automatic?.by,
      payment: automatic?.payment,
      due: automatic?.on,
      balanceBefore: dollarsText(initialBalance((automatic?.payment ?? 0) - 1)),
      balanceAfter: dollarsText(initialBalance(automatic?.payment ?? 0)),
    }).toEqual(without(vector.automatic78));
    expect(usd(vector.request80.threshold) * 100).toBe(mortgage.originalValueCents * 80);
    expect(usd(vector.automatic78.threshold) * 100).toBe(mortgage.originalValueCents * 78);

    const point = amortizationMidpoint(mortgage);
    expect({
      payment: middle?.payment,
      balanceAfter: dollarsText(mortgageBalanceAfter(mortgage, point.payment)),
      governs: point.firstOfNextMonth < (automatic?.on ?? ''),
      terminationFirstOf: middle?.on,
    }).toEqual(vector.midpoint);

    if (vector.actualBalanceReaches78) {
      const payment = paymentReaching(mortgage, book.actual, '0.78');
      expect({ payment, due: mortgagePaymentDay(mortgage, payment ?? 0) }).toEqual(vector.actualBalanceReaches78);
    }
  });
});

function without({ threshold: _threshold, ...reached }: Reached) {
  return reached;
}

function mortgageOf(vector: MortgageVector): MortgageFacts {
  return {
    lender: '',
    kind: 'conventional',
    principalCents: usd(vector.principal),
    annualRate: vector.annualRate,
    termMonths: vector.months,
    firstPaymentOn: day(vector.firstPayment),
    originalValueCents: usd(vector.originalValue),
    extraPrincipalMonthlyCents: usd(vector.extraPrincipalMonthly),
    endedOn: null,
    insurance: null,
    ...mortgageMore.parse({}),
  };
}

function usd(text: string): Cents {
  const amount = parseDollars(text);
  if (amount === null) throw new Error(`not an amount: ${text}`);
  return amount;
}
