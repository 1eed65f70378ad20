import { describe, expect, it } from 'vitest';
import { amortize } from '#shared/books/amortize.ts';
import { type Cents, cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { readVectors } from './vectors.ts';

/**
 * `loan_vectors.json`: level-payment loans, monthly 30/360, payment and interest rounded half-up to the cent, last payment clears. Computed
 * independently of this project from the annuity formula P = L·i / (1 − (1 + i)^−n).
 */
type LoanVector = {
  id: string;
  principal: string;
  annualRate: string;
  months: number;
  events: { afterPayment: number; principal: string; reamortize: boolean }[];
  expected: {
    payment: string;
    payments: number;
    totalInterest: string;
    lastPayment: string;
    paymentAfterEvents: string;
    balanceAfter: Record<string, string>;
  };
};

const vectors = readVectors<LoanVector>('loan_vectors.json');

describe('Level-payment loans agree with the independent vectors', () => {
  it('has vectors to check', () => {
    expect(vectors.length).toBeGreaterThan(0);
  });

  it.each(vectors.map((vector) => [vector.id, vector] as const))('%s', (_id, vector) => {
    const made = amortize({
      principalCents: usd(vector.principal),
      annualRate: vector.annualRate,
      months: vector.months,
      events: vector.events.map((event) => ({ ...event, principalCents: usd(event.principal) })),
    });
    expect({
      payment: dollarsText(made.paymentCents),
      payments: made.rows.length,
      totalInterest: dollarsText(made.totalInterestCents),
      lastPayment: dollarsText(made.rows.at(-1)?.paymentCents ?? cents(0)),
      paymentAfterEvents: dollarsText(made.paymentAfterEventsCents),
      balanceAfter: Object.fromEntries(
        Object.keys(vector.expected.balanceAfter).map((number) => [
          number,
          dollarsText(made.rows[Number(number) - 1]?.balanceCents ?? cents(-1)),
        ]),
      ),
    }).toEqual(vector.expected);
  });
});

function usd(text: string): Cents {
  const amount = parseDollars(text);
  if (amount === null) throw new Error(`not an amount: ${text}`);
  return amount;
}
