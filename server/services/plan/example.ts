import type { ExampleView } from '#shared/api/plan.ts';
import { asksForIntervals } from '#shared/metering/cycle-intervals.ts';
import type { Fault } from '#shared/problem.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { settleCycle } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import type { Day } from '#shared/units/day.ts';
import type { Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';
import { ledgerOf } from '../ledger-of.ts';
import { inventedUsage, sharedEvenly } from './example-usage.ts';
import { houseCycles } from './house-usages.ts';
import { pricesTakenBack } from './prices-taken-back.ts';

/** How many of the house's cycles an example may be worked on. */
const CHOICES = 12;

/**
 * A month on a plan being written: the house's own cycle (`to`, else the last), else an invented one; banks begin empty. A plan that is refused
 * answers with its faults and no settlement. Stores nothing.
 */
export function workExample(deps: Deps, householdId: string, body: { plan: unknown; to: Day | null }): ExampleView {
  const { facts, today } = ledgerOf(deps, householdId);
  const own = houseCycles(facts).slice(-CHOICES).reverse();
  const chosen = own.find((cycle) => cycle.to === body.to) ?? own[0] ?? null;
  const parsed = parsePlan(body.plan);
  const invented = inventedUsage(facts, today);
  const dates = { from: chosen?.from ?? invented.from, to: chosen?.to ?? invented.to };
  const answer = (usage: CycleUsage, more: Partial<ExampleView>, source: 'cycle' | 'invented', even = false) => ({
    usage: {
      ...dates,
      importWh: usage.importWh,
      exportWh: usage.exportWh,
      productionWh: usage.productionWh,
      source,
      sharedEvenly: even,
    },
    cycles: own.map(({ from, to }) => ({ from, to })),
    settlement: null,
    pricesTakenBack: false,
    faults: [],
    ...more,
  });
  if (!parsed.ok) return answer(invented, { faults: faultsOf(parsed.problem) }, 'invented');

  const { plan, moved } = pricesTakenBack(parsed.value, dates.from);
  const known = chosen?.usage(plan) ?? null;
  const source = known === null || typeof known === 'string' ? 'invented' : 'cycle';
  const usage = known === null || typeof known === 'string' ? { ...invented, ...dates } : known;
  const even = asksForIntervals(plan) && usage.intervals === null;
  const settled = settleCycle(plan, EMPTY_OPENING, even ? sharedEvenly(usage, plan) : usage);
  return settled.ok
    ? answer(usage, { settlement: settled.value.settlement, pricesTakenBack: moved }, source, even)
    : answer(usage, { faults: faultsOf(settled.problem), pricesTakenBack: moved }, source, even);
}

function faultsOf(problem: { detail: string | null; faults: Fault[] }): Fault[] {
  if (problem.faults.length > 0) return problem.faults;
  return [{ ...fieldFault('plan', problem.detail ?? 'This rate plan cannot settle a month.'), field: null }];
}
