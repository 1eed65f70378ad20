import { describe, expect, test } from 'vitest';
import { bank, CUSTOMER, ENERGY, FLAT, opening, plan, said, settled, usage } from './plans.ts';

describe('a true-up takes no more than is over', () => {
  const PERIODS = [
    { id: 'peak', label: 'Peak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
    { id: 'off', label: 'Off-peak', when: 'rest' },
  ];

  test('from several balances together, in the calendar’s order', () => {
    const of = plan({
      netting: 'period',
      calendar: { periods: PERIODS },
      banks: [
        {
          id: 'kwhBank',
          label: 'kWh bank',
          unit: 'kWh',
          byPeriod: true,
          offsets: [],
          trueUps: [{ at: 'everyCycle', action: 'expire', keep: { amount: '30' } }],
        },
      ],
    });
    const result = settled(of, usage({ byPeriod: {} }), opening({ banks: { kwhBank: { peak: '20', off: '40' } } }));
    expect(bank(result, 'kwhBank', 'peak').move).toMatchObject({ expired: '20', close: '0' });
    expect(bank(result, 'kwhBank', 'off').move).toMatchObject({ expired: '10', close: '30' });
  });

  test('and pays a cent where a cent is all there is', () => {
    const of = plan({
      credits: [{ id: 'sent', label: 'Export', kind: 'export', basis: 'export', rates: FLAT, to: 'dollars' }],
      banks: [
        {
          id: 'dollars',
          label: 'Credit bank',
          unit: 'USD',
          sameCycle: true,
          offsets: [],
          trueUps: [{ at: 'everyCycle', action: 'pay', to: 'separate' }],
        },
      ],
    });
    expect(settled(of, usage({ export: 0.1 })).settlement.payouts).toMatchObject([{ amountCents: 1 }]);
    expect(settled(of, usage()).settlement.payouts).toEqual([]);
  });
});

describe('what a line says', () => {
  test('names the plan its rate is from, and “Rate plan” where it has no name', () => {
    const source = (of: ReturnType<typeof plan>) =>
      settled(of, usage({ import: 1 })).settlement.lines[0]?.working.inputs.at(-1)?.source;
    expect(source(plan({ name: 'Net billing 2025' }))).toEqual({
      kind: 'rule',
      name: 'Net billing 2025',
      version: '2025-01-01',
    });
    expect(source(plan())).toEqual({ kind: 'rule', name: 'Rate plan', version: '2025-01-01' });
  });

  test('of a cycle that is not split says nothing of days', () => {
    const [line] = settled(plan({ charges: [CUSTOMER] }), usage()).settlement.lines;
    expect(line?.working.formula).toBe('roundCents(rate)');
    expect(line?.working.inputs.map((input) => input.name)).toEqual(['rate']);
  });

  test('of export says how it was netted, as of import', () => {
    const of = plan({ netting: 'cycle', charges: [ENERGY, { ...ENERGY, id: 'out', label: 'Out', basis: 'export' }] });
    const labels = settled(of, usage({ import: 1, export: 3 })).settlement.lines.map(
      (line) => line.working.inputs[0]?.label,
    );
    expect(labels).toEqual(['Import, netted over the cycle', 'Export, netted over the cycle']);
  });
});

test('of two rows of one day the one that names more holds, in whatever order they are written', () => {
  const periods = [
    { id: 'peak', label: 'Peak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
    { id: 'off', label: 'Off-peak', when: 'rest' },
  ];
  const rows = [
    { from: '2025-01-01', rate: '0.10' },
    { from: '2025-01-01', period: 'peak', rate: '0.30' },
  ];
  for (const rates of [rows, rows.toReversed()]) {
    const of = plan({ calendar: { periods }, charges: [{ ...ENERGY, rates }] });
    const byPeriod = {
      peak: { importWh: usage({ import: 10 }).importWh, exportWh: usage().exportWh },
      off: { importWh: usage({ import: 20 }).importWh, exportWh: usage().exportWh },
    };
    expect(said(settled(of, usage({ import: 30, byPeriod })).settlement.lines)).toEqual([
      'energy peak 10 kWh at 0.30 = 3.00',
      'energy off 20 kWh at 0.10 = 2.00',
    ]);
  }
});
