import { describe, expect, test } from 'vitest';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { bank, CUSTOMER, ENERGY, FLAT, opening, plan, refusal, said, settled, usage } from './plans.ts';

const PERIODS = [
  { id: 'peak', label: 'Peak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' },
];
const BY_PERIOD = { ...ENERGY, rates: PERIODS.map(({ id }) => ({ from: '2025-01-01', period: id, rate: '0.10' })) };
const lot = (amount: string, cyclesLeft = 3) => ({ earned: day('2026-05-16'), amount, cyclesLeft });
const flow = (bought: number, sent: number) => ({ importWh: wh(bought * 1000), exportWh: wh(sent * 1000) });

const byPeriod = (more: object = {}, part: object = {}) =>
  plan({
    netting: 'period',
    calendar: { periods: PERIODS },
    charges: [BY_PERIOD],
    banks: [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', byPeriod: true, offsets: ['energy'], ...more }],
    ...part,
  });
const oneBalance = (more: object = {}) =>
  plan({ netting: 'cycle', banks: [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'], ...more }] });
const cycle = usage({ import: 30, export: 0, byPeriod: { peak: flow(10, 0), off: flow(20, 0) } });

describe('a balance brought in under another plan', () => {
  test('kept by period, with or without lots, is one sum where the plan keeps one balance', () => {
    const plain = { kwhBank: { peak: '4', off: '8' } };
    expect(bank(settled(oneBalance(), cycle, opening({ banks: plain })), 'kwhBank').move.open).toBe('12');
    const inLots = { kwhBank: { peak: { lots: [lot('4'), lot('1')] }, off: { lots: [lot('8')] } } };
    expect(bank(settled(oneBalance(), cycle, opening({ banks: inLots })), 'kwhBank').move.open).toBe('13');
  });

  test('in lots is one sum where the plan keeps none, and stays in its lots where it does', () => {
    const banks = { kwhBank: { lots: [lot('40', 1), lot('25', 2)] } };
    expect(bank(settled(oneBalance(), cycle, opening({ banks })), 'kwhBank')).toMatchObject({
      move: { open: '65', used: '30', close: '35' },
      lots: null,
    });
    expect(bank(settled(oneBalance({ lotLife: { cycles: 12 } }), cycle, opening({ banks })), 'kwhBank')).toMatchObject({
      move: { open: '65', used: '30', expired: '10', close: '25' },
      lots: [{ amount: '25', cyclesLeft: 1 }],
    });
  });

  test('by period in lots is a sum for each period where the plan keeps no lots', () => {
    const banks = { kwhBank: { peak: { lots: [lot('4'), lot('1')] }, off: { lots: [lot('8')] } } };
    const result = settled(byPeriod(), cycle, opening({ banks }));
    expect(bank(result, 'kwhBank', 'peak').move).toMatchObject({ open: '5', used: '5', close: '0' });
    expect(result.closing.banks).toEqual({ kwhBank: { peak: '0', off: '0' } });
  });

  test('that says nothing of a period has nothing of it', () => {
    const result = settled(byPeriod(), cycle, opening({ banks: { kwhBank: { off: '50' } } }));
    expect(bank(result, 'kwhBank', 'peak').move).toMatchObject({ open: '0', close: '0' });
    expect(bank(result, 'kwhBank', 'off').move).toMatchObject({ open: '50', used: '20', close: '30' });
  });

  test('of a period the plan does not have is refused', () => {
    expect(refusal(byPeriod(), cycle, opening({ banks: { kwhBank: { night: '5' } } }))).toBe(
      'kWh bank opens with the period night, which the plan does not have.',
    );
  });

  test('of nothing in lots opens a bank by period at nothing', () => {
    const result = settled(byPeriod(), cycle, opening({ banks: { kwhBank: { lots: [] } } }));
    expect(bank(result, 'kwhBank', 'off').move.open).toBe('0');
  });
});

test('a bank by period needs import and export by period', () => {
  const of = byPeriod({ netting: 'none' }, { netting: 'none' });
  expect(refusal(of, usage({ import: 30 }))).toBe(
    'kWh bank keeps a balance for each period: import and export by period are needed.',
  );
});

test('a bank by period that may pay other periods pays them in the calendar’s order, with what its own leaves', () => {
  const of = byPeriod({ ifPeriodAbsent: 'otherPeriods' });
  const banks = { kwhBank: { peak: '15', off: '6' } };
  const result = settled(of, usage({ import: 20, byPeriod: { off: flow(20, 0) } }), opening({ banks }));
  expect(bank(result, 'kwhBank', 'off').move).toMatchObject({ used: '6', close: '0' });
  expect(bank(result, 'kwhBank', 'peak').move).toMatchObject({ used: '14', close: '1' });
  expect(said(result.settlement.lines)).toEqual(['energy off 0 kWh at 0.10 = 0.00']);
});

describe('a USD bank', () => {
  const SENT = { id: 'sent', label: 'Export credit', kind: 'export', basis: 'export', rates: FLAT, to: 'dollars' };
  const dollars = (more: object, charges: object[] = [ENERGY, CUSTOMER]) =>
    plan({
      charges,
      credits: [SENT],
      banks: [{ id: 'dollars', label: 'Credit bank', unit: 'USD', sameCycle: true, offsets: ['energy'], ...more }],
    });

  test('keeps an amount at a true-up and pays what is over it', () => {
    const of = dollars({ trueUps: [{ at: 'everyCycle', action: 'pay', to: 'bill', keep: { amount: '15.00' } }] });
    const result = settled(of, usage({ export: 200 }));
    expect(bank(result, 'dollars').move).toMatchObject({ earned: '20.00', paid: '5.00', close: '15.00' });
    expect(said(result.settlement.lines)).toContain('dollars = -5.00');
    expect(result.settlement.lines.at(-1)?.working.formula).toBe('-(balance - kept)');
  });

  test('pays nothing where the fee is more than the payment', () => {
    const of = dollars({ trueUps: [{ at: 'everyCycle', action: 'pay', to: 'bill', fee: '20.01' }] });
    const result = settled(of, usage({ export: 200 }));
    expect(bank(result, 'dollars').move).toMatchObject({ paid: '20.00', close: '0.00' });
    expect(said(result.settlement.lines).slice(-2)).toEqual(['dollars = -20.00', 'dollars = 20.00']);
  });

  test('that must keep a floor does not count what is worked out only after it', () => {
    const tax = {
      id: 'tax',
      label: 'Tax',
      kind: 'tax',
      basis: 'percent',
      on: ['energy'],
      afterCredits: true,
      rates: [{ from: '2025-01-01', rate: '0.5' }],
    };
    const least = {
      id: 'least',
      label: 'Minimum',
      kind: 'minimum',
      basis: 'floor',
      per: 'cycle',
      on: ['energy', 'tax'],
      rates: [{ from: '2025-01-01', rate: '4.00' }],
    };
    const of = dollars({ keepMinimum: 'least' }, [ENERGY, tax, least]);
    const result = settled(of, usage({ import: 100, export: 200 }));
    // $10.00 of energy is paid down to $4.00; the tax of half of that comes on top, and nothing is missing to the floor.
    expect(bank(result, 'dollars').move).toMatchObject({ earned: '20.00', used: '6.00', close: '14.00' });
    expect(said(result.settlement.lines)).toEqual([
      'energy 100 kWh at 0.10 = 10.00',
      'sent 200 kWh at 0.10 = -20.00 (not in due)',
      'dollars = -6.00',
      'tax 4 USD at 0.5 = 2.00',
      'least = 0.00',
    ]);
  });
});

describe('a cap', () => {
  const capped = (amount: string, to = 'separate') =>
    plan({
      credits: [
        {
          id: 'paid',
          label: 'Incentive',
          kind: 'incentive',
          basis: 'export',
          rates: FLAT,
          cap: { amount, per: 'term' },
          to,
        },
      ],
    });

  test('stops what is paid apart too, and its working says so', () => {
    const { settlement, closing } = settled(capped('12.50'), usage({ export: 200 }));
    expect(settlement.payouts).toMatchObject([
      { component: 'paid', amountCents: 1250, working: { formula: 'min(roundCents(kWh * rate), capLeft)' } },
    ]);
    expect(closing.capUsed).toEqual({ paid: { term: '12.50' } });
  });

  test('already passed pays nothing more, and nothing back', () => {
    const { settlement } = settled(
      capped('12.50', 'bill'),
      usage({ export: 200 }),
      opening({ capUsed: { paid: { term: '13.00' } } }),
    );
    expect(settlement.lines.at(-1)?.amountCents).toBe(0);
  });

  test('whose use so far is no amount is refused', () => {
    const used = opening({ capUsed: { paid: { term: '1.005' } } });
    expect(refusal(capped('12.50'), usage({ export: 1 }), used)).toBe(
      'What Incentive has earned under its cap is not an amount.',
    );
  });
});

describe('what a kWh bank keeps at a true-up', () => {
  const keeping = (usageBy: string, part: object = {}) =>
    plan({
      netting: 'cycle',
      banks: [
        {
          id: 'kwhBank',
          label: 'kWh bank',
          unit: 'kWh',
          offsets: [],
          trueUps: [{ at: 'everyCycle', action: 'expire', keep: { averageCycles: 1, usage: usageBy } }],
        },
      ],
      ...part,
    });
  const held = opening({
    banks: { kwhBank: '1000' },
    usageSinceTrueUp: { kwhBank: { cycles: 2, kWh: '100' } },
  });
  const kept = (of: ReturnType<typeof keeping>, used: Parameters<typeof usage>[0]) =>
    bank(settled(of, usage(used), held), 'kwhBank').move.close;

  test('goes by the use of the house: import + production − export, or its load meter', () => {
    expect(kept(keeping('load', { load: 'computed' }), { import: 50, production: 90, export: 30 })).toBe('70');
    expect(kept(keeping('load', { load: 'metered' }), { import: 50, loadWh: wh(200_000) })).toBe('100');
  });

  test('or by import, or by import − export, on average of the cycles since the last one', () => {
    expect(kept(keeping('import'), { import: 50, export: 30 })).toBe('50');
    expect(kept(keeping('net'), { import: 50, export: 30 })).toBe('40');
  });

  test('is in whole kWh, or exact where the plan’s limits are', () => {
    expect(kept(keeping('import'), { import: 60 })).toBe('53');
    expect(kept(keeping('import', { rounding: { limits: 'exact' } }), { import: 60 })).toBe('53.333333');
  });

  test('is refused without the reads it goes by', () => {
    expect(refusal(keeping('load', { load: 'metered' }), usage(), held)).toBe(
      'The plan goes by the load meter: its kWh are needed.',
    );
    expect(refusal(keeping('load', { load: 'computed' }), usage(), held)).toBe(
      'The plan goes by the house’s use: production is needed.',
    );
  });
});

test('a true-up that pays kWh is refused before its first rate is in force', () => {
  const of = oneBalance({
    trueUps: [{ at: 'everyCycle', action: 'pay', to: 'bill', rates: [{ from: '2027-01-01', rate: '0.03' }] }],
  });
  expect(refusal(of, usage(), opening({ banks: { kwhBank: '5' } }))).toBe(
    'kWh bank has no true-up rate in force on 2026-07-16.',
  );
});
