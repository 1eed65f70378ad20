import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { settle, settleAmounts } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { wh } from '#shared/units/energy.ts';
import { Exact, exact } from '#shared/units/rate.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { usages } from '#tests/unit/settlement/arbitrary-usage.ts';
import { ENERGY, plan, usage } from '#tests/unit/settlement/plans.ts';

// Source of these rules: the definition of netting (import − export of a block; its positive part is import, its negative part export), and
// arithmetic: a flat price × the net, each line rounded once.

const runs = { numRuns: PROPERTY_RUNS };

describe('netting', () => {
  const SENT = { ...ENERGY, id: 'sent', basis: 'export' };
  const rates = [{ from: '2025-01-01', rate: '1' }];
  const NETTINGS = ['none', '15min', 'hour', 'period', 'cycle'] as const;
  const byNetting = NETTINGS.map((netting) =>
    plan({
      netting,
      calendar: {
        periods: [
          { id: 'peak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
          { id: 'off', when: 'rest' },
        ],
      },
      charges: [
        { ...ENERGY, rates },
        { ...SENT, rates },
      ],
    }),
  );
  const quarters = fc.array(fc.nat(2_000_000), { minLength: 96, maxLength: 96 });

  test('over a shorter span never bills less import nor credits less export, and import − export is always the registers’', () => {
    fc.assert(
      fc.property(quarters, (drawn) => {
        // One number holds a quarter-hour's import and export, so that a day is drawn fast.
        const importWh = drawn.map((value) => value % 1400);
        const exportWh = drawn.map((value) => Math.floor(value / 1400));
        const total = (values: number[]) => wh(values.reduce((sum, value) => sum + value, 0));
        const intervals = { startUtc: '2026-07-01T06:00:00Z', minutes: 15, importWh, exportWh, productionWh: [] };
        const cycle: CycleUsage = {
          ...usage({ from: '2026-07-01', to: '2026-07-02' }),
          importWh: total(importWh),
          exportWh: total(exportWh),
          intervals,
        };
        let finer = { bought: Number.POSITIVE_INFINITY, sent: Number.POSITIVE_INFINITY };
        for (const of of byNetting) {
          const [bought, sent] = taken(settleAmounts(of, EMPTY_OPENING, cycle)).settlement.lines.map((line) =>
            exact(line.quantity ?? '')
              .times(1000)
              .toNumber(),
          );
          if (bought === undefined || sent === undefined) throw new Error('a line is missing');
          expect(bought - sent).toBe(cycle.importWh - cycle.exportWh);
          expect(bought).toBeLessThanOrEqual(finer.bought);
          expect(sent).toBeLessThanOrEqual(finer.sent);
          finer = { bought, sent };
        }
      }),
      runs,
    );
  }, 120_000);
});

describe('a flat plan', () => {
  const kWh = fc.integer({ min: 0, max: 3_000_000 });
  const price = fc.integer({ min: 1, max: 99_999 }).map((value) => `0.${String(value).padStart(5, '0')}`);
  const flat = (rate: string, part: object = {}) =>
    plan({ charges: [{ ...ENERGY, rates: [{ from: '2025-01-01', rate }] }], ...part });

  test('with export at retail and nothing else bills the net: to the cent each of its two lines is rounded to', () => {
    const credits = [
      { id: 'sent', label: 'Sent', kind: 'export', basis: 'export', ratesOf: { charges: ['energy'] }, to: 'bill' },
    ];
    fc.assert(
      fc.property(price, kWh, kWh, (rate, bought, sent) => {
        const cycle = { ...usage(), importWh: wh(bought), exportWh: wh(sent) };
        const { amountDueCents } = taken(settleAmounts(flat(rate, { credits }), EMPTY_OPENING, cycle)).settlement;
        // By hand, apart from the settlement's own arithmetic.
        const net = new Exact(bought - sent).div(1000).times(exact(rate)).times(100);
        expect(net.minus(amountDueCents).abs().lte(1)).toBe(true);
      }),
      runs,
    );
  }, 60_000);

  test('netted over the cycle bills the net to half a cent, and nothing for a house that sends out more', () => {
    fc.assert(
      fc.property(price, kWh, kWh, (rate, bought, sent) => {
        const cycle = { ...usage(), importWh: wh(bought), exportWh: wh(sent) };
        const of = flat(rate, { netting: 'cycle' });
        const { amountDueCents } = taken(settleAmounts(of, EMPTY_OPENING, cycle)).settlement;
        const net = new Exact(Math.max(bought - sent, 0)).div(1000).times(exact(rate)).times(100);
        expect(net.minus(amountDueCents).abs().lte('0.5')).toBe(true);
      }),
      runs,
    );
  }, 60_000);

  test('split by a row with the same price costs the same, to a cent for each part', () => {
    const days = ['2025-01-01', '2026-06-20', '2026-07-03'];
    fc.assert(
      fc.property(price, kWh, (rate, bought) => {
        const cycle = { ...usage(), importWh: wh(bought) };
        const split = flat(rate, { charges: [{ ...ENERGY, rates: days.map((from) => ({ from, rate })) }] });
        const parts = taken(settleAmounts(split, EMPTY_OPENING, cycle)).settlement;
        const whole = taken(settleAmounts(flat(rate), EMPTY_OPENING, cycle)).settlement;
        expect(parts.lines).toHaveLength(3);
        expect(Math.abs(parts.amountDueCents - whole.amountDueCents)).toBeLessThanOrEqual(2);
      }),
      runs,
    );
  }, 60_000);

  test('with a kWh bank that is never cut bills over the cycles what the running net asks for', () => {
    const bank = { id: 'kWhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] };
    const banked = flat('0.1684', { netting: 'cycle', banks: [bank] });
    fc.assert(
      fc.property(usages, (cycles) => {
        let balance = 0;
        const billed = cycles.map(({ importWh, exportWh }) => {
          balance += exportWh - importWh;
          const owed = Math.max(-balance, 0);
          balance = Math.max(balance, 0);
          return owed;
        });
        const { settlements } = taken(settle(banked, EMPTY_OPENING, cycles));
        expect(settlements.map((one) => Number(exact(one.lines[0]?.quantity ?? '').times(1000)))).toEqual(billed);
      }),
      runs,
    );
  }, 60_000);
});
