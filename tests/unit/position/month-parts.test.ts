import { describe, expect, it } from 'vitest';
import { type BillSide, billSide, settleSide } from '#shared/position/bill-side.ts';
import { gather, type Heaps, wholeYear } from '#shared/position/month-heaps.ts';
import { monthlyEnergy } from '#shared/position/monthly-energy.ts';
import { periodsAfter } from '#shared/position/periods.ts';
import { shareBook } from '#shared/position/year-shares.ts';
import { type RatePlan, type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';

const FROM = day('2026-01-01');
const rates = (rate: string) => [{ from: FROM, rate }];

function planOf(changes: Partial<RatePlanInput>): RatePlan {
  return ratePlanSchema.parse({
    timeZone: 'America/Phoenix',
    netting: 'none',
    charges: [{ id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: rates('0.20') }],
    ...changes,
  });
}

const USED = { importWh: 10_000, exportWh: 5_000, productionWh: 8_000, loadWh: 13_000, split: null };
const settled = (side: BillSide) => settleSide(side, EMPTY_OPENING, () => USED);
const sideOf = (plan: RatePlan, apart: boolean) =>
  billSide(
    periodsAfter(FROM, 2).map((period) => ({ period, plan })),
    {},
    apart,
  );

describe('bills settled in full', () => {
  const lots = { id: 'lots', label: 'Bank', unit: 'USD' as const, sameCycle: false, lotLife: { cycles: 12 } };
  const incentive = {
    id: 'incentive',
    label: 'Incentive',
    kind: 'incentive' as const,
    basis: 'production' as const,
    to: 'separate',
    rates: rates('0.05'),
  };

  it('leave an incentive paid apart to its own book, and count it where it has none', () => {
    const plan = planOf({ credits: [incentive], banks: [lots] });
    expect(sideOf(plan, true).compiled).toBeNull();
    expect(settled(sideOf(plan, true))).toMatchObject({ ok: true, value: { dueCents: [200, 200] } });
    expect(settled(sideOf(plan, false))).toMatchObject({ ok: true, value: { dueCents: [160, 160] } });
  });

  it('say why they cannot be settled: a plan by its faults, a month by what it lacks', () => {
    const unknown = planOf({ netting: 'hour', banks: [lots] });
    expect(settled(sideOf(unknown, false))).toMatchObject({ ok: false, why: expect.stringContaining('by the hour') });
    expect(settled(sideOf(planOf({ netting: 'hour' }), false))).toMatchObject({
      ok: false,
      why: expect.stringContaining('clock hour'),
    });
  });
});

describe('the heaps of a record', () => {
  it('take nothing from a span without days', () => {
    const heaps: Heaps = new Map();
    gather(heaps, 0, [], 500);
    expect(wholeYear(heaps)).toEqual({ energy: 0, days: 0 });
  });

  it('know a month’s share sent out without knowing its use', () => {
    const cycle = {
      from: FROM,
      to: day('2026-02-01'),
      provisional: false,
      exportWh: wh(31_000),
      productionWh: wh(62_000),
    };
    const made = monthlyEnergy({
      cycles: [{ ...cycle, importWh: null }],
      lastTo: cycle.to,
      expectedMonthlyWh: null,
      usageBefore: [{ from: FROM, to: cycle.to, importWh: wh(31_000) }],
      degradation: '0',
    });
    expect(made?.exportShare[0]?.toString()).toBe('0.5');
    expect(made?.useBasis[0]).toBe('before');
  });
});

describe('what cancels inside an hour', () => {
  const plan = planOf({ netting: 'hour' });
  const cycleOf = (from: string, to: string, importWh: number, exportWh: number, hour: number) => ({
    from: day(from),
    to: day(to),
    importWh: wh(importWh),
    exportWh: wh(exportWh),
    productionWh: wh(exportWh),
    provisional: false,
    split: { importWh: [importWh], exportWh: [exportWh], selfWh: [0], cancels: { hour: [hour], '15min': null } },
  });
  const book = (cycles: ReturnType<typeof cycleOf>[]) =>
    shareBook({ cycles, hourly: null, facts: { plans: [{ from: FROM, plan, withoutRoof: null }] } });
  const hourOf = (of: ReturnType<typeof book>, month: string, drawn?: ReturnType<typeof cycleOf>) =>
    of.at(plan.calendar, day(`2027-${month}-01`), day(`2027-${month}-28`), drawn)?.shares.cancels.hour;
  const january = cycleOf('2026-01-01', '2026-02-01', 100, 80, 20);
  const february = cycleOf('2026-02-01', '2026-03-01', 100, 20, 20);
  const dark = cycleOf('2026-03-01', '2026-04-01', 100, 0, 0);

  it('is the same month’s share of the lesser of the two, else the record’s, or the cycle’s own where one is drawn', () => {
    const record = book([january, february, dark]);
    expect(hourOf(record, '01')).toEqual([250_000]);
    expect(hourOf(record, '02')).toEqual([1_000_000]);
    expect(hourOf(record, '03')).toEqual([0]);
    expect(hourOf(record, '07')).toEqual([400_000]);
    expect(hourOf(record, '07', january)).toEqual([250_000]);
  });

  it('is none that is known without readings', () => {
    const shared = book([]).at(plan.calendar, FROM, day('2026-02-01'));
    expect(shared).toMatchObject({ source: 'stated', cancelsKnown: { hour: false, '15min': false } });
    expect(shared?.shares.cancels.hour).toEqual([0]);
  });
});
