import { describe, expect, test } from 'vitest';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { bank, CUSTOMER, ENERGY, FLAT, opening, plan, refusal, said, settled, usage } from './plans.ts';

const KWH = { id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] };
const USD = { id: 'dollars', label: 'Credit bank', unit: 'USD', sameCycle: true, offsets: ['energy'] };
const EXPORT = { id: 'sent', label: 'Export credit', kind: 'export', basis: 'export', rates: FLAT, to: 'dollars' };
const PERIODS = [
  { id: 'peak', label: 'Peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' },
];
const flow = (bought: number, sent = 0) => ({ importWh: wh(bought * 1000), exportWh: wh(sent * 1000) });

describe('a kWh bank', () => {
  const banked = (more: object = {}, part: object = {}) =>
    plan({ netting: 'cycle', banks: [{ ...KWH, ...more }], ...part });

  test('earns what is exported after netting, for the next cycle, and lowers import no further than to zero', () => {
    const first = settled(banked(), usage({ import: 100, export: 340 }), opening({ banks: { kwhBank: '20' } }));
    expect(bank(first, 'kwhBank').move).toEqual({
      open: '20',
      earned: '240',
      used: '0',
      expired: '0',
      paid: '0',
      close: '260',
    });
    const next = settled(banked(), usage({ import: 400, export: 300 }), first.closing);
    expect(said(next.settlement.lines)).toEqual(['energy 0 kWh at 0.10 = 0.00']);
    expect(bank(next, 'kwhBank').move).toMatchObject({ used: '100', close: '160' });
  });

  test('pays with what the same cycle earned only where the plan says so', () => {
    const gross = { netting: 'none' };
    expect(bank(settled(banked({}, gross), usage({ import: 50, export: 80 })), 'kwhBank').move.used).toBe('0');
    expect(
      bank(settled(banked({ sameCycle: true }, gross), usage({ import: 50, export: 80 })), 'kwhBank').move,
    ).toMatchObject({ earned: '80', used: '50', close: '30' });
  });

  test('earns by its ratio, exactly or in whole kWh', () => {
    const cycle = usage({ export: 543 });
    expect(bank(settled(banked({ ratio: '0.6' }), cycle), 'kwhBank').move.earned).toBe('325.8');
    const whole = { rounding: { money: 'halfUp', limits: 'whole', kWh: 'whole' } };
    expect(bank(settled(banked({ ratio: '0.6' }, whole), cycle), 'kwhBank').move.earned).toBe('326');
  });

  test('keeps the working exact where a ratio leaves more digits than a Wh has', () => {
    const of = banked({ ratio: '0.12345678912', sameCycle: true }, { netting: 'none' });
    const result = settled(of, usage({ import: 500, export: 100.001 }));
    expect(said(result.settlement.lines)).toEqual(['energy 487.654198 kWh at 0.10 = 48.77']);
  });

  test('lowers several charges at once, and two banks never lower one below zero', () => {
    const supply = { ...ENERGY, id: 'supply', label: 'Supply' };
    const of = plan({
      netting: 'cycle',
      charges: [supply, ENERGY],
      banks: [
        { ...KWH, id: 'supplier', offsets: ['supply'] },
        { ...KWH, id: 'wires', offsets: ['energy', 'supply'] },
      ],
    });
    const result = settled(of, usage({ import: 100 }), opening({ banks: { supplier: '70', wires: '500' } }));
    expect(said(result.settlement.lines)).toEqual(['supply 0 kWh at 0.10 = 0.00', 'energy 70 kWh at 0.10 = 7.00']);
    expect(bank(result, 'wires').move).toMatchObject({ used: '30', close: '470' });
  });

  test('takes its charge whole and may go below zero under belowZero; its lines are not in due', () => {
    const result = settled(banked({ belowZero: true }), usage({ import: 300 }), opening({ banks: { kwhBank: '100' } }));
    expect(said(result.settlement.lines)).toEqual(['energy 0 kWh at 0.10 = 0.00 (not in due)']);
    expect(bank(result, 'kwhBank').move).toMatchObject({ used: '300', close: '-200' });
  });

  test('without offsets is a memory: it earns and pays nothing', () => {
    const result = settled(banked({ offsets: [] }), usage({ import: 300 }), opening({ banks: { kwhBank: '100' } }));
    expect(bank(result, 'kwhBank').move).toMatchObject({ used: '0', close: '100' });
  });

  test('drops a balance below zero at a true-up', () => {
    const of = banked({ belowZero: true, trueUps: [{ at: 'everyCycle', action: 'expire' }] });
    expect(bank(settled(of, usage({ import: 300 })), 'kwhBank').move).toMatchObject({
      used: '300',
      expired: '-300',
      close: '0',
    });
  });

  test('leaves what other plans banked under other ids where it is', () => {
    expect(settled(banked(), usage(), opening({ banks: { older: '70' } })).closing.banks).toEqual({
      older: '70',
      kwhBank: '0',
    });
  });
});

describe('a kWh bank by period', () => {
  const rates = PERIODS.map(({ id }) => ({ from: '2025-01-01', period: id, rate: '0.10' }));
  const byPeriod = (more: object = {}) =>
    plan({
      netting: 'period',
      calendar: { periods: PERIODS },
      charges: [{ ...ENERGY, rates }],
      banks: [{ ...KWH, byPeriod: true, ...more }],
    });
  const held = opening({ banks: { kwhBank: { peak: '50', off: '10' } } });

  test('pays each period from its own balance only', () => {
    const result = settled(byPeriod(), usage({ byPeriod: { peak: flow(30), off: flow(40) } }), held);
    expect(said(result.settlement.lines)).toEqual([
      'energy peak 0 kWh at 0.10 = 0.00',
      'energy off 30 kWh at 0.10 = 3.00',
    ]);
    expect(result.closing.banks.kwhBank).toEqual({ peak: '20', off: '0' });
  });

  test('holds the balance of a period that the bill lacks, or pays other periods with it', () => {
    const bill = usage({ byPeriod: { off: flow(40) } });
    expect(settled(byPeriod(), bill, held).closing.banks.kwhBank).toEqual({ peak: '50', off: '0' });
    const free = settled(byPeriod({ ifPeriodAbsent: 'otherPeriods' }), bill, held);
    expect(said(free.settlement.lines)).toEqual(['energy off 0 kWh at 0.10 = 0.00']);
    expect(free.closing.banks.kwhBank).toEqual({ peak: '20', off: '0' });
  });

  test('keeps lots for each period', () => {
    const of = byPeriod({ lotLife: { cycles: 2 } });
    const first = settled(of, usage({ byPeriod: { peak: flow(0, 5), off: flow(1) } }));
    expect(first.closing.banks.kwhBank).toEqual({
      peak: { lots: [{ earned: '2026-07-16', amount: '5', cyclesLeft: 2 }] },
      off: { lots: [] },
    });
    const second = settled(of, usage({ byPeriod: { peak: flow(2), off: flow(1) } }), first.closing);
    expect(bank(second, 'kwhBank', 'peak')).toMatchObject({
      move: { used: '2', close: '3' },
      lots: [{ amount: '3', cyclesLeft: 1 }],
    });
  });

  test('does not guess to which period an opening balance belongs', () => {
    expect(refusal(byPeriod(), usage({ byPeriod: { off: flow(1) } }), opening({ banks: { kwhBank: '60' } }))).toMatch(
      /say how much/,
    );
  });
});

describe('lots', () => {
  const lots = [
    { earned: day('2026-05-15'), amount: '30', cyclesLeft: 1 },
    { earned: day('2026-06-16'), amount: '30', cyclesLeft: 2 },
  ];
  const of = plan({ netting: 'cycle', banks: [{ ...KWH, lotLife: { cycles: 2 } }] });
  const held = opening({ banks: { kwhBank: { lots } } });

  test('are used oldest first, and die at the close of their last cycle after its use', () => {
    const result = settled(of, usage({ import: 10 }), held);
    expect(bank(result, 'kwhBank')).toMatchObject({
      move: { open: '60', used: '10', expired: '20', close: '30' },
      lots: [{ earned: '2026-06-16', amount: '30', cyclesLeft: 1 }],
    });
  });

  test('are not touched by a settlement that is done again', () => {
    settled(of, usage({ import: 10 }), held);
    expect(lots.map((lot) => lot.amount)).toEqual(['30', '30']);
  });

  test('take a balance without ages as one lot with its life before it', () => {
    expect(settled(of, usage(), opening({ banks: { kwhBank: '7' } })).closing.banks.kwhBank).toEqual({
      lots: [{ earned: '2026-06-16', amount: '7', cyclesLeft: 1 }],
    });
  });

  test('are summed where a new plan keeps one balance', () => {
    expect(settled(plan({ netting: 'cycle', banks: [KWH] }), usage(), held).closing.banks.kwhBank).toBe('60');
  });
});

describe('a USD bank', () => {
  const banked = (more: object = {}, charges: unknown[] = [ENERGY, CUSTOMER]) =>
    plan({ charges, credits: [EXPORT], banks: [{ ...USD, ...more }] });

  test('pays its lines in their order and fixed charges only if they are listed', () => {
    const cycle = usage({ import: 100, export: 180 });
    expect(said(settled(banked(), cycle).settlement.lines)).toEqual([
      'energy 100 kWh at 0.10 = 10.00',
      'customer 1 cycle at 12.00 = 12.00',
      'sent 180 kWh at 0.10 = -18.00 (not in due)',
      'dollars = -10.00',
    ]);
    expect(bank(settled(banked({ offsets: ['customer', 'energy'] }), cycle), 'dollars').move).toMatchObject({
      earned: '18.00',
      used: '18.00',
      close: '0.00',
    });
  });

  test('stops where the floor it must keep would be undercut; without that the floor tops up', () => {
    const floor = {
      id: 'least',
      label: 'Minimum bill',
      kind: 'minimum',
      basis: 'floor',
      per: 'day',
      on: ['energy'],
      rates: [{ from: '2025-01-01', rate: '0.53' }],
    };
    const cycle = usage({ import: 325, export: 234.1 });
    expect(said(settled(banked({ keepMinimum: 'least' }, [ENERGY, floor]), cycle).settlement.lines).slice(2)).toEqual([
      'dollars = -16.60',
      'least = 0.00',
    ]);
    expect(said(settled(banked({}, [ENERGY, floor]), cycle).settlement.lines).slice(2)).toEqual([
      'dollars = -23.41',
      'least = 6.81',
    ]);
  });

  test.each([
    // 15 days at $0.53 and 15 at $0.63: $17.40; of two monthly minimums half each: $17.50.
    ['day', '0.53', '0.63', '-15.10'],
    ['cycle', '15.00', '20.00', '-15.00'],
  ])(
    'keeps a minimum by the %s whose amount changes inside the cycle for the days of each',
    (per, before, after, credit) => {
      const rates = [
        { from: '2025-01-01', rate: before },
        { from: '2026-07-01', rate: after },
      ];
      const floor = { id: 'least', label: 'Minimum bill', kind: 'minimum', basis: 'floor', per, on: ['energy'], rates };
      const { lines } = settled(
        banked({ keepMinimum: 'least' }, [ENERGY, floor]),
        usage({ import: 325, export: 234.1 }),
      ).settlement;
      expect(said(lines)).toContain(`dollars = ${credit}`);
    },
  );

  test('under belowZero takes its lines whole, has no credit line, and is billed at a true-up when it owes', () => {
    const of = banked({ belowZero: true, trueUps: [{ at: { months: [7] }, action: 'expire' }] });
    const result = settled(of, usage({ import: 300, export: 100 }));
    expect(said(result.settlement.lines)).toEqual([
      'energy 300 kWh at 0.10 = 30.00 (not in due)',
      'customer 1 cycle at 12.00 = 12.00',
      'sent 100 kWh at 0.10 = -10.00 (not in due)',
      'dollars = 20.00',
    ]);
    expect(bank(result, 'dollars').move).toEqual({
      open: '0.00',
      earned: '10.00',
      used: '30.00',
      expired: '0.00',
      paid: '-20.00',
      close: '0.00',
    });
  });

  test('opens with whole cents', () => {
    expect(refusal(banked(), usage(), opening({ banks: { dollars: '1.005' } }))).toBe(
      'A bank in USD opens with whole cents.',
    );
  });
});
