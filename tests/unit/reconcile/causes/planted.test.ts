import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { CauseId } from '#shared/reconcile/causes/cause.ts';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { settle } from '#shared/settlement/settle.ts';
import type { CycleUsage, SettledBank } from '#shared/settlement/settlement.ts';
import { addDays, type Day, day } from '#shared/units/day.ts';
import { Exact } from '#shared/units/rate.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { type BuiltHouse, billed, ids, inputOf, kWh, type Mistake, openingOf, readOf } from './billed-house.ts';
import { netBilling, netMetering } from './built-plans.ts';

const RUNS = { numRuns: 50 };

type Drawn = {
  from: Day;
  days: number;
  import: number;
  export: number;
  selfUse: number;
  bank: number;
  split: number;
  register: number;
};

const drawn = fc.record<Drawn>({
  from: fc.integer({ min: 0, max: 330 }).map((offset) => addDays(day('2025-12-01'), offset)),
  days: fc.integer({ min: 27, max: 35 }),
  import: fc.integer({ min: 20, max: 1500 }),
  export: fc.integer({ min: 10, max: 1200 }),
  selfUse: fc.integer({ min: 0, max: 500 }),
  bank: fc.integer({ min: 1, max: 900 }),
  split: fc.integer({ min: 1, max: 99 }),
  register: fc.integer({ min: 0, max: 99_999 }),
});

function usageOfDrawn(one: Drawn): CycleUsage {
  return {
    from: one.from,
    to: addDays(one.from, one.days),
    importWh: kWh(one.import),
    exportWh: kWh(one.export),
    productionWh: kWh(one.export + one.selfUse),
    loadWh: null,
    byPeriod: null,
    netted: {},
    kW: {},
    payments: [],
    finalBill: false,
    intervals: null,
  };
}

function houseOf(plan: RatePlan, one: Drawn): BuiltHouse {
  const usage = usageOfDrawn(one);
  const mid = addDays(usage.from, 10);
  const first = Math.floor((one.export * one.split) / 100);
  const [bank] = plan.banks;
  const amount = bank?.unit === 'USD' ? `${one.bank}.00` : String(one.bank);
  return {
    opening: openingOf(bank ? { [bank.id]: amount } : {}),
    cycles: [
      {
        plan,
        usage,
        reads: [
          readOf('import', usage.from, usage.to, one.register, one.import),
          readOf('export', usage.from, mid, one.register, first, { meter: 'old' }),
          readOf('export', mid, usage.to, 1, one.export - first, { meter: 'new' }),
          readOf('production', usage.from, usage.to, 5000, one.export + one.selfUse, { meter: 'roof' }),
        ],
      },
    ],
  };
}

/** Both plans with each mistake planted by hand, on drawn numbers. */
const PLANTED: [CauseId, RatePlan, (plan: RatePlan, one: Drawn) => Mistake][] = [
  ['registerRollover', netBilling, (_, one) => ({ usage: { ...usageOfDrawn(one), importWh: kWh(rolled(one)) } })],
  ['wrongMultiplier', netBilling, (_, one) => ({ usage: { ...usageOfDrawn(one), importWh: kWh(one.import * 10) } })],
  ['wrongMultiplier', netMetering, (_, one) => ({ usage: { ...usageOfDrawn(one), exportWh: kWh(one.export / 20) } })],
  ['registersSwapped', netBilling, (_, one) => ({ usage: swapped(one) })],
  ['registersSwapped', netMetering, (_, one) => ({ usage: swapped(one) })],
  [
    'meterExchange',
    netMetering,
    (_, one) => ({ usage: { ...usageOfDrawn(one), exportWh: kWh(Math.floor((one.export * one.split) / 100)) } }),
  ],
  ['wrongDays', netBilling, (_, one) => ({ usage: { ...usageOfDrawn(one), from: addDays(one.from, -2) } })],
  ['wrongRate', netBilling, (plan) => ({ plan: withRate(plan, 'exportCredit', '0.0614') })],
  ['wrongRate', netBilling, (plan) => ({ plan: withRate(plan, 'exportCredit', '0.0982') })],
  ['wrongRate', netMetering, (plan) => ({ plan: withRate(plan, 'energy', '0.1735') })],
  ['bankLost', netBilling, () => ({ opening: openingOf({}) })],
  ['bankLost', netMetering, () => ({ opening: openingOf({}) })],
  ['tiersOnGross', netMetering, (plan) => ({ plan: grossOf(plan, 'energy') })],
  ['grossForNet', netMetering, (plan) => ({ plan: grossOf(plan, 'delivery') })],
  [
    'creditOnFixed',
    netBilling,
    (plan) => ({ plan: { ...plan, banks: plan.banks.map((bank) => ({ ...bank, offsets: ['energy', 'customer'] })) } }),
  ],
  [
    'nonbypassableOnLoad',
    netMetering,
    (plan) => ({ plan: { ...withCharge(plan, 'nonbypassable', { basis: 'load' }), load: 'computed' } }),
  ],
  [
    'incentiveOnExport',
    netMetering,
    (plan) => ({
      plan: { ...plan, credits: plan.credits.map((one) => ({ ...one, basis: 'export', netting: 'none' })) },
    }),
  ],
  ['creditedTwice', netBilling, (plan) => ({ plan: withCharge(plan, 'energy', { netting: 'cycle' }) })],
  [
    'trueUpEarly',
    netMetering,
    (plan, one) => ({ plan: truedUpIn(plan, Number(addDays(one.from, one.days).slice(5, 7))) }),
  ],
  ['excessNotBanked', netMetering, (plan) => ({ after: notBanked, plan })],
  [
    'exportShort',
    netBilling,
    (_, one) => ({ usage: { ...usageOfDrawn(one), exportWh: kWh(Math.floor(one.export * 0.83)) } }),
  ],
];

function rolled({ register, import: used }: Drawn): number {
  return ((register + used) % 100_000) - register;
}

function swapped(one: Drawn): CycleUsage {
  const usage = usageOfDrawn(one);
  return { ...usage, importWh: usage.exportWh, exportWh: usage.importWh };
}

function withCharge(plan: RatePlan, id: string, change: Partial<RatePlan['charges'][number]>): RatePlan {
  return { ...plan, charges: plan.charges.map((one) => (one.id === id ? { ...one, ...change } : one)) };
}

function withRate(plan: RatePlan, id: string, rate: string): RatePlan {
  const rates = [{ from: day('2020-01-01'), rate }];
  const credits = plan.credits.map((one) => (one.id === id ? { ...one, rates } : one));
  return { ...withCharge(plan, id, { rates }), credits };
}

function grossOf(plan: RatePlan, id: string): RatePlan {
  const banks = plan.banks.map((bank) => ({ ...bank, offsets: bank.offsets.filter((one) => one !== id) }));
  return { ...withCharge(plan, id, { netting: 'none' }), banks };
}

function truedUpIn(plan: RatePlan, month: number): RatePlan {
  const banks = plan.banks.map((bank) => ({
    ...bank,
    trueUps: bank.trueUps.map((trueUp) => ({ ...trueUp, at: { months: [month] } })),
  }));
  return { ...plan, banks };
}

/** Nothing of the cycle enters the bank; at a true-up the plan itself empties it. */
function notBanked(settled: Parameters<NonNullable<Mistake['after']>>[0]) {
  const without = (bank: SettledBank): SettledBank => {
    if (bank.move.expired !== '0') return bank;
    const close = new Exact(bank.move.close).minus(bank.move.earned).toString();
    return { ...bank, move: { ...bank.move, earned: '0', close } };
  };
  return { ...settled, settlement: { ...settled.settlement, banks: settled.settlement.banks.map(without) } };
}

describe.each(PLANTED)('%s, planted in any house', (cause, plan, mistake) => {
  test('is among what is found, with the cents it cost', () => {
    let seen = 0;
    fc.assert(
      fc.property(drawn, (one) => {
        const house = houseOf(plan, one);
        const [wrong] = billed(house, [mistake(plan, one)]);
        const [right] = billed(house, [null]);
        if (!wrong || !right) throw new Error('no statement');
        const money = ({ lines, banks, payouts, amountDueCents }: typeof wrong) =>
          JSON.stringify([lines, banks, payouts, amountDueCents]);
        const causes = findCauses(inputOf(house, [wrong]));
        if (money(wrong) === money(right)) {
          expect(causes).toEqual([]);
          return;
        }
        seen += 1;
        if (cause !== 'exportShort') expect(ids(causes)).toContain(cause);
        expect(causes).not.toEqual([]);
        for (const found of causes) {
          const paid = (statement: typeof wrong) =>
            (statement.payouts ?? []).reduce((sum, payout) => sum + payout.amountCents, 0);
          const due = (wrong.amountDueCents ?? 0) - (right.amountDueCents ?? 0);
          expect(found.overbilledCents).toBe(due + paid(right) - paid(wrong));
        }
      }),
      RUNS,
    );
    expect(seen).toBeGreaterThan(0);
  }, 30_000);
});

describe('billed rightly', () => {
  test.each([
    ['netBilling', netBilling],
    ['netMetering', netMetering],
  ] as const)('%s has no cause, over one cycle or three', (_, plan) => {
    fc.assert(
      fc.property(fc.array(drawn, { minLength: 1, maxLength: 3 }), (many) => {
        const houses = many.map((one) => houseOf(plan, one));
        const cycles = houses.flatMap((house) => house.cycles);
        const house = { opening: houses[0]?.opening ?? openingOf({}), cycles };
        expect(findCauses(inputOf(house, billed(house, [])))).toEqual([]);
      }),
      RUNS,
    );
  });

  test('an estimated read made up for is found in any two cycles', () => {
    fc.assert(
      fc.property(drawn, drawn, fc.integer({ min: -15, max: 60 }), (a, b, off) => {
        fc.pre(off !== 0);
        const first = usageOfDrawn(a);
        const second = { ...usageOfDrawn(b), from: first.to, to: addDays(first.to, b.days) };
        const house: BuiltHouse = {
          opening: openingOf({ kwhBank: String(a.bank) }),
          cycles: [first, second].map((usage) => ({ plan: netMetering, usage, reads: [] })),
        };
        const late = { ...second, importWh: kWh(b.import - off) };
        const statements = billed(house, [{ usage: { ...first, importWh: kWh(a.import + off) } }, { usage: late }]);
        const right = taken(settle(netMetering, house.opening, [first, second])).settlements;
        const marked = statements.map((statement, at) => ({
          ...statement,
          reads: [
            {
              meter: 'net',
              channel: 'import' as const,
              type: at === 0 ? ('estimated' as const) : ('actual' as const),
              usageWh: at === 0 ? kWh(a.import + off) : kWh(b.import - off),
            },
          ],
        }));
        const causes = findCauses(inputOf(house, marked));
        const dueOf = (sums: readonly (number | null)[]) => sums.reduce<number>((sum, one) => sum + (one ?? 0), 0);
        expect(ids(causes)).toContain('estimatedRead');
        expect(causes.find((found) => found.cause === 'estimatedRead')?.overbilledCents).toBe(
          dueOf(statements.map((one) => one.amountDueCents)) - dueOf(right.map((one) => one.amountDueCents)),
        );
      }),
      RUNS,
    );
  });
});
