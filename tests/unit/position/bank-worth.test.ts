import { describe, expect, it } from 'vitest';
import { bankWorth } from '#shared/position/bank-worth.ts';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { EMPTY_OPENING, type Opening } from '#shared/settlement/settlement.ts';
import { day } from '#shared/units/day.ts';

const FROM = day('2026-03-14');
const TO = day('2026-04-14');
const rates = [{ from: '2024-01-01', rate: '0.20' }];

type Bank = NonNullable<RatePlanInput['banks']>[number];
type Credit = NonNullable<RatePlanInput['credits']>[number];

type Charge = RatePlanInput['charges'][number];

const energy: Charge = { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates };
const rider: Charge = { ...energy, id: 'rider', label: 'Rider', rates: [{ from: '2024-01-01', rate: '0.03' }] };
const credit = (kind: Credit['kind'], id: string): Credit => ({
  id,
  label: id,
  kind,
  basis: kind === 'export' ? 'export' : 'production',
  to: 'held',
  rates,
});

/** What one bank of a plan is worth with so much in it. */
function worth(
  bank: Partial<Bank>,
  held: Opening['banks'][string] | null,
  credits: Credit[] = [],
  charges: RatePlanInput['charges'] = [energy, rider],
): number {
  const banks: Bank[] = [{ id: 'held', label: 'Bank', unit: 'kWh', ...bank }];
  const plan = ratePlanSchema.parse({
    timeZone: 'America/New_York',
    netting: 'none',
    charges,
    credits,
    banks,
  });
  return bankWorth(plan, { ...EMPTY_OPENING, banks: held === null ? {} : { held } }, FROM, TO);
}

const pay = (changes: object = {}) => ({ at: 'everyCycle' as const, action: 'pay' as const, ...changes });

describe('what a bank is worth', () => {
  it('in kWh is the price of the charges it will offset, all of them', () => {
    expect(worth({ offsets: ['energy'] }, '10')).toBe(200);
    expect(worth({ offsets: ['energy', 'rider'] }, '10')).toBe(230);
  });

  it('in kWh that offset nothing is what a true-up pays, at the last price in force by the close', () => {
    const paid = [
      { from: '2024-01-01', rate: '0.04' },
      { from: '2026-04-14', rate: '0.05' },
      { from: '2026-04-15', rate: '0.09' },
    ];
    expect(worth({ trueUps: [pay({ rates: paid })] }, '10')).toBe(50);
  });

  it('in kWh that offset a charge without a price yet is what a true-up pays', () => {
    const later: Charge = { ...energy, rates: [{ from: '2027-01-01', rate: '0.20' }] };
    const bank: Partial<Bank> = {
      offsets: ['energy'],
      trueUps: [pay({ rates: [{ from: '2024-01-01', rate: '0.04' }] })],
    };
    expect(worth(bank, '10', [], [later, rider])).toBe(40);
  });

  it('in kWh that are neither offset nor paid for is nothing', () => {
    expect(worth({}, '10')).toBe(0);
    expect(worth({ trueUps: [{ at: 'everyCycle', action: 'expire' }] }, '10')).toBe(0);
    expect(worth({ trueUps: [pay({ rates: [{ from: '2026-05-01', rate: '0.05' }] })] }, '10')).toBe(0);
  });

  it('in kWh that expire is nothing, whatever price stands beside it', () => {
    expect(worth({ trueUps: [{ at: 'everyCycle', action: 'expire', rates }] }, '10')).toBe(0);
    expect(worth({ trueUps: [{ at: 'everyCycle', action: 'expire', rates }, pay({ rates })] }, '10')).toBe(200);
  });

  it('in dollars is its face where the dollars can be spent or are paid, else nothing', () => {
    expect(worth({ unit: 'USD', offsets: ['energy'] }, '12.34')).toBe(1_234);
    expect(worth({ unit: 'USD', trueUps: [pay()] }, '12.34')).toBe(1_234);
    expect(worth({ unit: 'USD', trueUps: [{ at: 'everyCycle', action: 'expire' }] }, '12.34')).toBe(0);
    expect(worth({ unit: 'USD' }, '12.34')).toBe(0);
  });

  it('is left to the incentive’s book where the incentive alone feeds it', () => {
    const bank: Partial<Bank> = { unit: 'USD', offsets: ['energy'] };
    expect(worth(bank, '12.34', [credit('incentive', 'reward')])).toBe(0);
    expect(worth(bank, '12.34', [credit('incentive', 'reward'), credit('export', 'sold')])).toBe(1_234);
    expect(worth(bank, '12.34', [credit('export', 'sold')])).toBe(1_234);
  });

  it('is nothing where the bank is empty or has not been opened', () => {
    expect(worth({ offsets: ['energy'] }, '0')).toBe(0);
    expect(worth({ offsets: ['energy'] }, null)).toBe(0);
  });
});
