import { type BankState, enter, type Pocket, take } from './bank-state.ts';
import { type Cycle, flowOf, type NettedFlow } from './cycle-flows.ts';
import type { LessBank } from './energy-figures.ts';
import type { PreparedBank } from './prepare.ts';
import { compare, greater, lesser, minus, plus, type Qty, roundToWhole, scaled, times } from './quantity.ts';
import { refuse } from './refused.ts';

type Taken = { all: Qty; byPeriod: Record<string, Qty> };
/** What kWh banks have taken off each charge's import. */
export type TakenByCharge = Map<string, Taken>;

export function lessBank(taken: TakenByCharge, chargeId: string): LessBank | null {
  return taken.get(chargeId) ?? null;
}

/** A kWh bank in a cycle: it earns what was exported after netting, and lowers the import of the charges it offsets. */
export function moveKwhBank(cycle: Cycle, state: BankState, taken: TakenByCharge): void {
  const { bank, netting } = state.prepared;
  const flow = flowOf(cycle, netting);
  const life = bank.lotLife?.cycles ?? null;
  for (const pocket of state.pockets) {
    const earned = earnedKwh(cycle, state.prepared, sideOf(flow, pocket, 'export', bank.label));
    if (bank.sameCycle) enter(pocket, earned, life, cycle.to);
    else pocket.waiting = earned;
  }
  if (bank.offsets.length === 0 && !bank.belowZero) return;
  for (const pocket of state.pockets) {
    const open = stillImported(bank.offsets, taken, pocket.period, sideOf(flow, pocket, 'import', bank.label));
    use(pocket, bank.belowZero ? open : lesser(pocket.balance, open), bank.offsets, taken, pocket.period);
  }
  if (bank.byPeriod && flow.byPeriod && bank.ifPeriodAbsent === 'otherPeriods' && !bank.belowZero)
    payOtherPeriods(state, flow.byPeriod, taken);
}

/** What a kWh bank earns for an export, by its ratio. */
export function earnedKwh(cycle: Cycle, { bank, ratio }: PreparedBank, exported: Qty): Qty {
  if (bank.ratio !== '1' && cycle.prepared.plan.rounding.kWh === 'whole')
    return roundToWhole(times(exported, ratio), 1000);
  return scaled(exported, ratio);
}

function sideOf(flow: NettedFlow, pocket: Pocket, side: 'import' | 'export', label: string): number {
  if (pocket.period === null) return flow[side];
  if (!flow.byPeriod)
    return refuse(`${label} keeps a balance for each period: import and export by period are needed.`);
  return flow.byPeriod[pocket.period]?.[side] ?? 0;
}

/** The import that none of the bank's charges has had lowered yet: no charge is lowered below zero by two banks. */
function stillImported(offsets: readonly string[], taken: TakenByCharge, period: string | null, imported: Qty): Qty {
  let open = imported;
  for (const id of offsets) open = lesser(open, minus(imported, takenOf(taken, id, period)));
  return open;
}

function takenOf(taken: TakenByCharge, id: string, period: string | null): Qty {
  const of = taken.get(id);
  return (period === null ? of?.all : of?.byPeriod[period]) ?? 0;
}

function use(
  pocket: Pocket,
  amount: Qty,
  offsets: readonly string[],
  taken: TakenByCharge,
  period: string | null,
): void {
  const used = greater(amount, 0);
  if (compare(used, 0) === 0) return;
  take(pocket, used, 'used');
  for (const id of offsets) {
    const of = taken.get(id) ?? { all: 0, byPeriod: {} };
    of.all = plus(of.all, used);
    if (period !== null) of.byPeriod[period] = plus(of.byPeriod[period] ?? 0, used);
    taken.set(id, of);
  }
}

/** What is kept for a period that this bill lacks pays the others, in the calendar's order. */
function payOtherPeriods(state: BankState, present: NonNullable<NettedFlow['byPeriod']>, taken: TakenByCharge): void {
  const { offsets } = state.prepared.bank;
  for (const pocket of state.pockets) {
    if (pocket.period === null || present[pocket.period]) continue;
    for (const other of state.pockets) {
      const imported = present[String(other.period)]?.import;
      if (imported === undefined) continue;
      use(
        pocket,
        lesser(pocket.balance, stillImported(offsets, taken, other.period, imported)),
        offsets,
        taken,
        other.period,
      );
    }
  }
}
