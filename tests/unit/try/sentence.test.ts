import { describe, expect, it } from 'vitest';
import { type Levers, leversSchema } from '#shared/facts/scenario.ts';
import type { Outcome } from '#shared/try/outcome.ts';
import { differenceSentence } from '#shared/try/sentence.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { builtPlan } from '#tests/support/build-household.ts';

const ON = day('2027-04-01');
const BASE: Outcome = {
  months: [],
  evenOn: day('2032-01-01'),
  settledCents: cents(2_000_000),
  interestCents: cents(900_000),
  paymentCents: cents(24_493),
  paidOffOn: day('2040-06-01'),
  firstYearAvoidedCents: cents(150_000),
};

/** The sentence of levers, of an outcome that differs from the base so. */
function said(levers: Partial<Levers>, changes: Partial<Outcome> = {}, base: Outcome = BASE): string | null {
  return differenceSentence({ ...leversSchema.parse({}), ...levers }, base, { ...base, ...changes });
}
const cause = (levers: Partial<Levers>) => said(levers)?.split(':')[0];
const effect = (changes: Partial<Outcome>, base: Partial<Outcome> = {}, levers: Partial<Levers> = { cash: true }) =>
  said(levers, changes, { ...BASE, ...base })?.replace(/^.*?: /, '');

describe('what is tried, in words', () => {
  it('has words for every lever', () => {
    expect(cause({ cash: true })).toBe('The roof bought with cash');
    const paydown = { on: ON, amountCents: cents(550_500), reamortize: true };
    expect(cause({ paydown })).toBe('Paying $5,505 into the loan on 1 Apr 2027 and re-amortizing');
    expect(cause({ paydown: { ...paydown, reamortize: false } })).toBe('Paying $5,505 into the loan on 1 Apr 2027');
    expect(cause({ refinance: { on: ON, annualRate: '0.04125', termMonths: 120, costsCents: cents(0) } })).toBe(
      'Refinancing on 1 Apr 2027 at 4.125 % over 120 months',
    );
    expect(cause({ priceRise: '-0.012' })).toBe('Prices rising −1.2 % a year');
    expect(cause({ exportCut: { from: ON, keep: '0.5' } })).toBe('Export worth 50 % of today’s credit from 1 Apr 2027');
    const plan = builtPlan('bill');
    expect(cause({ plan: { from: ON, plan } })).toBe('Residential with a roof from 1 Apr 2027');
    expect(cause({ plan: { from: ON, plan: { ...plan, name: '' } } })).toBe('Another rate plan from 1 Apr 2027');
    expect(cause({ moreUse: { from: ON, whPerDay: wh(8_000), fromHour: 9, toHour: 12 } })).toBe(
      '8 kWh more a day from 1 Apr 2027',
    );
    expect(cause({ degradation: '0.0075' })).toBe('Production falling 0.75 % a year');
    expect(cause({ replacement: { on: ON, costCents: cents(240_000) } })).toBe(
      '$2,400 for a replacement on 1 Apr 2027',
    );
    expect(cause({ sale: { on: ON, roofValueCents: cents(0) } })).toBe('Selling the house on 1 Apr 2027');
  });

  it('joins two by “and”, more by commas before it', () => {
    expect(cause({ priceRise: '0.03', degradation: '0.01' })).toBe(
      'Prices rising 3 % a year and production falling 1 % a year',
    );
    expect(cause({ cash: true, priceRise: '0.03', degradation: '0.01' })).toBe(
      'The roof bought with cash, prices rising 3 % a year and production falling 1 % a year',
    );
  });

  it('is silent while no lever is pulled', () => {
    expect(said({})).toBeNull();
  });
});

describe('what it does, in words', () => {
  it('says when even comes, against when it would have', () => {
    expect(effect({})).toBe('still even in January 2032.');
    expect(effect({ evenOn: day('2031-05-01') })).toBe('even in May 2031 instead of January 2032.');
    expect(effect({ evenOn: null })).toBe('not even within the horizon instead of in January 2032.');
    expect(effect({ evenOn: day('2031-05-01') }, { evenOn: null })).toBe(
      'even in May 2031, which it was not within the horizon.',
    );
    expect(effect({}, { evenOn: null })).toBe('still not even within the horizon.');
  });

  it('says what interest is saved or added', () => {
    expect(effect({ interestCents: cents(508_800) })).toBe('still even in January 2032, $3,912 less interest.');
    expect(effect({ interestCents: cents(1_000_000) })).toBe('still even in January 2032, $1,000 more interest.');
  });

  it('says a payment that changes, and none where there is no loan before or after', () => {
    expect(effect({ paymentCents: cents(20_110) })).toBe(
      'still even in January 2032, a payment of $201.10 instead of $244.93.',
    );
    expect(effect({ paymentCents: null })).toBe('still even in January 2032.');
    expect(effect({ paymentCents: cents(1) }, { paymentCents: null })).toBe('still even in January 2032.');
  });

  it('says what is settled in the end, or on the day of a sale', () => {
    expect(effect({ settledCents: cents(2_150_000) })).toBe('still even in January 2032, $1,500 more at the end.');
    expect(effect({ settledCents: cents(1_900_000) })).toBe('still even in January 2032, $1,000 less at the end.');
    const sale = { on: ON, roofValueCents: cents(0) };
    expect(effect({ settledCents: cents(120_000) }, {}, { sale })).toBe(
      'still even in January 2032, $1,200 settled on the day of the sale.',
    );
  });
});
