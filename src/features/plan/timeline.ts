import type { PlanInForce } from '#shared/facts/household.ts';
import type { RatePlan, RateRow } from '#shared/settlement/plan.ts';
import { planFor } from '#shared/settlement/plan-in-force.ts';
import type { Day } from '#shared/units/day.ts';
import { decimal, fullDate } from '#src/lib/format.ts';
import { percentOfFraction } from '#src/lib/typed-values.ts';
import { seasonName } from '#src/ui/plan-form/season-ids.ts';

/** A day on which the rules or the prices change. `index` is the plan's place in the list. */
export type TimelineRow = {
  key: string;
  kind: 'plan' | 'prices';
  index: number;
  from: Day;
  title: string;
  changes: string[];
};

/** Plans and their price versions by date, oldest first; versions that begin only after the next plan are left out. */
export function timelineOf(plans: readonly PlanInForce[]): TimelineRow[] {
  const order = plans
    .map((_, index) => index)
    .sort((a, b) => ((plans[a]?.from ?? '') < (plans[b]?.from ?? '') ? -1 : 1));
  return order.flatMap((index, place) => {
    const one = plans[index];
    if (!one) return [];
    const next = plans[order[place + 1] ?? -1]?.from ?? null;
    const days = [...new Set(partsOf(one.plan).flatMap(({ rates }) => rates.map((row) => row.from)))].sort();
    return [
      {
        key: `${one.from} plan`,
        kind: 'plan' as const,
        index,
        from: one.from,
        title: one.plan.name || 'Rate plan without a name',
        changes: [sayPlan(one.plan)],
      },
      ...days
        .filter((day) => day > one.from && (next === null || day < next))
        .map((day) => ({
          key: `${one.from} ${day}`,
          kind: 'prices' as const,
          index,
          from: day,
          title: 'New prices',
          changes: changesOn(one.plan, day),
        })),
    ];
  });
}

/** "R-7 Residential time of day, from 1 January 2026" */
export function planLabel({ plan, from }: PlanInForce): string {
  return `${plan.name || 'Rate plan'}, from ${fullDate(from)}`;
}

/** The plan that holds on a day; before the first begins, the first. Null where there is none. */
export function currentPlan(plans: readonly PlanInForce[], today: string): PlanInForce | null {
  return planFor(plans, today as Day);
}

/** What removing a plan changes: the cycles it settles, and the plan each would be settled on instead (null: none is left). */
export function resettledWithout(
  plans: readonly PlanInForce[],
  index: number,
  cycles: readonly { from: Day; to: Day }[],
): { cycles: { from: Day; to: Day }[]; on: PlanInForce | null }[] {
  const leaving = plans[index];
  const rest = plans.filter((_, at) => at !== index);
  const moved = new Map<PlanInForce | null, { from: Day; to: Day }[]>();
  for (const { from, to } of cycles) {
    if (planFor(plans, from) !== leaving) continue;
    const on = planFor(rest, from);
    moved.set(on, [...(moved.get(on) ?? []), { from, to }]);
  }
  return [...moved].map(([on, held]) => ({ on, cycles: held }));
}

type Part = { label: string; rates: readonly RateRow[]; percent: boolean };

function partsOf(plan: RatePlan): Part[] {
  return [
    ...plan.charges.map(({ label, rates, basis }) => ({ label, rates, percent: basis === 'percent' })),
    ...plan.credits.map(({ label, rates }) => ({ label, rates: rates ?? [], percent: false })),
    ...plan.banks.flatMap(({ label, trueUps }) =>
      trueUps.map(({ rates }) => ({ label: `${label}, paid out`, rates: rates ?? [], percent: false })),
    ),
  ];
}

function sayPlan(plan: RatePlan): string {
  const parts = [...plan.charges, ...plan.credits].map(({ label }) => label);
  return parts.join(', ');
}

function changesOn(plan: RatePlan, day: Day): string[] {
  return partsOf(plan).flatMap(({ label, rates, percent }) =>
    rates
      .filter((row) => row.from === day)
      .flatMap((row) => {
        const before = rates
          .filter((other) => other.from < day && sameCell(other, row))
          .sort((a, b) => (a.from < b.from ? 1 : -1))[0];
        if (before?.rate === row.rate) return [];
        const name = [label, ...cellWords(row, plan)].join(', ');
        const now = sayRate(row.rate, percent);
        return [before ? `${name} ${sayRate(before.rate, percent)} → ${now}` : `${name} ${now}`];
      }),
  );
}

function sameCell(a: RateRow, b: RateRow): boolean {
  return a.season === b.season && a.period === b.period && a.tier === b.tier;
}

function cellWords(row: RateRow, plan: RatePlan): string[] {
  const period = plan.calendar.periods.find(({ id }) => id === row.period);
  return [
    ...(period ? [period.label || period.id] : []),
    ...(row.season === undefined ? [] : [seasonName(row.season).toLowerCase()]),
    ...(row.tier === undefined ? [] : [`tier ${row.tier}`]),
  ];
}

function sayRate(rate: string, percent: boolean): string {
  if (percent) return `${decimal(percentOfFraction(rate))} %`;
  const text = decimal(rate);
  return text.startsWith('\u2212') ? `\u2212$${text.slice(1)}` : `$${text}`;
}
