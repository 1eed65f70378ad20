import { describe, expect, test } from 'vitest';
import type { TrueRead } from '#shared/reconcile/causes/cause.ts';
import { isSeen } from '#shared/reconcile/causes/channels-seen.ts';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import { day } from '#shared/units/day.ts';
import {
  type BuiltHouse,
  billed,
  causesACentOff,
  causesFor,
  ids,
  inputOf,
  kWh,
  openingOf,
  planOf,
  readOf,
  usageOf,
} from './billed-house.ts';
import { byPeriod, hourly, netBilling, netMetering } from './built-plans.ts';

const [FROM, TO] = ['2026-01-14', '2026-02-13'];
const usage = usageOf(FROM, TO, { importWh: kWh(612), exportWh: kWh(187), productionWh: kWh(640) });

function house(reads: TrueRead[], more: Partial<CycleUsage> = {}, plan = netBilling): BuiltHouse {
  return { opening: openingOf({}), cycles: [{ plan, usage: { ...usage, ...more }, reads }] };
}

describe('dial roll-over', () => {
  const reads = [
    readOf('import', FROM, TO, 99_700, 612),
    readOf('export', FROM, TO, 99_900, 187),
    readOf('production', FROM, TO, 5000, 640),
  ];

  test('a difference taken as it stands is found, on one register or on both', () => {
    const one = causesFor(house(reads), { usage: { ...usage, importWh: kWh(612 - 100_000) } });
    expect(ids(one)).toEqual(['registerRollover']);
    expect(one[0]?.words).toBe(
      'The register passed all nines and the difference was taken as it stands: −99,388 kWh of import instead of 612.',
    );
    expect(one[0]?.found).toEqual({ channels: 'import' });
    const both = { ...usage, importWh: kWh(612 - 100_000), exportWh: kWh(187 - 100_000) };
    expect(causesFor(house(reads), { usage: both })[0]?.found).toEqual({ channels: 'import, export' });
  });

  test('a cent off, and without a register that passed all nines, it is no cause', () => {
    const mistake = { usage: { ...usage, importWh: kWh(612 - 100_000) } };
    expect(causesACentOff(house(reads), mistake)).toEqual([]);
    const plain = [readOf('import', FROM, TO, 700, 612), readOf('export', FROM, TO, 900, 187)];
    expect(causesFor(house(plain), mistake)).toEqual([]);
  });
});

describe('multiplier', () => {
  const reads = [
    readOf('import', FROM, TO, 700, 612),
    readOf('export', FROM, TO, 900, 187),
    readOf('production', FROM, TO, 5000, 640),
  ];

  test.each([
    [10, 'import', '10'],
    [40, 'import', '40'],
    [1 / 20, 'import', '0.05'],
  ])('import billed at %d times the register', (factor, channels, multiplier) => {
    const mistake = { usage: { ...usage, importWh: kWh(612 * factor) } };
    const [found, ...more] = causesFor(house(reads), mistake);
    expect(more).toEqual([]);
    expect(found).toMatchObject({ cause: 'wrongMultiplier', found: { channels, multiplier } });
    expect(found?.words).toBe(`The import register was multiplied by ${multiplier}; the meter’s multiplier is 1.`);
    expect(causesACentOff(house(reads), mistake)).toEqual([]);
  });

  test('all registers at once, and 1 in place of the meter’s own', () => {
    const tenfold = { ...usage, importWh: kWh(6120), exportWh: kWh(1870), productionWh: kWh(6400) };
    expect(causesFor(house(reads), { usage: tenfold })[0]).toMatchObject({
      cause: 'wrongMultiplier',
      words: 'The import, export and production registers were multiplied by 10; the meter’s multiplier is 1.',
    });
    const forty = reads.map((read) => ({ ...read, multiplier: '40' }));
    const built = house(forty, { importWh: kWh(612 * 40), exportWh: kWh(187 * 40), productionWh: kWh(640 * 40) });
    expect(causesFor(built, { usage })[0]).toMatchObject({ cause: 'wrongMultiplier', found: { multiplier: '1' } });
    const half = {
      usage: { ...usage, importWh: kWh(61.2 * 40), exportWh: kWh(187 * 40), productionWh: kWh(640 * 40) },
    };
    expect(causesFor(built, half)[0]).toMatchObject({
      cause: 'wrongMultiplier',
      words: 'The import register was multiplied by 4; the meter’s multiplier is 40.',
    });
  });

  test('meters of different multipliers on one channel, all taken at one', () => {
    const mid = '2026-01-30';
    const two = [
      readOf('import', FROM, mid, 700, 300),
      readOf('import', mid, TO, 0, 400, { meter: 'new', multiplier: '10' }),
      readOf('export', FROM, TO, 900, 187),
    ];
    const found = causesFor(house(two, { importWh: kWh(700) }), { usage: { ...usage, importWh: kWh(3400) } });
    expect(found[0]).toMatchObject({ cause: 'wrongMultiplier', found: { channels: 'import', multiplier: '10' } });
    expect(found[0]?.words).toContain('the meter’s multiplier is 1 and 10.');
  });

  test('without reads the kWh known are taken for the register’s', () => {
    const found = causesFor(house([]), { usage: { ...usage, exportWh: kWh(1870) } });
    expect(found[0]).toMatchObject({ cause: 'wrongMultiplier', found: { channels: 'export', multiplier: '10' } });
  });

  test('what is known by period grows with the total', () => {
    const flows = {
      peak: { importWh: kWh(150), exportWh: kWh(40) },
      off: { importWh: kWh(462), exportWh: kWh(147) },
    };
    const tenfold = {
      peak: { importWh: kWh(1500), exportWh: kWh(400) },
      off: { importWh: kWh(4620), exportWh: kWh(1470) },
    };
    const net = reads.slice(0, 2);
    const built = house(net, { byPeriod: flows, productionWh: null }, byPeriod);
    const found = causesFor(built, {
      usage: { ...usage, importWh: kWh(6120), exportWh: kWh(1870), productionWh: null, byPeriod: tenfold },
    });
    expect(ids(found)).toEqual(['wrongMultiplier']);
    const hour = { importWh: kWh(500), exportWh: kWh(75), byPeriod: null };
    const byHour = house(net, { netted: { hour }, productionWh: null }, hourly);
    const threefold = { importWh: kWh(5000), exportWh: kWh(750), byPeriod: null };
    expect(
      ids(
        causesFor(byHour, {
          usage: {
            ...usage,
            importWh: kWh(6120),
            exportWh: kWh(1870),
            productionWh: null,
            netted: { hour: threefold },
          },
        }),
      ),
    ).toEqual(['wrongMultiplier']);
  });

  test('where the statement prints no kWh the cents alone tell', () => {
    const built = house([]);
    const [statement] = billed(built, [{ usage: { ...usage, importWh: kWh(12_240), exportWh: kWh(3740) } }]);
    if (!statement) throw new Error('no statement');
    const silent = {
      ...statement,
      importWh: null,
      exportWh: null,
      productionWh: null,
      lines: (statement.lines ?? []).map((line) => ({ ...line, quantity: null })),
    };
    expect(findCauses(inputOf(built, [silent]))[0]).toMatchObject({
      cause: 'wrongMultiplier',
      found: { channels: 'import, export', multiplier: '20' },
    });
  });
});

test('a register is tried only where the plan makes something of it or its kWh are printed', () => {
  const base = planOf({
    netting: 'none',
    charges: [
      {
        id: 'energy',
        label: 'Energy',
        kind: 'import',
        basis: 'import',
        rates: [{ from: day('2025-01-01'), rate: '0.11' }],
      },
    ],
  });
  const onUse = {
    ...base,
    load: 'computed' as const,
    charges: base.charges.map((one) => ({ ...one, basis: 'load' as const })),
  };
  const kept = { keep: { averageCycles: 4, usage: 'load' as const }, atLeast: '0', action: 'expire' as const };
  const trueUp = { at: 'everyCycle' as const, rates: null, ratesOf: null, to: null, fee: '0' };
  const [bank] = netMetering.banks;
  if (!bank) throw new Error('no bank');
  const capped = {
    ...onUse,
    charges: base.charges,
    banks: [{ ...bank, offsets: [], trueUps: [{ ...trueUp, ...kept }] }],
  };
  const averaged = {
    ...capped,
    banks: [{ ...bank, offsets: [], trueUps: [{ ...trueUp, ...kept, keep: { amount: '5' } }] }],
  };
  const metered = { ...onUse, load: 'metered' as const };
  const netted = { ...base, charges: base.charges.map((one) => ({ ...one, netting: 'cycle' as const })) };
  const silent = {
    days: null,
    reads: [],
    importWh: null,
    exportWh: null,
    productionWh: null,
    lines: null,
    banks: [],
    payouts: null,
    amountDueCents: null,
  };
  const seen = (plan: typeof base) =>
    (['import', 'export', 'production', 'load'] as const)
      .filter((channel) => isSeen({ plan, usage, reads: [], billed: silent }, channel))
      .join();
  expect(seen(base)).toBe('import');
  expect(seen(netted)).toBe('import,export');
  expect(seen(netBilling)).toBe('import,export');
  expect(seen(netMetering)).toBe('import,export,production');
  expect(seen(onUse)).toBe('import,export,production');
  expect(seen(capped)).toBe('import,export,production');
  expect(seen(averaged)).toBe('import,export');
  expect(seen(metered)).toBe('load');
  expect(isSeen({ plan: base, usage, reads: [], billed: { ...silent, productionWh: kWh(1) } }, 'production')).toBe(
    true,
  );
});

describe('registers exchanged', () => {
  test('import and export changed places', () => {
    const swapped = { ...usage, importWh: usage.exportWh, exportWh: usage.importWh };
    const found = causesFor(house([]), { usage: swapped });
    expect(ids(found)).toEqual(['registersSwapped']);
    expect(found[0]?.words).toBe(
      'Import and export were exchanged: 187 kWh were billed as import and 612 kWh as export.',
    );
    expect(causesACentOff(house([]), { usage: swapped })).toEqual([]);
  });

  test('with as much import as export there is nothing to exchange', () => {
    const even = house([], { exportWh: usage.importWh });
    expect(causesFor(even)).toEqual([]);
  });
});

describe('meter exchange', () => {
  const mid = '2026-01-29';
  const reads = [
    readOf('import', FROM, mid, 700, 301, { meter: 'old' }),
    readOf('export', FROM, mid, 900, 93, { meter: 'old' }),
    readOf('import', mid, TO, 3, 311, { meter: 'new' }),
    readOf('export', mid, TO, 1, 94, { meter: 'new' }),
    readOf('production', FROM, TO, 5000, 640, { meter: 'roof' }),
  ];

  test('a part left out on one register is found', () => {
    const found = causesFor(house(reads), { usage: { ...usage, exportWh: kWh(94) } });
    expect(ids(found)).toEqual(['meterExchange']);
    expect(found[0]?.words).toBe(
      'The meter was exchanged, and one part was left out: meter old, 14 Jan to 29 Jan, 93 kWh of export.',
    );
    expect(found[0]?.found).toEqual({ channels: 'export', meter: 'old' });
  });

  test('a part left out on both is found', () => {
    const found = causesFor(house(reads), { usage: { ...usage, importWh: kWh(301), exportWh: kWh(93) } });
    expect(found[0]?.found).toEqual({ channels: 'import, export', meter: 'new' });
    expect(found[0]?.words).toContain('meter new, 29 Jan to 13 Feb, 311 kWh of import and 94 kWh of export');
  });

  test('a cent off it is no cause; two meters side by side are no exchange', () => {
    expect(causesACentOff(house(reads), { usage: { ...usage, exportWh: kWh(94) } })).toEqual([]);
    const beside = [
      readOf('import', FROM, TO, 700, 301, { meter: 'one' }),
      readOf('import', FROM, TO, 3, 311, { meter: 'two' }),
      readOf('export', FROM, TO, 900, 187),
    ];
    expect(causesFor(house(beside), { usage: { ...usage, importWh: kWh(301) } })).toEqual([]);
  });
});

describe('estimated read', () => {
  const second = usageOf('2026-02-13', '2026-03-16', { importWh: kWh(455), exportWh: kWh(322) });
  const first = { ...usage, productionWh: null };
  const two: BuiltHouse = {
    opening: openingOf({ kwhBank: '25' }),
    cycles: [
      { plan: withoutIncentive(), usage: first, reads: [] },
      { plan: withoutIncentive(), usage: second, reads: [] },
    ],
  };

  function withoutIncentive() {
    return { ...netMetering, credits: [] };
  }

  function statements(estimate: { import: number; export: number }, next: { import: number; export: number }) {
    const made = billed(two, [
      { usage: { ...first, importWh: kWh(estimate.import), exportWh: kWh(estimate.export) } },
      { usage: { ...second, importWh: kWh(next.import), exportWh: kWh(next.export) } },
    ]);
    const readsOf = (of: { import: number; export: number }, type: 'actual' | 'estimated') => [
      { meter: 'net', channel: 'import' as const, type, usageWh: kWh(of.import) },
      { meter: 'net', channel: 'export' as const, type, usageWh: kWh(of.export) },
    ];
    return made.map((one, at) => ({
      ...one,
      reads: at === 0 ? readsOf(estimate, 'estimated') : readsOf(next, 'actual'),
    }));
  }

  test('made up for by the next read, it touches both cycles', () => {
    const found = findCauses(inputOf(two, statements({ import: 560, export: 250 }, { import: 507, export: 259 })));
    expect(ids(found)).toEqual(['estimatedRead']);
    expect(found[0]?.cycles).toEqual([
      { from: FROM, to: TO },
      { from: TO, to: day('2026-03-16') },
    ]);
    expect(found[0]?.words).toBe(
      'The import and export read of 13 Feb was estimated; the read of 16 Mar made up for it.',
    );
  });

  test('one that is not made up for, or not marked as an estimate, is no cause', () => {
    const not = statements({ import: 560, export: 250 }, { import: 500, export: 259 });
    expect(findCauses(inputOf(two, not))).toEqual([]);
    const unmarked = statements({ import: 560, export: 250 }, { import: 507, export: 259 }).map((one) => ({
      ...one,
      reads: one.reads.map((read) => ({ ...read, type: 'actual' as const })),
    }));
    expect(findCauses(inputOf(two, unmarked))).toEqual([]);
  });

  test('an estimate of production the plan makes nothing of is no cause', () => {
    const made = statements({ import: 560, export: 250 }, { import: 507, export: 259 }).map((one, at) => ({
      ...one,
      reads: [
        ...one.reads,
        {
          meter: 'roof',
          channel: 'production' as const,
          type: at === 0 ? ('estimated' as const) : ('actual' as const),
          usageWh: kWh(600),
        },
      ],
    }));
    expect(findCauses(inputOf(two, made))).toEqual([]);
  });

  test('one that still waits for the next read is no cause', () => {
    const waiting = statements({ import: 560, export: 250 }, { import: 507, export: 259 }).slice(0, 1);
    const one = { ...two, cycles: two.cycles.slice(0, 1) };
    expect(ids(findCauses(inputOf(one, waiting)))).not.toContain('estimatedRead');
  });
});
