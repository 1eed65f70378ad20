import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { type SettledAmounts, settleAmounts } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening } from '#shared/settlement/settlement.ts';
import { cents } from '#shared/units/cents.ts';
import { wh } from '#shared/units/energy.ts';
import { Exact, exact } from '#shared/units/rate.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { plans, usages } from '#tests/unit/settlement/arbitrary-plan.ts';
import { ENERGY, plan, usage } from '#tests/unit/settlement/plans.ts';

// Source of these rules: the rate plan's own page, “Order in a cycle” and “Opening, inputs, result” (close = open + earned − used − expired − paid;
// amount due = sum of the lines in due). Those on netting follow from its definition: import − export of a block, its positive part is import.

const runs = { numRuns: PROPERTY_RUNS };
const opening: Opening = { ...EMPTY_OPENING, balanceCents: cents(0) };

function settledInTurn(of: RatePlan, cycles: readonly CycleUsage[]): SettledAmounts[] {
  let held = opening;
  return cycles.map((cycle) => {
    const made = taken(settleAmounts(of, held, cycle));
    held = made.closing;
    return made;
  });
}

/** A bank as its own moves say: nothing comes from nowhere, nothing is lost, and it opens with what it closed with. */
function banksConserve(settled: readonly SettledAmounts[]): void {
  const held = new Map<string, string>();
  for (const { settlement } of settled) {
    for (const { bank, period, move } of settlement.banks) {
      const name = `${bank} ${period}`;
      const came = exact(move.open).plus(exact(move.earned));
      const went = exact(move.used).plus(exact(move.expired)).plus(exact(move.paid));
      const opens = exact(move.open).eq(exact(held.get(name) ?? '0'));
      if (!opens || !came.eq(went.plus(exact(move.close)))) throw new Error(`${name}: ${JSON.stringify(move)}`);
      held.set(name, move.close);
    }
  }
}

/** A USD bank as the lines of the bills say, apart from its own moves: credits in; its line and its true-ups out. */
function dollarsConserve(of: RatePlan, settled: readonly SettledAmounts[]): void {
  const bank = of.banks.find(({ unit, belowZero }) => unit === 'USD' && !belowZero);
  if (!bank) return;
  let owed = new Exact(0);
  for (const { settlement } of settled) {
    const move = settlement.banks.find((one) => one.bank === bank.id)?.move;
    if (!move) throw new Error('the bank is not in the settlement');
    const sum = (which: (line: Line) => boolean) =>
      new Exact(settlement.lines.filter(which).reduce((total, line) => total + line.amountCents, 0)).div(100);
    const used = sum((line) => line.component === bank.id && line.kind === 'credit').neg();
    const paid = sum((line) => line.kind === 'trueup' && !line.label.endsWith('fee')).neg();
    owed = owed
      .minus(sum((line) => line.component === 'sent'))
      .minus(used)
      .minus(paid)
      .minus(exact(move.expired));
    if (!used.eq(exact(move.used)) || !paid.eq(exact(move.paid)) || !owed.eq(exact(move.close)))
      throw new Error(`${owed} is owed by the lines, the bank says ${JSON.stringify(move)}`);
  }
}

type Line = SettledAmounts['settlement']['lines'][number];

/** The rounded lines in due come to the amount due, and it is the next cycle's previous balance. */
function centsConserve(settled: readonly SettledAmounts[]): void {
  let due = 0;
  for (const { settlement, closing } of settled) {
    let sum = 0;
    for (const line of settlement.lines) if (line.inDue) sum += line.amountCents;
    const brought = settlement.lines.find((line) => line.kind === 'previousBalance')?.amountCents;
    if (brought !== due) throw new Error(`${brought} is brought in, ${due} was due`);
    due = settlement.amountDueCents;
    if (sum !== due || closing.balanceCents !== due) throw new Error(`the lines in due come to ${sum}, due is ${due}`);
  }
}

describe('whatever the plan and the cycles', () => {
  test('kWh and dollars are conserved in every bank and between bank and bill, and the rounded lines in due are the amount due', () => {
    fc.assert(
      fc.property(plans, usages, (of, cycles) => {
        const settled = settledInTurn(of, cycles);
        expect(settled).toHaveLength(cycles.length);
        banksConserve(settled);
        dollarsConserve(of, settled);
        centsConserve(settled);
      }),
      runs,
    );
  }, 120_000);

  test('settling is pure: the same twice, from last to first as from first to last, however the rows of a price are ordered', () => {
    fc.assert(
      fc.property(plans, usages, fc.array(fc.nat(1000), { minLength: 7, maxLength: 7 }), (of, cycles, order) => {
        const before = JSON.stringify([of, cycles]);
        const alone = (plan: RatePlan) => (cycle: CycleUsage) =>
          JSON.stringify(taken(settleAmounts(plan, opening, cycle)));
        const first = cycles.map(alone(of));
        const mixed = {
          ...of,
          charges: of.charges.map((item) => ({ ...item, rates: shuffle(item.rates, order) })),
          credits: of.credits.map((item) => ({ ...item, rates: item.rates && shuffle(item.rates, order) })),
        };
        expect(cycles.map(alone(mixed))).toEqual(first);
        expect(cycles.toReversed().map(alone(of)).toReversed()).toEqual(first);
        expect(JSON.stringify([of, cycles])).toBe(before);
      }),
      runs,
    );
  }, 120_000);
});

function shuffle<T>(items: readonly T[], order: readonly number[]): T[] {
  const keyed = items.map((item, at) => ({ item, key: order[at % order.length] ?? 0 }));
  return keyed.sort((a, b) => a.key - b.key).map(({ item }) => item);
}

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
  });

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
  });
});
