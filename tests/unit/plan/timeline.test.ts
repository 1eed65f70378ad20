import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { pricesTakenBack } from '#server/services/plan/prices-taken-back.ts';
import type { PlanInForce } from '#shared/facts/household.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { type RatePlan, ratePlanSchema } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { entryOfText, planFileName, planText } from '#src/features/plan/plan-file.ts';
import { timelineOf } from '#src/features/plan/timeline.ts';
import { trialSentence } from '#src/features/plan/trial-result.tsx';
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
    const entry = entryOfText(planText(printed), '2026-03-01');
    expect(entry).toMatchObject({ from: '2026-03-01', written: 'questions' });
    expect(JSON.parse(entry.json)).toEqual(printed);
  });

  it('may carry the day it holds from, and what is no plan stays to be mended', () => {
    expect(entryOfText(JSON.stringify({ from: '2026-05-01', plan: printed }), '').from).toBe('2026-05-01');
    expect(entryOfText('not a plan', '2026-01-01')).toMatchObject({ written: 'json', json: 'not a plan' });
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
});
