import { describe, expect, it } from 'vitest';
import { loanEntries, loanPayoff } from '#shared/books/loan.ts';
import {
  isOfOtherLoan,
  isOfSolarLoan,
  loanEntriesWithPapers,
  otherLoanEntries,
  payoffOfLoans,
} from '#shared/books/other-money.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { loanOf, paymentOf } from './facts.ts';

const TODAY = day('2025-03-20');
const share = { id: 'a', kind: 'mortgageShare' as const, loan: loanOf({ lender: 'Harbour Mortgage' }) };
const second = {
  id: 'b',
  kind: 'homeEquity' as const,
  loan: loanOf({ lender: '', principalCents: cents(500_000), payments: [paymentOf('2024-08-15', 200, 160)] }),
};

describe('money for the roof that came from elsewhere', () => {
  it('is paid by the loan book’s own rules, under ids of its own', () => {
    const entries = otherLoanEntries([share, second], TODAY);
    const own = (id: string) => entries.filter((entry) => isOfOtherLoan(entry, id));
    expect(own('a').map(({ amountCents }) => amountCents)).toEqual(
      loanEntries(share.loan, TODAY).map(({ amountCents }) => amountCents),
    );
    expect(own('b').map(({ kind }) => kind)).toContain('extraPrincipal');
    expect(own('a').length + own('b').length).toBe(entries.length);
    expect(new Set(entries.map(({ id }) => id)).size).toBe(entries.length);
    expect(entries.some(isOfSolarLoan)).toBe(false);
    expect(loanEntries(share.loan, TODAY).every(isOfSolarLoan)).toBe(true);
    expect(own('a')[0]?.label).toBe('Share of the mortgage: Loan payment 1 of 240, as scheduled');
    for (const entry of entries) {
      expect(entry.book).toBe('loan');
      expect(evaluateWorking(entry.working).eq(usdOf(entry.amountCents))).toBe(true);
    }
  });

  it('names its papers: the contract behind its terms, the statement behind a payment', () => {
    const papers = [
      { id: 'deal', fileName: 'contract.pdf' },
      { id: 'slip', fileName: 'payment.pdf' },
    ];
    const payment = { ...paymentOf('2024-08-15', 300, 50), documentId: 'slip' };
    const loan = loanOf({ documentId: 'deal', payments: [payment] });
    const entries = loanEntriesWithPapers(loan, TODAY, papers);
    const files = entries.map(({ working }) =>
      working.inputs.map(({ source }) => (source.kind === 'document' ? source.fileName : null)),
    );
    expect(files[0]).toEqual(['contract.pdf', 'contract.pdf', 'contract.pdf']);
    expect(files[1]).toEqual(['payment.pdf', 'payment.pdf']);
    const bare = (one: (typeof entries)[number]) => ({ ...one, working: one.working.formula });
    expect(entries.map(bare)).toEqual(loanEntries(loan, TODAY).map(bare));
    expect(otherLoanEntries([{ ...share, loan }], TODAY, papers)[0]?.working).toEqual(entries[0]?.working);
  });

  it('takes the sum of the payoffs to pay off', () => {
    expect(payoffOfLoans([], TODAY)).toBeNull();
    expect(payoffOfLoans([share.loan], TODAY)).toEqual(loanPayoff(share.loan, TODAY));
    const both = payoffOfLoans([share.loan, second.loan], TODAY, 'before');
    expect(both?.amountCents).toBe(
      loanPayoff(share.loan, TODAY, 'before').amountCents + loanPayoff(second.loan, TODAY, 'before').amountCents,
    );
    expect(both && evaluateWorking(both.working).eq(usdOf(both.amountCents))).toBe(true);
    expect(both?.working.inputs[0]?.label).toBe('Payoff of Harbour Mortgage, a loan');
  });
});
