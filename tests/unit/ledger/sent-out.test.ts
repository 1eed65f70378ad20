import { describe, expect, test } from 'vitest';
import type { SentOut } from '#shared/ledger/cycle.ts';
import { sentOutOf, withSentOut } from '#shared/ledger/sent-out.ts';
import { EMPTY_OPENING, type SettledBank } from '#shared/settlement/settlement.ts';
import { ZERO_CENTS } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';

const MOVE = { open: '40', earned: '175', used: '0', expired: '0', paid: '0', close: '215' };
const PLAIN: SettledBank = { bank: 'kwh', label: 'Bank', unit: 'kWh', period: null, move: MOVE, lots: null };

function settledWith(bank: SettledBank, held: string | { lots: NonNullable<SettledBank['lots']> }) {
  return {
    settlement: {
      from: day('2026-04-14'),
      to: day('2026-05-13'),
      days: 29,
      lines: [],
      banks: [bank],
      payouts: [],
      amountDueCents: ZERO_CENTS,
    },
    closing: { ...EMPTY_OPENING, banks: { [bank.bank]: held, other: '3' } },
  };
}

const sent = (amount: string, unit: SentOut['unit'] = 'kWh'): SentOut[] => [
  { bank: 'kwh', unit, amount, valueCents: null },
];

describe('credit sent out of a bank', () => {
  test('lowers the close and what the next cycle opens with, and leaves every other move and bank', () => {
    const made = withSentOut(settledWith(PLAIN, '215'), sent('90'));
    expect(made.settlement.banks[0]?.move).toEqual({ ...MOVE, close: '125' });
    expect(made.closing.banks).toEqual({ kwh: '125', other: '3' });
  });

  test('is taken from the oldest lots first', () => {
    const lots = [
      { earned: day('2026-02-12'), amount: '60', cyclesLeft: 9 },
      { earned: day('2026-03-14'), amount: '80', cyclesLeft: 10 },
      { earned: day('2026-04-14'), amount: '75', cyclesLeft: 11 },
    ];
    const made = withSentOut(settledWith({ ...PLAIN, lots }, { lots }), sent('90'));
    const left = [{ ...lots[1], amount: '50' }, lots[2]];
    expect(made.settlement.banks[0]).toMatchObject({ lots: left, move: { close: '125' } });
    expect(made.closing.banks.kwh).toEqual({ lots: left });
  });

  test('keeps to whole cents in dollars, and to what is stated where that is finer', () => {
    const usd: SettledBank = { ...PLAIN, unit: 'USD', move: { ...MOVE, close: '215.10' } };
    expect(withSentOut(settledWith(usd, '215.10'), sent('0.60', 'USD')).closing.banks.kwh).toBe('214.50');
    expect(withSentOut(settledWith(usd, '215.10'), sent('0.605', 'USD')).closing.banks.kwh).toBe('214.495');
  });

  test('changes nothing of a bank kept by period, of one in another unit, or where nothing was sent', () => {
    const byPeriod = settledWith({ ...PLAIN, period: 'peak' }, '215');
    expect(withSentOut(byPeriod, sent('90'))).toEqual(byPeriod);
    const settled = settledWith(PLAIN, '215');
    expect(withSentOut(settled, sent('90', 'USD'))).toEqual(settled);
    expect(withSentOut(settled, [])).toBe(settled);
  });

  test('is read off the statement, by the plan’s id where it has one; zero is nothing sent', () => {
    const [statement] = buildHousehold().statements;
    if (!statement) throw new Error('the built household has a statement');
    const of = (sentOut: string | null) => ({
      ...statement,
      banks: statement.banks.map((bank) => ({ ...bank, sentOut })),
    });
    expect(sentOutOf(of('4.50'), () => 'plans')).toMatchObject([{ bank: 'plans', amount: '4.50' }]);
    expect(sentOutOf(of('4.50'), () => null)).toMatchObject([{ bank: 'creditBank' }]);
    expect(sentOutOf(of('0'), () => null)).toEqual([]);
    expect(sentOutOf(of(null), () => null)).toEqual([]);
  });
});
