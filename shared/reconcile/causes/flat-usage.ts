import { flowOf, type NettedFlow, openCycle } from '../../settlement/cycle-flows.ts';
import type { RatePlan } from '../../settlement/plan.ts';
import { preparePlan } from '../../settlement/prepare.ts';
import { type SettledAmounts, settleAmounts } from '../../settlement/settle.ts';
import type { CycleUsage, Flow, Opening } from '../../settlement/settlement.ts';
import { wh } from '../../units/energy.ts';

/**
 * The usage with its interval data folded into what the plan asks of them (kWh by period, kWh after netting), so that many trials need not go over
 * thousands of steps; as given where the cycle does not come out the same without the steps.
 */
export function flatUsage(plan: RatePlan, opening: Opening, usage: CycleUsage, truth: SettledAmounts): CycleUsage {
  if (usage.intervals === null) return usage;
  const cycle = openCycle(preparePlan(plan), usage);
  const netted: CycleUsage['netted'] = { ...usage.netted };
  for (const netting of ['15min', 'hour'] as const) {
    if (!asksFor(plan, netting)) continue;
    const flow = flowOf(cycle, netting);
    netted[netting] = { ...flowWh(flow), byPeriod: periodsWh(flow) };
  }
  const byPeriod = plan.calendar.periods.length === 0 ? usage.byPeriod : periodsWh(flowOf(cycle, 'none'));
  const flat = { ...usage, netted, byPeriod, intervals: null };
  const settled = settleAmounts(plan, opening, flat);
  return settled.ok && sameOutcome(settled.value, truth) ? flat : usage;
}

function asksFor(plan: RatePlan, netting: '15min' | 'hour'): boolean {
  return [plan, ...plan.charges, ...plan.credits, ...plan.banks].some((item) => item.netting === netting);
}

function flowWh(flow: { import: number; export: number }): Flow {
  return { importWh: wh(flow.import), exportWh: wh(flow.export) };
}

function periodsWh({ byPeriod }: NettedFlow): Record<string, Flow> | null {
  if (byPeriod === null) return null;
  return Object.fromEntries(Object.entries(byPeriod).map(([period, flow]) => [period, flowWh(flow)]));
}

function sameOutcome(a: SettledAmounts, b: SettledAmounts): boolean {
  return outcome(a) === outcome(b);
}

function outcome({ settlement: { lines, payouts, banks } }: SettledAmounts): string {
  const amounts = (made: readonly { component: string; quantity: string | null; amountCents: number }[]) =>
    made.map(({ component, quantity, amountCents }) => [component, quantity, amountCents]);
  return JSON.stringify([amounts(lines), amounts(payouts), banks.map((bank) => bank.move)]);
}
