import { bankCents, type CompiledCycle, compileCycle, dueOf } from '../settlement/compile-cycle.ts';
import { newSlots, type Slots, stateOf } from '../settlement/compile-state.ts';
import type { CompiledUsage } from '../settlement/compile-usage.ts';
import { keptAt } from '../settlement/place.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { orRefusal } from '../settlement/refused.ts';
import { type SettledAmounts, settleAmounts } from '../settlement/settle.ts';
import type { CycleUsage, Opening } from '../settlement/settlement.ts';
import { wh } from '../units/energy.ts';
import { bankWorth } from './bank-worth.ts';
import type { Period } from './periods.ts';

/** The bills of the months to come, with the roof or without it, made ready to be settled as often as is wanted. */
export type BillSide = {
  months: readonly { period: Period; plan: RatePlan }[];
  kW: CycleUsage['kW'];
  incentiveApart: boolean;
  /** The months' settlements compiled, with the places they keep the banks in; null where one of them cannot be: then the full settlement is used. */
  compiled: { cycles: readonly CompiledCycle[]; slots: Slots } | null;
  /** Whether no month carries anything to the next, so that a month's bill follows from its own energy alone. */
  isStateless: boolean;
};

/** What each month comes to in cents, and what the banks are worth after it. */
export type SideResult = { dueCents: number[]; bankCents: number[] };

export type Settled = { ok: true; value: SideResult } | { ok: false; why: string };

export function billSide(months: BillSide['months'], kW: CycleUsage['kW'], incentiveApart: boolean): BillSide {
  const slots = newSlots();
  const cycles: CompiledCycle[] = [];
  for (const { period, plan } of months) {
    const made = compileCycle({ plan, from: period.from, to: period.to, kW, incentiveApart, slots });
    if (made === null) break;
    cycles.push(made);
  }
  return {
    months,
    kW,
    incentiveApart,
    compiled: cycles.length === months.length ? { cycles, slots } : null,
    isStateless: months.every(({ plan }) => plan.banks.length === 0 && plan.credits.every(({ cap }) => cap === null)),
  };
}

/** Settles a side's months one after another; `usageAt` gives a month's energy. Refused with the sentence of the first month that cannot be settled. */
export function settleSide(side: BillSide, opening: Opening, usageAt: (at: number) => CompiledUsage): Settled {
  const { compiled } = side;
  if (compiled === null) return settleWhole(side, opening, usageAt);
  const made = orRefusal((): SideResult => {
    const state = stateOf(compiled.slots, opening);
    const result: SideResult = { dueCents: [], bankCents: [] };
    for (const [at, cycle] of compiled.cycles.entries()) {
      result.dueCents.push(dueOf(cycle, usageAt(at), state));
      result.bankCents.push(cycle.banks.length === 0 ? 0 : bankCents(cycle, state));
    }
    return result;
  });
  return made.ok ? { ok: true, value: made.value } : { ok: false, why: String(made.problem.detail) };
}

/**
 * One month's bill of a compiled side that carries nothing from month to month; null for any other. May throw what the full settlement would refuse: run
 * inside `orRefusal`.
 */
export function settleAlone(side: BillSide, at: number, usage: CompiledUsage): number | null {
  const cycle = side.compiled?.cycles[at];
  return cycle && side.isStateless ? dueOf(cycle, usage, stateOf(NO_SLOTS, NO_OPENING)) : null;
}

const NO_SLOTS = newSlots();
const NO_OPENING: Opening = { banks: {}, usageSinceTrueUp: {}, capUsed: {}, balanceCents: null };

function settleWhole(side: BillSide, opening: Opening, usageAt: (at: number) => CompiledUsage): Settled {
  const result: SideResult = { dueCents: [], bankCents: [] };
  let held = opening;
  for (const [at, { period, plan }] of side.months.entries()) {
    const settled = settleAmounts(plan, held, fullUsage(side, plan, period, usageAt(at)));
    if (!settled.ok) return { ok: false, why: String(settled.problem.faults[0]?.message ?? settled.problem.detail) };
    held = settled.value.closing;
    result.dueCents.push(electricDue(settled.value.settlement, side.incentiveApart));
    result.bankCents.push(bankWorth(plan, held, period.from, period.to));
  }
  return { ok: true, value: result };
}

function fullUsage(side: BillSide, plan: RatePlan, period: Period, usage: CompiledUsage): CycleUsage {
  const { split } = usage;
  const ids = plan.calendar.periods.map((one) => one.id);
  /** A record by period id of what the usage holds in the calendar's order. */
  const named = <T, U>(values: readonly (T | null)[], make: (value: T) => U): Record<string, U> =>
    Object.fromEntries(
      ids.flatMap((id, at) => {
        const value = keptAt(values, at);
        return value === null ? [] : [[id, make(value)]];
      }),
    );
  const netted = (block: 'hour' | '15min', of: NonNullable<CompiledUsage['split']>) => ({
    ...flow(of.netted[block]),
    byPeriod: ids.length === 0 ? null : named(of.netted[block].periods, flow),
  });
  const made = {
    from: period.from,
    to: period.to,
    importWh: wh(usage.importWh),
    exportWh: wh(usage.exportWh),
    productionWh: wh(usage.productionWh),
    loadWh: wh(usage.loadWh),
    byPeriod: split === null || ids.length === 0 ? null : named(split.periods, flow),
    netted: split === null ? {} : { hour: netted('hour', split), '15min': netted('15min', split) },
    kW: side.kW,
    payments: [],
    finalBill: false,
    intervals: null,
  };
  if (split === null || ids.length === 0) return made;
  const own = (part: { productionWh: number; loadWh: number }) => ({
    productionWh: wh(part.productionWh),
    loadWh: wh(part.loadWh),
  });
  return { ...made, ownByPeriod: named(split.periods, own) };
}

function flow({ importWh, exportWh }: { importWh: number; exportWh: number }) {
  return { importWh: wh(importWh), exportWh: wh(exportWh) };
}

/** Current charges in due less what is paid out beside the bill; the incentive apart where it has a book of its own. */
export function electricDue(settlement: SettledAmounts['settlement'], incentiveApart: boolean): number {
  let due = 0;
  for (const line of settlement.lines) {
    if (line.inDue && !(incentiveApart && line.kind === 'incentive')) due += line.amountCents;
  }
  for (const payout of settlement.payouts) {
    if (!(incentiveApart && payout.kind === 'incentive')) due -= payout.amountCents;
  }
  return due;
}
