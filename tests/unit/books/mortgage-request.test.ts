import { describe, expect, it } from 'vitest';
import { removalChecklist } from '#shared/books/mortgage-checklist.ts';
import { currentValueRule } from '#shared/books/mortgage-current-value.ts';
import { mortgageBalanceOn } from '#shared/books/mortgage-value.ts';
import { mortgageWarnings } from '#shared/books/mortgage-warnings.ts';
import type { LoanFacts, MortgageFacts } from '#shared/facts/finance.ts';
import { cents } from '#shared/units/cents.ts';
import { type Day, day } from '#shared/units/day.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { mortgageOf } from './facts.ts';

const CLEAN = { thirtyIn12: 0, sixtyIn24: 0 };

/** The mortgage of the facts (begun 1 May 2024) with a clean record, valued at so many dollars. */
function asked(on: string, dollars: number, changes: Partial<MortgageFacts> = {}, improvedOn: string | null = null) {
  const today = day(on);
  const mortgage = mortgageOf({
    latePayments: CLEAN,
    appraisals: [{ id: 'a', on: today, valueCents: cents(dollars * 100), how: 'appraisal', documentId: null }],
    ...changes,
  });
  const balance = mortgageBalanceOn(mortgage, today);
  const given = { today, improvedOn: improvedOn === null ? null : day(improvedOn), papers: [] };
  return { mortgage, balance, rule: currentValueRule(mortgage, balance, given) };
}

const stateOf = (rule: ReturnType<typeof asked>['rule'], id: string) =>
  rule.conditions.find((one) => one.id === id)?.state;

/** reference/finance.md, table A: an investor's current-value rules, from stored copies of servicing guides of 2017–2023. */
describe('what an investor’s rule asks on the value of today', () => {
  it.each([
    ['under two years, no improvement', '2026-04-30', null, null, 'notMet'],
    ['under two years, after an improvement', '2026-04-30', '2025-02-01', '0.80', 'met'],
    ['an improvement from before the mortgage does not count', '2026-04-30', '2024-04-30', null, 'notMet'],
    ['an improvement of the mortgage’s first day counts', '2026-04-30', '2024-05-01', '0.80', 'met'],
    ['an improvement of today counts', '2026-04-30', '2026-04-30', '0.80', 'met'],
    ['an improvement still to come does not count', '2026-04-30', '2026-06-01', null, 'notMet'],
    ['two years to five', '2026-05-01', null, '0.75', 'met'],
    ['five years to the month', '2029-05-01', null, '0.75', 'met'],
    ['over five years', '2029-06-01', null, '0.80', 'met'],
  ])('%s', (_name, on, improvedOn, share, seasoning) => {
    const { rule } = asked(on, 600_000, {}, improvedOn);
    expect(rule.share).toBe(share);
    expect(stateOf(rule, 'seasoning')).toBe(seasoning);
  });

  it('says how many months old the mortgage is, none in its first and before it', () => {
    const words = (on: string) => asked(on, 600_000).rule.conditions.find((one) => one.id === 'seasoning')?.words;
    expect(words('2024-03-20')).toMatch(/^The mortgage is 0 months old/);
    expect(words('2024-05-20')).toMatch(/^The mortgage is 0 months old/);
    expect(words('2024-06-20')).toMatch(/^The mortgage is 1 month old/);
  });

  it('says that the texts do not settle what an improvement allows from two years to five', () => {
    const next = (improvedOn: string | null) =>
      asked('2026-06-01', 600_000, {}, improvedOn).rule.conditions.find((one) => one.id === 'seasoning')?.next;
    expect(next('2025-02-01')).toContain('not clear');
    expect(next(null)).toBeNull();
  });

  it('asks for 70 % and over two years of two to four units or an investment', () => {
    expect(asked('2026-06-01', 600_000, { units: 2 }).rule.share).toBe('0.70');
    expect(asked('2026-06-01', 600_000, { occupancy: 'investment' }).rule.share).toBe('0.70');
    expect(asked('2026-05-31', 600_000, { units: 2 }, '2025-02-01').rule.share).toBeNull();
    expect(asked('2026-06-01', 600_000, { occupancy: 'second' }).rule.share).toBe('0.75');
  });

  it('is met when the balance is at the share to the cent, and not one cent above', () => {
    const { balance } = asked('2029-06-01', 600_000);
    const value = (balance.amountCents / 100) * 1.25;
    const at = asked('2029-06-01', value);
    expect(at.rule.most?.amountCents).toBe(balance.amountCents);
    expect(at.rule).toMatchObject({ state: 'met', percent: '80' });
    const below = asked('2029-06-01', value - 0.02);
    expect(below.rule.state).toBe('notMet');
    expect(below.rule.conditions.find((one) => one.id === 'ratio')?.next).toContain('more of principal');
    for (const rule of [at.rule, below.rule]) {
      if (rule.most === null) throw new Error('a value is stated');
      expect(evaluateWorking(rule.most.working).eq(usdOf(rule.most.amountCents))).toBe(true);
    }
  });

  it('does not know without evidence of value: the owner’s own estimate is none', () => {
    const own = {
      id: 'o',
      on: day('2026-06-01'),
      valueCents: cents(60_000_000),
      how: 'ownEstimate',
      documentId: null,
    } as const;
    const { rule } = asked('2026-06-01', 1, { appraisals: [own] });
    expect(rule).toMatchObject({ state: 'notStated', most: null, percent: null });
    expect(rule.conditions.find((one) => one.id === 'value')?.words).toContain('no evidence');
    expect(asked('2026-06-01', 1, { appraisals: [] }).rule.conditions[2]?.words).toBe('No value is entered');
  });

  it('asks for a clean payment record', () => {
    expect(stateOf(asked('2026-06-01', 600_000, { latePayments: null }).rule, 'payments')).toBe('notStated');
    const late = (thirtyIn12: number, sixtyIn24: number) =>
      stateOf(asked('2026-06-01', 600_000, { latePayments: { thirtyIn12, sixtyIn24 } }).rule, 'payments');
    expect([late(0, 0), late(1, 0), late(0, 1)]).toEqual(['met', 'notMet', 'notMet']);
  });

  it('does not hold for FHA, which a refinance ends, nor for VA, which has none', () => {
    const fha = asked('2026-06-01', 600_000, { kind: 'fha' }).rule;
    expect(fha.state).toBe('notMet');
    expect(fha.conditions[0]?.next).toContain('refinance');
    expect(asked('2026-06-01', 600_000, { kind: 'va' }).rule.conditions[0]).toMatchObject({
      state: 'notMet',
      next: null,
    });
  });
});

describe('the checklist toward the request', () => {
  const lines = (
    changes: Partial<MortgageFacts> = {},
    security: LoanFacts['security'] | null = 'unsecured',
    on = '2026-06-01',
  ) => {
    const { mortgage, balance, rule } = asked(on, 600_000, changes);
    return Object.fromEntries(
      removalChecklist(mortgage, rule, balance, { today: day(on), security }).map((line) => [line.id, line]),
    );
  };
  const balanceOf = (on: Day | string) => [{ id: 'b', on: day(on), balanceCents: cents(33_000_000), documentId: null }];

  it('says what is ready and what to do next', () => {
    const open = lines();
    expect(open.value?.state).toBe('ready');
    expect(open.payments?.state).toBe('ready');
    expect(open.balance).toMatchObject({ state: 'open' });
    expect(open.letter).toMatchObject({ state: 'open', known: 'Not sent yet' });
    expect(lines({ latePayments: { thirtyIn12: 1, sixtyIn24: 0 } }).payments?.state).toBe('trouble');
    expect(lines({ requestedOn: day('2026-05-20') }).letter).toMatchObject({ state: 'ready', next: null });
  });

  it('cannot be made without the rule’s conditions', () => {
    const { mortgage, balance, rule } = asked('2026-06-01', 600_000);
    const none = { ...rule, conditions: [] };
    expect(() => removalChecklist(mortgage, none, balance, { today: day('2026-06-01'), security: null })).toThrow();
  });

  it('takes a statement of the last two months for the balance, an older one no longer', () => {
    expect(lines({ balances: balanceOf('2026-04-01') }).balance?.state).toBe('ready');
    expect(lines({ balances: balanceOf('2026-03-30') }).balance?.state).toBe('open');
    expect(lines({ balances: [...balanceOf('2026-05-30'), ...balanceOf('2026-03-30')] }).balance?.state).toBe('ready');
    expect(lines({ balances: balanceOf('2026-06-02') }).balance?.known).toContain('by the schedule');
  });

  it.each([
    [false, 'unsecured', 'ready'],
    [false, null, 'ready'],
    [false, 'personalProperty', 'ready'],
    [false, 'unknown', 'open'],
    [null, 'unsecured', 'open'],
    [null, null, 'open'],
    [true, 'unsecured', 'trouble'],
    [true, null, 'trouble'],
    [false, 'fixtureFiling', 'trouble'],
    [null, 'secondMortgage', 'trouble'],
    [false, 'propertyAssessment', 'trouble'],
  ] as const)('other lien %s, solar loan %s: %s', (otherLien, security, state) => {
    expect(lines({ otherLien }, security).liens?.state).toBe(state);
  });
});

describe('warnings', () => {
  const of = (changes: Partial<MortgageFacts>, security: LoanFacts['security'] | null) =>
    mortgageWarnings(mortgageOf(changes), security).map(({ id }) => id);

  it('come with a solar loan that can stand on the title, another lien, FHA and VA, and with nothing else', () => {
    expect(of({}, 'fixtureFiling')).toEqual(['security']);
    expect(of({}, 'secondMortgage')).toEqual(['security']);
    expect(of({}, 'propertyAssessment')).toEqual(['security']);
    expect(of({ otherLien: true }, 'unsecured')).toEqual(['otherLien']);
    expect(of({ kind: 'fha' }, null)).toEqual(['fha']);
    expect(of({ kind: 'va' }, 'unknown')).toEqual(['va']);
    expect(of({ otherLien: false }, 'personalProperty')).toEqual([]);
  });

  it('decide nothing: each sends to the servicer or a lender, or says there is nothing to do', () => {
    for (const { words } of mortgageWarnings(mortgageOf({ kind: 'fha', otherLien: true }), 'fixtureFiling')) {
      expect(words).toMatch(/ask/);
    }
  });
});
