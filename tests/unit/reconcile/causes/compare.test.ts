import { describe, expect, test } from 'vitest';
import type { BilledCycle, Cause } from '#shared/reconcile/causes/cause.ts';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { cents } from '#shared/units/cents.ts';
import { type BuiltHouse, billed, causesFor, ids, inputOf, kWh, openingOf, planOf, usageOf } from './billed-house.ts';
import { byPeriod, hourly, netBilling, netMetering } from './built-plans.ts';

const winter = usageOf('2026-01-14', '2026-02-13', { importWh: kWh(612), exportWh: kWh(187), productionWh: kWh(640) });
const house: BuiltHouse = {
  opening: openingOf({ bank: '3.00' }),
  cycles: [{ plan: netBilling, usage: winter, reads: [] }],
};

/** Export credited 44 kWh short, its statement changed. */
function short(change: (statement: BilledCycle) => BilledCycle, built = house): Cause[] {
  const usage = { ...winter, exportWh: kWh(143) };
  return findCauses(inputOf(built, billed(built, [{ usage }]).map(change)));
}

describe('what is compared', () => {
  test('a bill that is right has no cause', () => {
    expect(causesFor(house)).toEqual([]);
  });

  test('days or kWh misprinted on a bill that is right in money are no cause', () => {
    const [right] = billed(house, []);
    if (!right) throw new Error('no statement');
    expect(findCauses(inputOf(house, [{ ...right, days: 29, importWh: kWh(600), productionWh: kWh(1) }]))).toEqual([]);
  });

  test('lines of one charge may be printed in any order', () => {
    const flows = { peak: { importWh: kWh(151), exportWh: kWh(0) }, off: { importWh: kWh(461), exportWh: kWh(0) } };
    const built = {
      opening: openingOf({}),
      cycles: [{ plan: byPeriod, usage: { ...winter, byPeriod: flows }, reads: [] }],
    };
    const charges = byPeriod.charges.map((charge) =>
      charge.id === 'energy' ? { ...charge, rates: charge.rates.map((row) => ({ ...row, rate: '0.2417' })) } : charge,
    );
    const statements = billed(built, [{ plan: { ...byPeriod, charges } }]);
    const turned = statements.map((one) => ({ ...one, lines: (one.lines ?? []).toReversed() }));
    expect(ids(findCauses(inputOf(built, statements)))).toEqual(['wrongRate']);
    expect(ids(findCauses(inputOf(built, turned)))).toEqual(['wrongRate']);
  });

  test('a statement that says nothing has no cause; nor has a cycle that cannot be settled', () => {
    const [right] = billed(house, []);
    if (!right) throw new Error('no statement');
    const silent = { ...right, lines: null, banks: [], payouts: null, amountDueCents: null };
    expect(findCauses(inputOf(house, [silent]))).toEqual([]);
    const unsettled = { ...house, cycles: [{ plan: hourly, usage: winter, reads: [] }] };
    expect(findCauses(inputOf(unsettled, [right]))).toEqual([]);
  });

  test('an export other than the meter’s is named with its kWh, less or more', () => {
    const [found, ...more] = short((one) => one);
    expect(more).toEqual([]);
    expect(found).toMatchObject({
      cause: 'exportShort',
      words: 'It credits 44 kWh less than your meter saw leave.',
      found: { billedKwh: '143', meteredKwh: '187' },
    });
    const over = causesFor(house, { usage: { ...winter, exportWh: kWh(200) } });
    expect(over[0]?.words).toBe('It credits 13 kWh more than your meter saw leave.');
  });

  test('the kWh printed beside the register may be right though the credit is short', () => {
    expect(ids(short((one) => ({ ...one, exportWh: winter.exportWh })))).toEqual(['exportShort']);
    expect(ids(short((one) => ({ ...one, exportWh: null })))).toEqual(['exportShort']);
  });

  test('a short export under netting by the hour', () => {
    const flow = { importWh: kWh(480), exportWh: kWh(55), byPeriod: null };
    const usage = { ...winter, netted: { hour: flow } };
    const built = { opening: openingOf({}), cycles: [{ plan: hourly, usage, reads: [] }] };
    const found = causesFor(built, { usage: { ...usage, netted: { hour: { ...flow, exportWh: kWh(48) } } } });
    expect(found).toMatchObject([{ cause: 'exportShort', found: { billedKwh: '48', meteredKwh: '55' } }]);
  });

  test('a short export told by the bank and the kWh beside the register alone', () => {
    expect(ids(short((one) => ({ ...one, lines: null })))).toEqual(['exportShort']);
    expect(short((one) => ({ ...one, lines: null, exportWh: null }))).toEqual([]);
  });

  test('a bank that earns less than the meter saw leave', () => {
    const built: BuiltHouse = {
      opening: openingOf({ kwhBank: '10' }),
      cycles: [{ plan: { ...netMetering, credits: [] }, usage: { ...winter, importWh: kWh(100) }, reads: [] }],
    };
    const found = causesFor(built, { usage: { ...winter, importWh: kWh(100), exportWh: kWh(151) } });
    expect(found).toMatchObject([{ cause: 'exportShort', bankShort: [{ bank: 'kwhBank', short: '36' }] }]);
    const unsaid = billed(built, [{ usage: { ...winter, importWh: kWh(100), exportWh: kWh(151) } }]);
    expect(
      findCauses(
        inputOf(
          built,
          unsaid.map((one) => ({ ...one, lines: null, exportWh: null })),
        ),
      ),
    ).toEqual([]);
  });

  test('a credit into a bank may be left off the statement', () => {
    const withoutCredit = (statement: BilledCycle) => ({
      ...statement,
      lines: (statement.lines ?? []).filter((line) => line.component !== 'exportCredit'),
    });
    expect(ids(short(withoutCredit))).toEqual(['exportShort']);
    expect(findCauses(inputOf(house, billed(house, []).map(withoutCredit)))).toEqual([]);
  });

  test('a line in the amount due may not, unless it is zero', () => {
    const without = (id: string) => (statement: BilledCycle) => ({
      ...statement,
      lines: (statement.lines ?? []).filter((line) => line.component !== id),
    });
    expect(short(without('customer'))).toEqual([]);
    const idle = { ...house, cycles: [{ plan: netBilling, usage: { ...winter, importWh: kWh(0) }, reads: [] }] };
    const usage = { ...winter, importWh: kWh(0), exportWh: kWh(143) };
    const statements = billed(idle, [{ usage }]).map(without('energy'));
    expect(ids(findCauses(inputOf(idle, statements)))).toEqual(['exportShort']);
  });

  test('a line the plan does not have must be zero', () => {
    const stray = (amount: number) => (statement: BilledCycle) => ({
      ...statement,
      lines: [
        ...(statement.lines ?? []),
        { component: 'fuel', kind: 'import', quantity: null, unit: null, amountCents: cents(amount) },
      ],
    });
    expect(short(stray(5))).toEqual([]);
    expect(ids(short(stray(0)))).toEqual(['exportShort']);
  });

  test('a bank is compared as far as it is printed, dollars to the cent, kWh to the last digit', () => {
    const closing = (close: string | null) => (statement: BilledCycle) => ({
      ...statement,
      banks: statement.banks.map((bank) => ({ ...bank, open: null, earned: null, used: null, close })),
    });
    expect(ids(short(closing('0.00')))).toEqual(['exportShort']);
    expect(ids(short(closing('0')))).toEqual(['exportShort']);
    expect(ids(short(closing(null)))).toEqual(['exportShort']);
    expect(short(closing('0.01'))).toEqual([]);
    expect(short((one) => ({ ...one, banks: one.banks.map((bank) => ({ ...bank, bank: 'other' })) }))).toEqual([]);
    const bank = planOf({
      netting: 'cycle',
      charges: [
        { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: [{ from: winter.from, rate: '0.1' }] },
      ],
      banks: [{ id: 'kwhBank', label: 'Energy bank', unit: 'kWh', ratio: '0.33', offsets: ['energy'] }],
    });
    const usage = { ...winter, importWh: kWh(87) };
    const built = { opening: openingOf({ kwhBank: '5' }), cycles: [{ plan: bank, usage, reads: [] }] };
    const lost = billed(built, [{ opening: openingOf({}) }]);
    const rounded = (close: string) =>
      findCauses(
        inputOf(
          built,
          lost.map((one) => ({ ...one, banks: one.banks.map((b) => ({ ...b, open: '0', earned: null, close })) })),
        ),
      );
    expect(ids(rounded('33'))).toEqual(['bankLost']);
    expect(rounded('32')).toEqual([]);
  });

  test('kWh printed with either sign, in whole kWh, or not at all', () => {
    const quantity = (text: string | null) => (statement: BilledCycle) => ({
      ...statement,
      lines: (statement.lines ?? []).map((line) =>
        line.component === 'exportCredit' ? { ...line, quantity: text } : line,
      ),
    });
    expect(ids(short(quantity('-143')))).toEqual(['exportShort']);
    expect(ids(short(quantity('143.0')))).toEqual(['exportShort']);
    expect(ids(short(quantity(null)))).toEqual(['exportShort']);
    expect(short((one) => ({ ...quantity('150')(one), exportWh: null }))).toEqual([]);
  });

  test('one printed line may stand for the parts of a changed price, not for other cents', () => {
    const straddling = usageOf('2026-05-15', '2026-06-16', { importWh: kWh(361), exportWh: kWh(518) });
    const built = { ...house, cycles: [{ plan: netBilling, usage: straddling, reads: [] }] };
    const lost = billed(built, [{ opening: openingOf({}) }]);
    const joined = (more: number) => (statement: BilledCycle) => {
      const energy = (statement.lines ?? []).filter((line) => line.component === 'energy');
      const sum = energy.reduce((total, line) => total + line.amountCents, more);
      return {
        ...statement,
        lines: [
          { component: 'energy', kind: 'import', quantity: '361', unit: 'kWh', amountCents: cents(sum) },
          ...(statement.lines ?? []).filter((line) => line.component !== 'energy'),
        ],
      };
    };
    expect(ids(findCauses(inputOf(built, lost.map(joined(0)))))).toEqual(['bankLost']);
    expect(findCauses(inputOf(built, lost.map(joined(1))))).toEqual([]);
    const shifted = lost.map((statement) => {
      let shift = 1;
      const lines = (statement.lines ?? []).map((line) => {
        if (line.component !== 'energy') return line;
        const amountCents = cents(line.amountCents + shift);
        shift = -shift;
        return { ...line, amountCents };
      });
      return { ...statement, lines };
    });
    expect(findCauses(inputOf(built, shifted))).toEqual([]);
  });

  test('the account’s balance and payments are no part of it', () => {
    const account = { ...house, opening: { ...house.opening, balanceCents: cents(5000) } };
    const paid = { ...winter, payments: [{ on: winter.to, amountCents: cents(5000) }] };
    const built = { ...account, cycles: [{ plan: netBilling, usage: paid, reads: [] }] };
    const found = causesFor(built, { usage: { ...paid, exportWh: kWh(143) } });
    expect(found).toMatchObject([{ cause: 'exportShort', overbilledCents: 287 }]);
  });

  test('payouts: one that is missing, one too many, and none that is known', () => {
    const usage = {
      ...winter,
      from: usageOf('2026-08-14', '2026-09-14').from,
      to: usageOf('2026-08-14', '2026-09-14').to,
    };
    const built = { opening: openingOf({ bank: '90.00' }), cycles: [{ plan: netBilling, usage, reads: [] }] };
    const lost = billed(built, [{ opening: openingOf({}) }]);
    expect(lost[0]?.payouts).toEqual([]);
    expect(ids(findCauses(inputOf(built, lost)))).toEqual(['bankLost']);
    const paidStill = lost.map((one) => ({ ...one, payouts: [{ component: 'bank', amountCents: cents(100) }] }));
    expect(findCauses(inputOf(built, paidStill))).toEqual([]);
    const unknown = lost.map((one) => ({ ...one, payouts: null }));
    expect(ids(findCauses(inputOf(built, unknown)))).toEqual(['bankLost']);
    const right = billed(built, []).map((one) => ({ ...one, payouts: [] }));
    expect(findCauses(inputOf(built, right))).toEqual([]);
  });
});

describe('several cycles', () => {
  const spring = usageOf('2026-02-13', '2026-03-16', { importWh: kWh(430), exportWh: kWh(288) });
  const two: BuiltHouse = {
    opening: openingOf({ bank: '3.00' }),
    cycles: [
      { plan: netBilling, usage: winter, reads: [] },
      { plan: netBilling, usage: spring, reads: [] },
    ],
  };
  const netted: RatePlan = {
    ...netBilling,
    banks: netBilling.banks.map((bank) => ({ ...bank, offsets: ['energy', 'customer'] })),
  };

  test('a mistake in the second alone, in the first alone, in both', () => {
    const half = (rate: string) => ({
      ...netBilling,
      credits: netBilling.credits.map((credit) => ({ ...credit, rates: [{ from: winter.from, rate }] })),
    });
    const plan = half('0.0307');
    expect(causesFor(two, null, { plan })).toMatchObject([{ cause: 'wrongRate', cycles: [{ from: spring.from }] }]);
    expect(causesFor(two, { plan }, null)).toMatchObject([{ cause: 'wrongRate', cycles: [{ from: winter.from }] }]);
    const both = causesFor(two, { plan }, { plan });
    expect(both).toMatchObject([{ cause: 'wrongRate', cycles: [{ from: winter.from }, { from: spring.from }] }]);
    // 187 and 288 kWh at half the price: $11.48 for $5.74 and $17.68 for $8.84, and the tax on what was left unpaid.
    expect(both[0]?.overbilledCents).toBe(574 + 36 + 884 + 55);
  });

  test('what the first leaves behind is carried into the second', () => {
    const big = { ...two, opening: openingOf({ bank: '200.00' }) };
    const found = causesFor(big, { plan: netted }, null);
    expect(ids(found)).toEqual(['creditOnFixed']);
    expect(found[0]?.bankShort).toEqual([{ bank: 'bank', period: null, unit: 'USD', short: '12.30' }]);
  });
});

describe('interval data', () => {
  const days = 29;
  const steps = (day: number[]) => Array.from({ length: days }, () => day).flat();
  const importDay = [1, 1, 1, 1, 1, 1, 1, 1, 0, 0, 0, 0, 0, 0, 0, 0, 2, 2, 2, 2, 2, 1, 1, 1].map((one) => one * 500);
  const exportDay = [0, 0, 0, 0, 0, 0, 0, 0, 1, 2, 2, 2, 2, 2, 1, 1, 1, 0, 0, 0, 0, 0, 0, 0].map((one) => one * 300);
  const intervals = {
    startUtc: '2026-01-15T07:00:00.000Z',
    minutes: 60,
    importWh: steps(importDay),
    exportWh: steps(exportDay),
    productionWh: steps(exportDay.map((one) => one * 2)),
  };
  const sum = (values: number[]) => values.reduce((total, one) => total + one, 0);
  const usage = usageOf('2026-01-15', '2026-02-13', {
    importWh: kWh(sum(intervals.importWh) / 1000),
    exportWh: kWh(sum(intervals.exportWh) / 1000),
    productionWh: kWh(sum(intervals.productionWh) / 1000),
    intervals,
  });
  const built = (plan: RatePlan): BuiltHouse => ({
    opening: openingOf({}),
    cycles: [{ plan, usage, reads: [] }],
  });

  test('netting by the hour: half the credit', () => {
    const plan = {
      ...hourly,
      credits: hourly.credits.map((one) => ({ ...one, ratesOf: { charges: ['energy'], fraction: '0.375', tier: 1 } })),
    };
    expect(ids(causesFor(built(hourly), { plan }))).toEqual(['wrongRate']);
  });

  test('periods: a lost bank, and days counted wrong', () => {
    const daily = {
      ...byPeriod,
      charges: byPeriod.charges.map((one) => (one.id === 'customer' ? { ...one, basis: 'day' as const } : one)),
    };
    const off = { ...usage, intervals: null, to: usageOf('2026-01-15', '2026-02-15').to };
    const byHand = {
      // 21 working days from 16:00 to 21:00.
      peak: { importWh: kWh(21 * 5), exportWh: kWh(21 * 0.3) },
      off: {
        importWh: kWh(sum(intervals.importWh) / 1000 - 21 * 5),
        exportWh: kWh(sum(intervals.exportWh) / 1000 - 21 * 0.3),
      },
    };
    const found = causesFor(built(daily), { usage: { ...off, byPeriod: byHand } });
    expect(found).toMatchObject([{ cause: 'wrongDays', found: { days: '31', trueDays: '29' } }]);
  });

  test('prices told step by step keep their steps', () => {
    const stepped = planOf({
      netting: 'none',
      rateChangeBy: 'intervals',
      charges: [
        {
          id: 'energy',
          label: 'Energy',
          kind: 'import',
          basis: 'import',
          rates: [
            { from: '2025-01-01', rate: '0.10' },
            { from: '2026-02-01', rate: '0.20' },
          ],
        },
        {
          id: 'onLoad',
          label: 'Public benefits',
          kind: 'nonbypassable',
          basis: 'load',
          rates: [{ from: '2025-01-01', rate: '0.01' }],
        },
      ],
      load: 'computed',
    });
    const uneven = { ...intervals, importWh: intervals.importWh.map((one, at) => (at < 200 ? one * 2 : one)) };
    const house = {
      opening: openingOf({}),
      cycles: [
        {
          plan: stepped,
          usage: { ...usage, importWh: kWh(sum(uneven.importWh) / 1000), intervals: uneven },
          reads: [],
        },
      ],
    };
    const plan = {
      ...stepped,
      charges: stepped.charges.map((one) =>
        one.id === 'energy' ? { ...one, rates: [{ from: usage.from, rate: '0.10' }] } : one,
      ),
    };
    expect(causesFor(house, { plan })[0]?.words).toBe('Energy was priced at the rate before 1 Feb 2026.');
    const credited = {
      ...plan,
      netting: 'hour' as const,
      charges: stepped.charges,
      credits: [
        { ...hourly.credits.reduce((credit) => credit), rates: [{ from: usage.from, rate: '0.07' }], ratesOf: null },
      ],
    };
    const netted = { opening: openingOf({}), cycles: house.cycles.map((one) => ({ ...one, plan: credited })) };
    const half = {
      ...credited,
      credits: credited.credits.map((one) => ({ ...one, rates: [{ from: usage.from, rate: '0.05' }] })),
    };
    expect(causesFor(netted, { plan: half })).toEqual([]);
  });
});
