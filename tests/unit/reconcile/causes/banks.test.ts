import { describe, expect, test } from 'vitest';
import type { RatePlan } from '#shared/settlement/plan.ts';
import type { SettledCycle } from '#shared/settlement/settle.ts';
import type { BankMove, CycleUsage, Opening } from '#shared/settlement/settlement.ts';
import { day } from '#shared/units/day.ts';
import { type BuiltHouse, causesACentOff, causesFor, ids, kWh, openingOf, planOf, usageOf } from './billed-house.ts';
import { byPeriod, netBilling, netMetering } from './built-plans.ts';

const winter = usageOf('2026-01-14', '2026-02-13', { importWh: kWh(612), exportWh: kWh(187), productionWh: kWh(640) });
const spring = usageOf('2026-02-13', '2026-03-16', { importWh: kWh(430), exportWh: kWh(488), productionWh: kWh(800) });
const summer = usageOf('2026-06-16', '2026-07-16', { importWh: kWh(388), exportWh: kWh(702), productionWh: kWh(990) });

function house(plan: RatePlan, usage: CycleUsage, banks: Opening['banks'] = {}): BuiltHouse {
  return { opening: openingOf(banks), cycles: [{ plan, usage, reads: [] }] };
}

/** A settled cycle with the moves of a bank's balances changed by hand. */
function moved(settled: SettledCycle, change: (move: BankMove) => Partial<BankMove>): SettledCycle {
  const banks = settled.settlement.banks.map((bank) => ({ ...bank, move: { ...bank.move, ...change(bank.move) } }));
  const closing = Object.fromEntries(banks.map((bank) => [bank.bank, bank.move.close]));
  return { settlement: { ...settled.settlement, banks }, closing: { ...settled.closing, banks: closing } };
}

describe('bank lost', () => {
  test('a kWh bank opens empty', () => {
    const built = house(netMetering, winter, { kwhBank: '300' });
    const causes = causesFor(built, { opening: openingOf({}) });
    expect(ids(causes)).toEqual(['bankLost']);
    expect(causes[0]?.words).toBe('Energy bank opens with nothing; the statement before closed with 300 kWh.');
    expect(causes[0]?.overbilledCents).toBeGreaterThan(0);
    expect(causes[0]?.bankShort).toEqual([{ bank: 'kwhBank', period: null, unit: 'kWh', short: '0' }]);
    expect(causesACentOff(built, { opening: openingOf({}) })).toEqual([]);
  });

  test('a dollar bank opens empty where a price changes', () => {
    const straddling = usageOf('2026-05-15', '2026-06-16', { importWh: kWh(361), exportWh: kWh(518) });
    const causes = causesFor(house(netBilling, straddling, { bank: '12.34' }), { opening: openingOf({}) });
    expect(causes[0]?.words).toBe(
      'Credit bank opens with nothing; the statement before closed with $12.34. A price changed in this cycle.',
    );
  });

  test('at a change of plan', () => {
    const other = { ...netMetering, name: 'New plan' };
    const built: BuiltHouse = {
      opening: openingOf({ kwhBank: '10' }),
      cycles: [
        { plan: netMetering, usage: { ...spring, exportWh: kWh(700) }, reads: [] },
        {
          plan: other,
          usage: usageOf('2026-05-16', '2026-06-16', { importWh: kWh(500), productionWh: kWh(0) }),
          reads: [],
        },
      ],
    };
    const causes = causesFor(built, null, { opening: openingOf({}) });
    expect(ids(causes)).toEqual(['bankLost']);
    expect(causes[0]?.words).toBe(
      'Energy bank opens with nothing; the statement before closed with 280 kWh. The rate plan changed with this cycle.',
    );
    expect(causes[0]?.cycles).toEqual([{ from: day('2026-05-16'), to: day('2026-06-16') }]);
  });

  test('one period of a bank, and all of them', () => {
    const flows = { peak: { importWh: kWh(151), exportWh: kWh(12) }, off: { importWh: kWh(461), exportWh: kWh(175) } };
    const built = house(byPeriod, { ...winter, byPeriod: flows }, { kwhBank: { peak: '40', off: '60' } });
    const one = causesFor(built, { opening: openingOf({ kwhBank: { peak: '40' } }) });
    expect(one).toMatchObject([
      {
        cause: 'bankLost',
        words: 'Energy bank, off, opens with nothing; the statement before closed with 60 kWh.',
        found: { period: 'off' },
      },
    ]);
    const all = causesFor(built, { opening: openingOf({}) });
    expect(all[0]?.words).toBe('Energy bank opens with nothing; the statement before closed with 100 kWh.');
  });

  test('two banks, both lost', () => {
    const two = {
      ...netMetering,
      banks: ['one', 'two'].flatMap((id) => netMetering.banks.map((bank) => ({ ...bank, id, label: id }))),
    };
    const built = house(two, winter, { one: '30', two: '40' });
    expect(causesFor(built, { opening: openingOf({}) })[0]?.words).toBe(
      'one opens with nothing; the statement before closed with 30 kWh. two opens with nothing; the statement before closed with 40 kWh.',
    );
    expect(causesFor(built, { opening: openingOf({ one: '30' }) })[0]?.found).toEqual({ banks: 'two' });
  });
});

describe('excess not banked', () => {
  test('kWh left over are not added, shown as earned or not', () => {
    const built = house({ ...netMetering, credits: [] }, summer, { kwhBank: '20' });
    for (const shown of [{ earned: '0' }, {}]) {
      const causes = causesFor(built, { after: (settled) => moved(settled, () => ({ ...shown, close: '20' })) });
      expect(causes).toMatchObject([
        {
          cause: 'excessNotBanked',
          words: '314 kWh of this cycle were not added to Energy bank.',
          overbilledCents: 0,
          bankShort: [{ short: '314' }],
        },
      ]);
    }
    expect(causesFor(built, { after: (settled) => moved(settled, () => ({ earned: '0', close: '21' })) })).toEqual([]);
  });

  test('dollars left over are not added', () => {
    const built = house(netBilling, { ...summer, importWh: kWh(100) }, { bank: '5.00' });
    const causes = causesFor(built, {
      after: (settled) => moved(settled, ({ used }) => ({ earned: used, close: '5.00' })),
    });
    expect(causes).toMatchObject([
      { cause: 'excessNotBanked', words: '$53.81 of this cycle were not added to Credit bank.' },
    ]);
  });

  test('dollars that pay only from the next cycle on are not added', () => {
    const later = { ...netBilling, banks: netBilling.banks.map((bank) => ({ ...bank, sameCycle: false })) };
    const built = house(later, summer, { bank: '5.00' });
    const causes = causesFor(built, { after: (settled) => moved(settled, () => ({ earned: '0.00', close: '0.00' })) });
    expect(ids(causes)).toEqual(['excessNotBanked']);
  });

  test('lots: the lot of this cycle is missing, and the next cycle draws on the older ones alone', () => {
    const lots = planOf({
      netting: 'cycle',
      charges: [
        {
          id: 'energy',
          label: 'Energy',
          kind: 'import',
          basis: 'import',
          rates: [{ from: winter.from, rate: '0.12' }],
        },
      ],
      banks: [{ id: 'kwhBank', label: 'Energy bank', unit: 'kWh', offsets: ['energy'], lotLife: { cycles: 12 } }],
    });
    const opening = openingOf({ kwhBank: { lots: [{ earned: winter.from, amount: '50', cyclesLeft: 9 }] } });
    const built: BuiltHouse = {
      opening,
      cycles: [
        { plan: lots, usage: { ...summer, importWh: kWh(300) }, reads: [] },
        {
          plan: lots,
          usage: usageOf('2026-07-16', '2026-08-14', { importWh: kWh(400), exportWh: kWh(220) }),
          reads: [],
        },
      ],
    };
    const left = [{ earned: winter.from, amount: '50', cyclesLeft: 8 }];
    const causes = causesFor(built, {
      after: (settled) => ({
        settlement: moved(settled, () => ({ earned: '0', close: '50' })).settlement,
        closing: { ...settled.closing, banks: { kwhBank: { lots: left } } },
      }),
    });
    expect(ids(causes)).toEqual(['excessNotBanked']);
    expect(causes[0]?.overbilledCents).toBe(1560);
    expect(causes[0]?.bankShort).toEqual([{ bank: 'kwhBank', period: null, unit: 'kWh', short: '272' }]);
  });

  test('at a true-up what would have become of the rest is not known', () => {
    const built = house(netMetering, { ...summer, from: day('2026-03-16'), to: day('2026-04-15') }, { kwhBank: '20' });
    const causes = causesFor(built, { after: (settled) => moved(settled, () => ({ earned: '0', expired: '20' })) });
    expect(causes).toEqual([]);
  });
});

describe('true-up early', () => {
  test('a month before its month', () => {
    const built = house(netMetering, spring, { kwhBank: '77' });
    const early = {
      ...netMetering,
      banks: netMetering.banks.map((bank) => ({ ...bank, trueUps: [{ ...trueUp(bank), at: { months: [3] } }] })),
    };
    const causes = causesFor(built, { plan: early });
    expect(ids(causes)).toEqual(['trueUpEarly']);
    expect(causes[0]).toMatchObject({
      words: 'Energy bank was trued up on 16 Mar 2026, 1 month early.',
      found: { bank: 'kwhBank', early: '1 month early' },
      bankShort: [{ short: '135' }],
    });
    expect(causesACentOff(built, { plan: early })).toEqual([]);
  });

  test('paid out seven months early', () => {
    const early = {
      ...netBilling,
      banks: netBilling.banks.map((bank) => ({ ...bank, trueUps: [{ ...trueUp(bank), at: { months: [2] } }] })),
    };
    const causes = causesFor(house(netBilling, { ...winter, exportWh: kWh(1870) }, { bank: '8.00' }), { plan: early });
    expect(causes).toMatchObject([{ cause: 'trueUpEarly', found: { early: '7 months early' } }]);
    expect(causes[0]?.overbilledCents).toBeLessThan(0);
  });

  test('by a day of the year, and before service ends', () => {
    const dated = withAt(netMetering, { date: '05-31' });
    const causes = causesFor(house(dated, spring, { kwhBank: '77' }), { plan: withAt(netMetering, { date: '02-28' }) });
    expect(causes[0]?.found).toEqual({ bank: 'kwhBank', early: '3 months early' });
    const final = withAt(netMetering, 'finalBill');
    const ended = causesFor(house(final, spring, { kwhBank: '77' }), { plan: withAt(netMetering, 'everyCycle') });
    expect(ended[0]?.words).toBe('Energy bank was trued up on 16 Mar 2026, before service ended.');
  });

  test('one of two true-ups early', () => {
    const [bank] = netMetering.banks;
    if (!bank) throw new Error('no bank');
    const first = { ...trueUp(bank), at: { months: [12] } };
    const two = { ...netMetering, banks: [{ ...bank, trueUps: [first, trueUp(bank)] }] };
    const early = { ...netMetering, banks: [{ ...bank, trueUps: [first, { ...trueUp(bank), at: { months: [3] } }] }] };
    const causes = causesFor(house(two, spring, { kwhBank: '77' }), { plan: early });
    expect(causes).toMatchObject([
      {
        cause: 'trueUpEarly',
        found: { early: '1 month early' },
        alsoWords: ['Energy bank was trued up on 16 Mar 2026, 9 months early.'],
      },
    ]);
  });

  test('a payment on the bill is a line of its own beside the bank’s credit', () => {
    const [bank] = netBilling.banks;
    if (!bank) throw new Error('no bank');
    const onBill = { ...netBilling, banks: [{ ...bank, trueUps: [{ ...trueUp(bank), to: 'bill' as const }] }] };
    const causes = causesFor(house(onBill, { ...winter, exportWh: kWh(1870) }, { bank: '8.00' }), {
      plan: withAt(onBill, { months: [2] }),
    });
    expect(causes).toMatchObject([{ cause: 'trueUpEarly', found: { early: '7 months early' } }]);
  });

  test('a true-up that is due, or due at every close, cannot be early', () => {
    const every = withAt(netMetering, 'everyCycle');
    const causes = causesFor(house(every, spring, { kwhBank: '77' }), { plan: withAt(netMetering, 'finalBill') });
    expect(causes).toEqual([]);
    const april = { ...spring, from: day('2026-03-16'), to: day('2026-04-15') };
    expect(
      causesFor(house(netMetering, april, { kwhBank: '77' }), { plan: withAt(netMetering, { months: [5] }) }),
    ).toEqual([]);
  });

  function trueUp(bank: RatePlan['banks'][number]) {
    const [first] = bank.trueUps;
    if (!first) throw new Error('no true-up');
    return first;
  }

  function withAt(plan: RatePlan, at: ReturnType<typeof trueUp>['at']): RatePlan {
    return { ...plan, banks: plan.banks.map((bank) => ({ ...bank, trueUps: [{ ...trueUp(bank), at }] })) };
  }
});
