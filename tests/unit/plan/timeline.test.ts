import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { pricesTakenBack } from '#server/services/plan/prices-taken-back.ts';
import type { PlanInForce } from '#shared/facts/household.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { type RatePlan, ratePlanSchema } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { entryOfText, planFileName, planText } from '#src/features/plan/plan-file.ts';
import { movedSentence } from '#src/features/plan/remove-plan.tsx';
import { currentPlan, resettledWithout, timelineOf } from '#src/features/plan/timeline.ts';
import { riderSentence, trialSentence } from '#src/features/plan/trial-result.tsx';
import { planOfEntry } from '#src/ui/plan-form/plan-entry.ts';
import { planFormOf } from '#src/ui/plan-form/read-plan.ts';

const printed = ratePlanSchema.parse(JSON.parse(readFileSync('fixtures/plans/evening-peak.json', 'utf8')));

function inForce(from: string, plan: RatePlan = printed): PlanInForce {
  return { from: day(from), plan, withoutRoof: null };
}

/** The printed plan with summer's on-peak price changed from a day. */
function raised(from: string): RatePlan {
  const row = { from: day(from), season: 'summer', period: 'peak', rate: '0.3610' };
  return {
    ...printed,
    charges: printed.charges.map((charge) =>
      charge.id === 'energy' ? { ...charge, rates: [...charge.rates, row] } : charge,
    ),
  };
}

describe('the printed sheet', () => {
  it('is a plan that holds, and one that questions can say', () => {
    const parsed = parsePlan(printed);
    expect(parsed.ok ? [] : parsed.problem.faults).toEqual([]);
    expect(planFormOf(printed)).not.toBeNull();
  });
});

describe('the timeline', () => {
  it('says which price changed, for which season and time of day', () => {
    const rows = timelineOf([inForce('2026-01-01', raised('2026-06-01'))]);
    expect(rows.map(({ from, kind }) => [from, kind])).toEqual([
      ['2026-01-01', 'plan'],
      ['2026-06-01', 'prices'],
    ]);
    expect(rows[1]?.changes).toEqual(['Energy charge, On-peak, summer $0.3480 → $0.3610']);
  });

  it('puts plans in the order of their days, and leaves out prices that the next plan overtakes', () => {
    const rows = timelineOf([inForce('2026-09-01'), inForce('2026-01-01', raised('2026-10-01'))]);
    expect(rows.map(({ from, index }) => [from, index])).toEqual([
      ['2026-01-01', 1],
      ['2026-09-01', 0],
    ]);
  });
});

describe('a plan as a file', () => {
  it('comes back as it went out', () => {
    expect(planFileName(printed, '2026-01-01')).toBe('r-7-residential-time-of-day-2026-01-01.json');
    const entry = entryOfText(planText(inForce('2026-01-01')), '2026-03-01');
    expect(entry).toMatchObject({ from: '2026-03-01', written: 'questions' });
    expect(JSON.parse(entry.json)).toEqual(printed);
  });

  it('carries the plan without a roof where one is stated', () => {
    const both = { ...inForce('2026-01-01'), withoutRoof: { ...printed, name: 'R-1', credits: [], banks: [] } };
    const entry = entryOfText(planText(both), '');
    expect(planOfEntry(entry, printed.timeZone)).toEqual(both);
  });

  it('from an older export, without what the language has learned since, is read with its defaults', () => {
    const old = JSON.parse(planText(inForce('2026-01-01')));
    for (const charge of old.charges)
      for (const field of ['solarOnly', 'learned', 'afterCredits']) if (!charge[field]) delete charge[field];
    delete old.calendar.holidays;
    delete old.rounding;
    const entry = entryOfText(JSON.stringify({ from: '2026-05-01', plan: old }), '');
    expect(entry).toMatchObject({ from: '2026-05-01', withoutRoof: 'same', written: 'questions' });
    expect(planOfEntry(entry, printed.timeZone).plan.charges).toEqual(printed.charges);
  });

  it('may carry the day it holds from, and what is no plan stays to be mended', () => {
    expect(entryOfText(JSON.stringify({ from: '2026-05-01', plan: printed }), '').from).toBe('2026-05-01');
    expect(entryOfText('not a plan', '2026-01-01')).toMatchObject({ written: 'json', json: 'not a plan' });
  });
});

describe('removing a plan', () => {
  const [first, second] = [inForce('2026-01-01'), inForce('2026-06-01', { ...printed, name: 'R-9' })];
  const cycle = (from: string, to: string) => ({ from: day(from), to: day(to) });
  const cycles = [
    cycle('2026-04-10', '2026-05-10'),
    cycle('2026-05-10', '2026-06-10'),
    cycle('2026-06-10', '2026-07-10'),
  ];

  it('says which cycles it settles, and on what they would be settled', () => {
    const [moved, ...more] = resettledWithout([first, second], 1, cycles);
    expect(more).toEqual([]);
    expect(moved).toEqual({ on: first, cycles: [cycles[2]] });
    expect(movedSentence(first, moved?.cycles ?? [])).toMatch(
      /^One cycle \(10 Jun.*2026\) is settled again on R-7 .*2026\.$/,
    );
    expect(resettledWithout([first, second], 0, cycles)).toEqual([{ on: second, cycles: cycles.slice(0, 2) }]);
    expect(resettledWithout([first, second], 1, [])).toEqual([]);
  });

  it('of the only one leaves bills without anything to be held against', () => {
    const [moved] = resettledWithout([first], 0, cycles);
    expect(movedSentence(moved?.on ?? null, moved?.cycles ?? [])).toMatch(/^3 cycles \(.*\) can no longer be settled/);
  });

  it('the plan of today is the last that has begun, and one to come is not', () => {
    expect(currentPlan([first, second], '2026-05-31')).toBe(first);
    expect(currentPlan([first, second], '2026-06-01')).toBe(second);
    expect(currentPlan([second], '2026-05-31')).toBe(second);
    expect(currentPlan([], '2026-05-31')).toBeNull();
  });
});

describe('prices taken back to an earlier cycle', () => {
  it('move the first price of each item and no later one', () => {
    const { plan, moved } = pricesTakenBack(raised('2026-06-01'), day('2025-02-01'));
    expect(moved).toBe(true);
    expect(plan.charges[0]?.rates.map(({ from }) => from)).toEqual([
      '2025-02-01',
      '2025-02-01',
      '2025-02-01',
      '2025-02-01',
      '2026-06-01',
    ]);
  });

  it('leave a plan alone whose prices already hold', () => {
    const held = pricesTakenBack(printed, day('2026-01-01'));
    expect(held).toEqual({ plan: printed, moved: false });
  });
});

describe('the sentence of a trial', () => {
  const figure = (amountCents: number) => ({ amountCents, working: null }) as never;
  const totals = (trial: number, present: number) => ({
    cycles: 12,
    billed: figure(present),
    present: figure(present),
    trial: figure(trial),
    difference: figure(trial - present),
    paidApartCents: 0 as never,
  });

  it('says less, more or the same', () => {
    expect(trialSentence(totals(102_000, 123_400))).toBe(
      'These 12 cycles would have cost $214 less on this plan: $1,020.00 instead of $1,234.00.',
    );
    expect(trialSentence(totals(130_000, 123_400))).toContain('$66 more');
    expect(trialSentence(totals(500, 500))).toContain('the same on this plan: $5.00');
  });

  it('says what is assumed of a rider whose price comes with each bill', () => {
    expect(riderSentence({ label: 'Fuel', asPrinted: 12, cycles: 12 })).toContain('the price your bill printed');
    expect(riderSentence({ label: 'Fuel', asPrinted: 3, cycles: 12 })).toContain('for 3 of 12 cycles');
    expect(riderSentence({ label: 'Fuel', asPrinted: 0, cycles: 12 })).toContain('the price written in the plan');
  });
});
