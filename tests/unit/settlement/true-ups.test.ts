import { describe, expect, test } from 'vitest';
import { bank, CUSTOMER, ENERGY, FLAT, opening, plan, said, settled, usage } from './plans.ts';

const kWh = (trueUp: object, more: object = {}) =>
  plan({
    netting: 'cycle',
    banks: [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'], trueUps: [trueUp], ...more }],
  });
const usd = (...trueUps: object[]) =>
  plan({
    charges: [ENERGY, CUSTOMER],
    credits: [{ id: 'sent', label: 'Export credit', kind: 'export', basis: 'export', rates: FLAT, to: 'dollars' }],
    banks: [{ id: 'dollars', label: 'Credit bank', unit: 'USD', sameCycle: true, offsets: ['energy'], trueUps }],
  });
const expire = (at: unknown) => kWh({ at, action: 'expire' });
const held = opening({ banks: { kwhBank: '100' } });
const expired = (at: unknown, cycle: Parameters<typeof usage>[0]) =>
  bank(settled(expire(at), usage(cycle), held), 'kwhBank').move.expired;

describe('when a true-up comes', () => {
  test('in a month: at the close of the cycle that ends in it and did not begin in it', () => {
    expect(expired({ months: [4] }, { from: '2026-03-17', to: '2026-04-15' })).toBe('100');
    expect(expired({ months: [4] }, { from: '2026-04-01', to: '2026-04-30' })).toBe('0');
    expect(expired({ months: [4] }, { from: '2026-04-15', to: '2026-05-15' })).toBe('0');
  });

  test('on a day: at the first close on or after it', () => {
    expect(expired({ date: '03-31' }, { from: '2026-03-02', to: '2026-03-31' })).toBe('100');
    expect(expired({ date: '03-31' }, { from: '2026-03-31', to: '2026-04-30' })).toBe('0');
    expect(expired({ date: '12-31' }, { from: '2025-12-16', to: '2026-01-16' })).toBe('100');
    expect(expired({ date: '01-01' }, { from: '2025-12-16', to: '2026-01-16' })).toBe('100');
  });

  test('at each close, or with the final bill only', () => {
    expect(expired('everyCycle', {})).toBe('100');
    expect(expired('finalBill', {})).toBe('0');
    expect(expired('finalBill', { finalBill: true })).toBe('100');
  });
});

describe('what a true-up does', () => {
  test('keeps an amount, and loses or gives away the rest', () => {
    for (const action of ['expire', 'donate']) {
      const of = kWh({ at: 'everyCycle', action, keep: { amount: '60' } });
      expect(bank(settled(of, usage(), held), 'kwhBank').move).toMatchObject({ expired: '40', paid: '0', close: '60' });
    }
  });

  test('keeps so many cycles of the average use since the last one, in whole kWh, and counts anew', () => {
    const of = kWh({ at: { months: [7] }, action: 'expire', keep: { averageCycles: 2, usage: 'import' } });
    const before = { kwhBank: { cycles: 2, kWh: '61' } };
    const result = settled(of, usage({ import: 0, export: 0 }), { ...held, usageSinceTrueUp: before });
    expect(bank(result, 'kwhBank').move).toMatchObject({ expired: '59', close: '41' });
    expect(result.closing.usageSinceTrueUp).toEqual({ kwhBank: { cycles: 0, kWh: '0' } });
    const between = settled(of, usage({ from: '2026-07-16', to: '2026-08-14', import: 5 }), result.closing);
    expect(between.closing.usageSinceTrueUp).toEqual({ kwhBank: { cycles: 1, kWh: '5' } });
  });

  test('by net use keeps nothing for a house that exports more than it imports', () => {
    const of = kWh({ at: 'everyCycle', action: 'expire', keep: { averageCycles: 4, usage: 'net' } });
    expect(bank(settled(of, usage({ import: 10, export: 30 }), held), 'kwhBank').move).toMatchObject({
      earned: '20',
      expired: '120',
    });
  });

  test('does nothing, and goes on counting, while what is over is less than atLeast', () => {
    const of = usd({ at: 'everyCycle', action: 'pay', to: 'separate', atLeast: '50.00' });
    const less = settled(of, usage({ export: 499.9 }));
    expect(bank(less, 'dollars').move).toMatchObject({ paid: '0.00', close: '49.99' });
    expect(less.settlement.payouts).toEqual([]);
    expect(settled(of, usage({ export: 500 })).settlement.payouts.map((payout) => payout.amountCents)).toEqual([5000]);
  });

  test('pays kWh at the rate of the read date, on the bill untaxed or apart', () => {
    const rates = [
      { from: '2025-01-01', rate: '0.04' },
      { from: '2026-07-16', rate: '0.05' },
    ];
    const pay = { at: 'everyCycle', action: 'pay', rates };
    const billed = settled(kWh({ ...pay, to: 'bill' }), usage(), held);
    expect(said(billed.settlement.lines).slice(1)).toEqual(['kwhBank 100 kWh at 0.05 = -5.00']);
    const apart = settled(kWh({ ...pay, to: 'separate' }), usage(), held);
    expect(apart.settlement.payouts).toMatchObject([
      { component: 'kwhBank', kind: 'trueup', quantity: '100', rate: '0.05', amountCents: 500 },
    ]);
    expect(apart.settlement.amountDueCents).toBe(0);
  });

  test('may take its rate as a fraction of what charges cost', () => {
    const of = kWh({ at: 'everyCycle', action: 'pay', to: 'bill', ratesOf: { charges: ['energy'], fraction: '0.5' } });
    expect(said(settled(of, usage(), held).settlement.lines).slice(1)).toEqual(['kwhBank 100 kWh at 0.05 = -5.00']);
  });

  test('keeps a fee back from the payment, never more than it', () => {
    const of = (fee: string, to: string) => usd({ at: 'everyCycle', action: 'pay', to, fee });
    const cycle = usage({ export: 100 });
    expect(said(settled(of('3.00', 'bill'), cycle).settlement.lines).slice(-2)).toEqual([
      'dollars = -10.00',
      'dollars = 3.00',
    ]);
    expect(settled(of('30.63', 'separate'), cycle).settlement.payouts.map((payout) => payout.amountCents)).toEqual([
      1000, -1000,
    ]);
    expect(settled(of('3.00', 'separate'), usage()).settlement.payouts).toEqual([]);
  });

  test('several in one bank come in order, by the same average', () => {
    const keep = { averageCycles: 1, usage: 'import' };
    const of = plan({
      netting: 'none',
      banks: [
        {
          id: 'kwhBank',
          label: 'kWh bank',
          unit: 'kWh',
          trueUps: [
            { at: 'everyCycle', action: 'pay', to: 'separate', rates: FLAT, keep: { amount: '70' } },
            { at: 'everyCycle', action: 'expire', keep },
          ],
        },
      ],
    });
    expect(bank(settled(of, usage({ import: 25 }), held), 'kwhBank').move).toMatchObject({
      paid: '30',
      expired: '45',
      close: '25',
    });
  });
});
