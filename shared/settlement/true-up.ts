import { monthOf, yearOf } from '../units/day.ts';
import type { BankState } from './bank-state.ts';
import { yearlyDayIn } from './calendar.ts';
import type { Cycle } from './cycle-flows.ts';
import type { TrueUp } from './plan.ts';
import type { PreparedTrueUp } from './prepare.ts';
import { big, compare, greater, minus, plus, type Qty, qtyOfText, roundToWhole } from './quantity.ts';
import { refuse } from './refused.ts';
import type { Opening } from './settlement.ts';
import { billDebts, type TrueUpResult, takeOver } from './true-up-payments.ts';

export type Usage = { cycles: number; kWh: Qty };

/** Whether a true-up is due at the close of a cycle. */
export function isDue(at: TrueUp['at'], cycle: Cycle): boolean {
  if (at === 'everyCycle') return true;
  if (at === 'finalBill') return cycle.usage.finalBill;
  if ('months' in at) return at.months.includes(monthOf(cycle.to)) && !at.months.includes(monthOf(cycle.from));
  for (let year = yearOf(cycle.from); year <= yearOf(cycle.to); year += 1) {
    const date = yearlyDayIn(year, at.date);
    if (cycle.from < date && date <= cycle.to) return true;
  }
  return false;
}

/** Adds the cycle's use to what a bank's `averageCycles` goes by; null where the bank keeps no average. */
export function countUsage(cycle: Cycle, state: BankState, opening: Opening): Usage | null {
  const { averages, bank } = state.prepared;
  if (!averages || !('averageCycles' in averages)) return null;
  const before = opening.usageSinceTrueUp[bank.id];
  const { usage } = cycle;
  const net = usage.importWh - usage.exportWh;
  const kWh = averages.usage === 'import' ? usage.importWh : averages.usage === 'net' ? net : loadOf(cycle);
  return { cycles: (before?.cycles ?? 0) + 1, kWh: plus(qtyOfText(before?.kWh ?? '0'), kWh) };
}

function loadOf(cycle: Cycle): number {
  const { usage, prepared } = cycle;
  if (prepared.plan.load === 'metered') {
    return usage.loadWh ?? refuse('The plan goes by the load meter: its kWh are needed.');
  }
  const produced = usage.productionWh ?? refuse('The plan goes by the house’s use: production is needed.');
  return usage.importWh + produced - usage.exportWh;
}

/** The true-ups of a bank at the close, in order. `usage` is counted on and starts again after one that happens. */
export function trueUpBank(cycle: Cycle, state: BankState, usage: Usage | null): TrueUpResult {
  const result: TrueUpResult = { lines: [], payouts: [] };
  let happened = false;
  for (const item of state.prepared.trueUps) {
    if (!isDue(item.trueUp.at, cycle)) continue;
    billDebts(state, result);
    const total = state.pockets.reduce<Qty>((sum, pocket) => plus(sum, pocket.balance), 0);
    const kept = keptOf(cycle, item, usage);
    const over = greater(minus(total, kept), 0);
    if (compare(over, item.atLeast) < 0) continue;
    takeOver(cycle, state, item, over, result);
    happened = true;
  }
  if (usage && happened) {
    usage.cycles = 0;
    usage.kWh = 0;
  }
  return result;
}

/** What a true-up leaves in the bank. */
export function keptOf(cycle: Cycle, item: PreparedTrueUp, usage: Usage | null): Qty {
  const { keep } = item.trueUp;
  if (!keep) return 0;
  if ('amount' in keep || !usage) return item.keep;
  const n = big(usage.kWh).times(keep.averageCycles);
  const kept = cycle.prepared.plan.rounding.limits === 'whole' ? roundToWhole(n, usage.cycles) : n.div(usage.cycles);
  return greater(kept, 0);
}
