import { describe, expect, test } from 'vitest';
import type { RatePlan } from '#shared/settlement/plan.ts';
import type { CycleUsage, Opening } from '#shared/settlement/settlement.ts';
import { type BuiltHouse, causesACentOff, causesFor, ids, kWh, openingOf, planOf, usageOf } from './billed-house.ts';
import { byPeriod, hourly, netBilling, netMetering } from './built-plans.ts';

const winter = usageOf('2026-01-14', '2026-02-13', { importWh: kWh(612), exportWh: kWh(187), productionWh: kWh(640) });
const summer = usageOf('2026-06-16', '2026-07-16', { importWh: kWh(388), exportWh: kWh(702), productionWh: kWh(990) });

function house(plan: RatePlan, usage: CycleUsage = winter, banks: Opening['banks'] = {}): BuiltHouse {
  return { opening: openingOf(banks), cycles: [{ plan, usage, reads: [] }] };
}

function withCharge(plan: RatePlan, id: string, change: Partial<RatePlan['charges'][number]>): RatePlan {
  return { ...plan, charges: plan.charges.map((one) => (one.id === id ? { ...one, ...change } : one)) };
}

function withBank(plan: RatePlan, change: Partial<RatePlan['banks'][number]>): RatePlan {
  return { ...plan, banks: plan.banks.map((bank) => ({ ...bank, ...change })) };
}

describe('gross for net', () => {
  test('tiers over all import', () => {
    const plan = withBank(withCharge(netMetering, 'energy', { netting: 'none' }), { offsets: ['delivery'] });
    const causes = causesFor(house(netMetering), { plan });
    expect(ids(causes)).toEqual(['tiersOnGross']);
    expect(causes[0]?.words).toBe(
      'Energy: the tiers were run over all 612 kWh imported instead of what is left after netting.',
    );
    expect(causesACentOff(house(netMetering), { plan })).toEqual([]);
  });

  test('a plain charge over all import', () => {
    const plan = withBank(withCharge(netMetering, 'delivery', { netting: 'none' }), { offsets: ['energy'] });
    const causes = causesFor(house(netMetering), { plan });
    expect(ids(causes)).toEqual(['grossForNet']);
    expect(causes[0]?.words).toBe('Delivery: all 612 kWh imported were billed instead of what is left after netting.');
    expect(causesACentOff(house(netMetering), { plan })).toEqual([]);
  });

  test('tiered and plain charges together', () => {
    const gross = withCharge(withCharge(netMetering, 'energy', { netting: 'none' }), 'delivery', { netting: 'none' });
    const causes = causesFor(house(netMetering), { plan: withBank(gross, { offsets: [] }) });
    expect(causes).toMatchObject([{ cause: 'grossForNet', found: { charges: 'energy, delivery' } }]);
  });

  test('the whole plan without netting: all export goes to the bank', () => {
    const causes = causesFor(house(netMetering), { plan: { ...netMetering, netting: 'none' } });
    expect(causes).toMatchObject([{ cause: 'tiersOnGross', found: { charges: 'energy, delivery' } }]);
    expect(causes[0]?.bankShort).toEqual([{ bank: 'kwhBank', period: null, unit: 'kWh', short: '-187' }]);
    const plain = { ...netMetering, charges: netMetering.charges.filter((one) => one.id !== 'energy') };
    const flat = withBank(plain, { offsets: ['delivery'] });
    expect(ids(causesFor(house(flat), { plan: { ...flat, netting: 'none' } }))).toEqual(['grossForNet']);
  });

  test('a plan that nets by the hour billed on the registers', () => {
    const flow = { importWh: kWh(480), exportWh: kWh(55), byPeriod: null };
    const causes = causesFor(house(hourly, { ...winter, netted: { hour: flow } }), {
      plan: withCharge(hourly, 'energy', { netting: 'none' }),
    });
    expect(ids(causes)).toEqual(['grossForNet']);
  });
});

describe('the wrong base', () => {
  test('a non-bypassable charge on the whole use', () => {
    const plan = withCharge({ ...netMetering, load: 'computed' }, 'nonbypassable', { basis: 'load' });
    const causes = causesFor(house(netMetering), { plan });
    expect(ids(causes)).toEqual(['nonbypassableOnLoad']);
    expect(causes[0]?.words).toBe(
      'Non-bypassable charge was billed on all 1065 kWh the house used instead of the kWh imported.',
    );
    expect(causesACentOff(house(netMetering), { plan })).toEqual([]);
  });

  test('two programmes, one of them paid on export', () => {
    const [credit] = netMetering.credits;
    if (!credit) throw new Error('no credit');
    const two = { ...netMetering, credits: [credit, { ...credit, id: 'stateIncentive', label: 'State incentive' }] };
    const plan = {
      ...two,
      credits: two.credits.map((one) =>
        one.id === 'incentive' ? { ...one, basis: 'export' as const, netting: 'none' as const } : one,
      ),
    };
    expect(causesFor(house(two), { plan })).toMatchObject([
      { cause: 'incentiveOnExport', found: { credits: 'incentive' } },
    ]);
  });

  test('the same by the load meter, where the plan has one', () => {
    const metered = { ...netMetering, load: 'metered' as const };
    const plan = withCharge(metered, 'nonbypassable', { basis: 'load' });
    const usage = { ...winter, loadWh: kWh(1070) };
    expect(ids(causesFor(house(metered, usage), { plan }))).toEqual(['nonbypassableOnLoad']);
  });

  test('without production no one knows the whole use', () => {
    const unknown = { ...winter, productionWh: null };
    const bare = { ...netMetering, credits: [] };
    const plan = withCharge({ ...bare, load: 'computed' }, 'nonbypassable', { basis: 'load' });
    const causes = causesFor(house(bare, unknown), { plan, usage: winter });
    expect(causes).toEqual([]);
  });

  test('an incentive paid on export', () => {
    const plan = {
      ...netMetering,
      credits: netMetering.credits.map((one) => ({ ...one, basis: 'export' as const, netting: 'none' as const })),
    };
    const causes = causesFor(house(netMetering), { plan });
    expect(ids(causes)).toEqual(['incentiveOnExport']);
    expect(causes[0]).toMatchObject({
      words: 'Production incentive was paid on the 187 kWh exported instead of on production.',
      overbilledCents: 4640 - 1356,
    });
    expect(causesACentOff(house(netMetering), { plan })).toEqual([]);
  });
});

describe('credited twice', () => {
  test('the plan nets, and all export is credited', () => {
    const flow = { importWh: kWh(480), exportWh: kWh(55), byPeriod: null };
    const plan = { ...hourly, credits: hourly.credits.map((one) => ({ ...one, netting: 'none' as const })) };
    const causes = causesFor(house(hourly, { ...winter, netted: { hour: flow } }), { plan });
    expect(ids(causes)).toEqual(['creditedTwice']);
    expect(causes[0]?.words).toBe('Exported kWh were netted against import and credited again as Export credit.');
  });

  test('the plan credits all export, and import is netted too', () => {
    const plan = withCharge(netBilling, 'energy', { netting: 'cycle' });
    const causes = causesFor(house(netBilling), { plan });
    expect(ids(causes)).toEqual(['creditedTwice']);
    expect(causes[0]?.found).toEqual({ charges: 'energy' });
    expect(causesACentOff(house(netBilling), { plan })).toEqual([]);
  });

  test('one credit given twice, on the bill, apart, or to the bank', () => {
    for (const plan of [hourly, netBilling, netMetering]) {
      const [credit] = plan.credits;
      if (!credit) throw new Error('no credit');
      const flow = { importWh: kWh(480), exportWh: kWh(55), byPeriod: null };
      const twice = { ...plan, credits: [credit, { ...credit, id: 'another' }] };
      const named = <Line extends { component: string }>(line: Line): Line => ({
        ...line,
        component: line.component === 'another' ? credit.id : line.component,
      });
      const causes = causesFor(house(plan, { ...winter, netted: { hour: flow } }), {
        plan: twice,
        after: (settled) => ({
          ...settled,
          settlement: {
            ...settled.settlement,
            lines: settled.settlement.lines.map(named),
            payouts: settled.settlement.payouts.map(named),
          },
        }),
      });
      expect(causes).toMatchObject([{ cause: 'creditedTwice', words: `${credit.label} was given twice.` }]);
    }
  });

  test('a kWh bank that adds what was netted, or what was left over twice', () => {
    const energyOnly = planOf({
      netting: 'cycle',
      charges: [
        {
          id: 'energy',
          label: 'Energy',
          kind: 'import',
          basis: 'import',
          rates: [{ from: winter.from, rate: '0.12' }],
        },
        {
          id: 'customer',
          label: 'Customer charge',
          kind: 'fixed',
          basis: 'cycle',
          rates: [{ from: winter.from, rate: '12' }],
        },
      ],
      banks: [{ id: 'kwhBank', label: 'Energy bank', unit: 'kWh', offsets: ['energy'] }],
    });
    const built = house(energyOnly, summer, { kwhBank: '20' });
    const all = causesFor(built, {
      after: (settled) => ({
        settlement: {
          ...settled.settlement,
          banks: settled.settlement.banks.map((bank) => ({
            ...bank,
            move: { ...bank.move, earned: '702', close: '722' },
          })),
        },
        closing: { ...settled.closing, banks: { kwhBank: '722' } },
      }),
    });
    expect(all).toMatchObject([
      {
        cause: 'creditedTwice',
        words: 'Exported kWh were netted against import and added to Energy bank again.',
        bankShort: [{ bank: 'kwhBank', short: '-388' }],
      },
    ]);
    const twice = causesFor(built, { plan: withBank(energyOnly, { ratio: '2' }) });
    expect(twice).toMatchObject([
      { cause: 'creditedTwice', words: 'What this cycle left over was added to Energy bank twice.' },
    ]);
  });

  test('a bank by period, whose export of a period is added whole', () => {
    const flows = { peak: { importWh: kWh(151), exportWh: kWh(12) }, off: { importWh: kWh(161), exportWh: kWh(175) } };
    const usage = { ...winter, importWh: kWh(312), byPeriod: flows };
    const causes = causesFor(house(byPeriod, usage), {
      after: (settled) => {
        const earned: Record<string, string> = { peak: '12', off: '175' };
        const banks = settled.settlement.banks.map((bank) => {
          const own = earned[bank.period ?? ''] ?? '0';
          return { ...bank, move: { ...bank.move, earned: own, close: own } };
        });
        return { ...settled, settlement: { ...settled.settlement, banks } };
      },
    });
    expect(ids(causes)).toEqual(['creditedTwice']);
  });
});

test('a period this bill lacks adds nothing', () => {
  const usage = {
    ...winter,
    importWh: kWh(161),
    exportWh: kWh(175),
    byPeriod: { off: { importWh: kWh(161), exportWh: kWh(175) } },
  };
  const causes = causesFor(house(byPeriod, usage, { kwhBank: { peak: '7', off: '0' } }), {
    after: (settled) => {
      const banks = settled.settlement.banks.map((bank) =>
        bank.period === 'peak' ? bank : { ...bank, move: { ...bank.move, earned: '175', close: '175' } },
      );
      return { ...settled, settlement: { ...settled.settlement, banks } };
    },
  });
  expect(ids(causes)).toEqual(['creditedTwice']);
});

describe('credit on what it may not pay', () => {
  test('dollars on the customer charge', () => {
    const plan = withBank(netBilling, { offsets: ['energy', 'customer'] });
    const built = house(netBilling, summer, { bank: '40.00' });
    const causes = causesFor(built, { plan });
    expect(ids(causes)).toEqual(['creditOnFixed']);
    expect(causes[0]?.words).toBe('Credit bank was also used to pay Customer charge, which it may not.');
    expect(causesACentOff(built, { plan })).toEqual([]);
  });

  test('dollars on everything', () => {
    const plan = withBank(netBilling, { offsets: ['energy', 'benefits', 'customer'] });
    const causes = causesFor(house(netBilling, summer, { bank: '40.00' }), { plan });
    expect(causes).toMatchObject([{ cause: 'creditOnFixed', found: { bank: 'bank', charges: 'benefits, customer' } }]);
  });

  test('kWh on a charge that is not netted', () => {
    const netted = withCharge(netMetering, 'nonbypassable', { netting: 'cycle' });
    const plan = withBank(netted, { offsets: ['energy', 'delivery', 'nonbypassable'] });
    const causes = causesFor(house(netMetering, winter, { kwhBank: '90' }), { plan });
    expect(causes).toMatchObject([{ cause: 'creditOnFixed', found: { bank: 'kwhBank', charges: 'nonbypassable' } }]);
  });

  test('dollars spent below the minimum bill', () => {
    const floored = planOf({
      netting: 'none',
      charges: [
        {
          id: 'energy',
          label: 'Energy',
          kind: 'import',
          basis: 'import',
          rates: [{ from: winter.from, rate: '0.12' }],
        },
        {
          id: 'least',
          label: 'Minimum bill',
          kind: 'minimum',
          basis: 'floor',
          per: 'cycle',
          on: ['energy'],
          rates: [{ from: winter.from, rate: '18.00' }],
        },
      ],
      credits: [
        {
          id: 'exportCredit',
          label: 'Export credit',
          kind: 'export',
          basis: 'export',
          to: 'bank',
          rates: [{ from: winter.from, rate: '0.11' }],
        },
      ],
      banks: [
        { id: 'bank', label: 'Credit bank', unit: 'USD', sameCycle: true, offsets: ['energy'], keepMinimum: 'least' },
      ],
    });
    const causes = causesFor(house(floored, summer), { plan: withBank(floored, { keepMinimum: null }) });
    expect(causes).toMatchObject([{ cause: 'creditOnFixed', words: 'Credit bank was spent below Minimum bill.' }]);
  });
});
