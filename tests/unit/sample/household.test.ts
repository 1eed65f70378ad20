import { describe, expect, it } from 'vitest';
import { readSampleHousehold } from '#server/sample/sample-household.ts';
import { levelPayment } from '#shared/books/interest.ts';
import { governingEnd } from '#shared/books/mortgage-insurance.ts';
import { creditLinesOf } from '#shared/books/tax-credit.ts';
import { mortgageMore } from '#shared/facts/finance.ts';
import { rowsWhere, samplePapers } from './sample-files.ts';

const sample = readSampleHousehold();

function present<T>(value: T | null): T {
  if (value === null) throw new Error('the sample lacks a book');
  return value;
}

describe('what the sample’s owner typed', () => {
  it('has a roof of 28 modules and 11.48 kW', () => {
    expect(sample.roof.arrays.reduce((sum, { modules }) => sum + modules, 0)).toBe(28);
    expect(sample.roof.arrays.reduce((sum, { modules, moduleWatts }) => sum + modules * moduleWatts, 0)).toBe(11_480);
  });

  it('has a year of use before the roof, cycle by cycle, up to the switch-on', () => {
    const { usageBefore } = sample.before;
    expect(usageBefore.length).toBe(12);
    expect(usageBefore.slice(1).map(({ from }) => from)).toEqual(usageBefore.slice(0, -1).map(({ to }) => to));
    expect(usageBefore.at(-1)?.to).toBe(sample.house.switchOn);
    const year = usageBefore.reduce((sum, { importWh }) => sum + importWh, 0);
    expect(year).toBeGreaterThan(11_000_000);
    expect(year).toBeLessThan(13_000_000);
  });

  it('pays for the roof what the roof cost: cash and loan are the qualified cost and the dealer’s fee', () => {
    const loan = present(sample.loan.loan);
    const credit = present(sample.credit.credit);
    const paid = sample.cash.costs.reduce((sum, { amountCents }) => sum + amountCents, 0) + loan.principalCents;
    expect(paid).toBe(credit.costs.reduce((sum, { amountCents }) => sum + amountCents, 0));
    const leftOut = credit.costs.filter(({ treatment }) => treatment === 'leftOut');
    expect(leftOut.map(({ amountCents }) => amountCents)).toEqual([loan.dealerFeeCents]);
  });

  it('uses up the credit of 11,070 over three returns', () => {
    const years = sample.creditYears.map((year) => ({ ...year, typedBy: null }));
    const lines = creditLinesOf({ ...present(sample.credit.credit), years, carriedIn: null });
    expect(lines.map((line) => [line.taxYear, line.line13Cents, line.line15Cents, line.line16Cents])).toEqual([
      [2024, 1_107_000, 415_000, 692_000],
      [2025, 692_000, 505_000, 187_000],
      [2026, 187_000, 187_000, 0],
    ]);
  });

  it('records one loan payment, of the level amount and 1,000 more', () => {
    const loan = present(sample.loan.loan);
    const level = levelPayment(loan.principalCents, loan.annualRate, loan.termMonths);
    expect(sample.money.loanPayments.map((row) => [row.amountCents, row.extraPrincipalCents])).toEqual([
      [level + 100_000, 100_000],
    ]);
  });

  it('borrowed 91 % of the house, so that the insurance could have gone without the roof only in 2030', () => {
    const mortgage = present(sample.mortgage.mortgage);
    expect(mortgage.principalCents / mortgage.originalValueCents).toBeCloseTo(0.91, 10);
    const end = governingEnd({ ...mortgage, ...mortgageMore.parse({}) });
    expect([end.rule, end.on?.slice(0, 4)]).toEqual(['request80', '2030']);
  });

  it('has a cheque for each closed quarter, $0.045 for each kWh on the production meter, each cycle rounded on its own', () => {
    const earned = samplePapers(false).map((paper) => {
      const read = rowsWhere(paper, 'read', 'production')[0];
      const kwh = Number(read?.current) - Number(read?.previous);
      return { to: paper.to, cents: Math.floor((kwh * 45 + 5) / 10) };
    });
    const closed = earned.filter(({ to }) => to <= '2026-09-14').reduce((sum, { cents }) => sum + cents, 0);
    expect(sample.money.receipts.reduce((sum, { amountCents }) => sum + amountCents, 0)).toBe(closed);
    expect(sample.money.receipts.length).toBe(9);
    for (const { on, note } of sample.money.receipts) {
      // "Reads of 14 Aug to 13 Sep 2024": the cheque comes after the last of its reads.
      const lastRead = /^Reads of \d+ \w{3}(?: \d{4})? to (\d+ \w{3} \d{4})$/.exec(note ?? '')?.[1] ?? '';
      expect(Date.parse(`${on} UTC`)).toBeGreaterThan(Date.parse(`${lastRead} UTC`));
    }
  });
});
