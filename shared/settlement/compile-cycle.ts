import type { Day } from '../units/day.ts';
import { yearOf } from '../units/day.ts';
import { wh, ZERO_WH } from '../units/energy.ts';
import { centsOfQty } from './bank-state.ts';
import { chargeLines, NOTHING_OWED } from './charges.ts';
import {
  bankCentsOf,
  type CompiledBank,
  closeCompiled,
  compileBank,
  moveCompiledKwh,
  moveCompiledUsd,
  mustTotal,
} from './compile-banks.ts';
import { type CompiledEnergy, compileEnergy, energyCents, periodCents } from './compile-energy.ts';
import { type CompiledState, capName, type Slots, slotOf } from './compile-state.ts';
import { type CompiledUsage, partsOf, type Side } from './compile-usage.ts';
import { type Cycle, openCycle } from './cycle-flows.ts';
import { mustPrice } from './energy-share.ts';
import { splitCycle } from './parts.ts';
import { keptAt, knownAs } from './place.ts';
import type { RatePlan } from './plan.ts';
import { type PreparedCharge, type PreparedCredit, preparePlan } from './prepare.ts';
import { compare, minus, priced, type Qty, qtyOfText, type Rate, rateOf, times } from './quantity.ts';
import { orRefusal, refuse } from './refused.ts';
import type { CycleUsage } from './settlement.ts';

type EnergyCharge = { kind: 'energy'; place: number; side: Side; energy: CompiledEnergy };

type CompiledCharge =
  | EnergyCharge
  | { kind: 'fixed'; place: number; amount: number }
  | { kind: 'percent'; place: number; on: readonly number[]; parts: readonly { days: number; rate: Rate }[] }
  | {
      kind: 'floor';
      place: number;
      on: readonly number[];
      parts: readonly FloorPart[];
    };

/** `int`: the rate's digits without its point. */
type FloorPart = { days: number; rate: Rate; int: Qty; times: number };

type CompiledCredit = {
  side: Side;
  energy: CompiledEnergy;
  /** Where the cap's use is kept, and its amount. */
  cap: { at: number; amount: number } | null;
  to: 'bill' | 'separate' | number;
  counts: boolean;
};

/** One cycle's settlement with every price, part and rule looked up: the same cents as `settleAmounts` gives, by arithmetic on whole numbers. */
export type CompiledCycle = {
  cycle: Cycle;
  early: readonly CompiledCharge[];
  /** Those of them by the kWh: what kWh banks pay. */
  energies: readonly EnergyCharge[];
  late: readonly CompiledCharge[];
  credits: readonly CompiledCredit[];
  /** In the plan's order. */
  banks: readonly CompiledBank[];
  /** Whether each charge's place is in the amount due. */
  inDue: readonly boolean[];
  places: number;
};

export type CompileInput = {
  plan: RatePlan;
  from: Day;
  to: Day;
  kW: CycleUsage['kW'];
  /** Leaves incentive lines and payouts out of what is due, where the incentive has a book of its own. */
  incentiveApart: boolean;
  slots: Slots;
};

/**
 * Compiles the settlement of a cycle known by its totals, and by its periods and clock hours where the plan goes by them: no intervals, no payments, no final
 * bill. Null where the plan uses what only the full settlement does (tiers or balances by period, lots, changes by intervals) or would be refused:
 * then `settleAmounts` is the way, and says why.
 */
export function compileCycle(input: CompileInput): CompiledCycle | null {
  const made = orRefusal(() => compile(input));
  return made.ok ? made.value : null;
}

function compile({ plan, from, to, kW, incentiveApart, slots }: CompileInput): CompiledCycle | null {
  const prepared = preparePlan(plan);
  const cycle = openCycle(prepared, usageOf(from, to, kW), false);
  const places = new Map(prepared.charges.map((item, index) => [item.charge.id, index]));
  const early = allOf(prepared.early, (item) => compileCharge(cycle, item, places));
  const late = allOf(prepared.late, (item) => compileCharge(cycle, item, places));
  const bankPlaces = new Map(prepared.banks.map((item, index) => [item.bank.id, index]));
  const credits = allOf(prepared.credits, (item) => compileCredit(cycle, item, bankPlaces, incentiveApart, slots));
  const banks = allOf(prepared.banks, (item) => compileBank(cycle, item, slots, places));
  if (early === null || late === null || credits === null || banks === null) return null;
  return {
    cycle,
    early,
    energies: early.filter((charge) => charge.kind === 'energy'),
    late,
    credits,
    banks,
    inDue: prepared.charges.map((item) => !prepared.taken.has(item.charge.id)),
    places: prepared.charges.length,
  };
}

function allOf<T, U>(items: readonly T[], make: (item: T) => U | null): U[] | null {
  const made: U[] = [];
  for (const item of items) {
    const one = make(item);
    if (one === null) return null;
    made.push(one);
  }
  return made;
}

function usageOf(from: Day, to: Day, kW: CycleUsage['kW']): CycleUsage {
  return {
    from,
    to,
    importWh: ZERO_WH,
    exportWh: ZERO_WH,
    productionWh: wh(0),
    loadWh: wh(0),
    byPeriod: null,
    netted: {},
    kW,
    payments: [],
    finalBill: false,
    intervals: null,
  };
}

function compileCharge(cycle: Cycle, item: PreparedCharge, places: ReadonlyMap<string, number>): CompiledCharge | null {
  const { charge, netting, pricing } = item;
  const { label, basis } = charge;
  const place = knownAs(places, charge.id);
  const on = charge.on.map((id) => knownAs(places, id));
  switch (basis) {
    case 'cycle':
    case 'day':
    case 'kW': {
      const lines = chargeLines(cycle, item, null, NOTHING_OWED);
      return { kind: 'fixed', place, amount: lines.reduce((sum, line) => sum + line.amountCents, 0) };
    }
    case 'percent':
    case 'floor': {
      const parts: FloorPart[] = [];
      for (const part of splitCycle(cycle, pricing, false)) {
        const { rate } = mustPrice(item, label, part, null, null);
        const { int } = rate;
        if (int === null) return null;
        parts.push({ days: part.days, rate, int, times: charge.per === 'day' ? cycle.days : 1 });
      }
      return basis === 'percent' ? { kind: 'percent', place, on, parts } : { kind: 'floor', place, on, parts };
    }
    default: {
      const energy = compileEnergy(cycle, { label, basis, netting, pricing, lessBank: null }, null);
      return energy && { kind: 'energy', place, side: { basis, netting }, energy };
    }
  }
}

function compileCredit(
  cycle: Cycle,
  item: PreparedCredit,
  banks: ReadonlyMap<string, number>,
  incentiveApart: boolean,
  slots: Slots,
): CompiledCredit | null {
  const { credit, netting, pricing } = item;
  const { label, basis, cap } = credit;
  const energy = compileEnergy(cycle, { label, basis, netting, pricing, lessBank: null }, credit.term);
  if (energy === null) return null;
  const key = cap?.per === 'year' ? String(yearOf(cycle.to)) : 'term';
  return {
    side: { basis, netting },
    energy,
    cap: cap ? { at: slotOf(slots.caps, capName(credit.id, key)), amount: centsOfQty(qtyOfText(cap.amount)) } : null,
    to: credit.to === 'bill' || credit.to === 'separate' ? credit.to : knownAs(banks, credit.to),
    counts: !(incentiveApart && credit.kind === 'incentive'),
  };
}

/**
 * What a month's current electric charges come to, in cents, less what is paid out beside the bill; moves the state on to the close. May throw
 * what `settleAmounts` would refuse (an amount no house could owe): run inside `orRefusal`.
 */
export function dueOf(compiled: CompiledCycle, usage: CompiledUsage, state: CompiledState): number {
  const { cycle, banks, inDue } = compiled;
  const amounts: number[] = new Array(compiled.places).fill(0);
  const paid: number[] = new Array(compiled.places).fill(0);
  const taken: (Qty | null)[] = new Array(compiled.places).fill(null);
  const waiting: Qty[] = banks.length === 0 ? NO_QTY : banks.map(() => 0);
  let due = 0;

  for (let index = 0; index < banks.length; index += 1) {
    const bank = keptAt(banks, index);
    if (bank.prepared.bank.unit === 'kWh') waiting[index] = moveCompiledKwh(cycle, bank, usage, state, taken);
  }
  for (const charge of compiled.early) {
    const amount = amountOf(compiled, charge, usage, amounts, paid, taken, true);
    amounts[charge.place] = amount;
    if (inDue[charge.place]) due += amount;
  }
  const earned = banks.length === 0 ? NO_CENTS : banks.map(() => 0);
  for (const credit of compiled.credits) {
    const amount = creditOf(credit, usage, state);
    if (typeof credit.to === 'number') earned[credit.to] = keptAt(earned, credit.to) + amount;
    else if (credit.counts) due -= amount;
  }
  for (let index = 0; index < banks.length; index += 1) {
    const bank = keptAt(banks, index);
    if (bank.prepared.bank.unit !== 'USD') continue;
    const moved = moveCompiledUsd(bank, keptAt(earned, index), state, amounts, paid);
    due -= moved.off;
    waiting[index] = moved.waiting;
  }
  for (const charge of compiled.late) {
    // No bank may take what is worked out only after credits, so that all of it is due.
    const amount = amountOf(compiled, charge, usage, amounts, paid, taken, false);
    amounts[charge.place] = amount;
    due += amount;
  }
  for (let index = 0; index < banks.length; index += 1) {
    due += closeCompiled(cycle, keptAt(banks, index), keptAt(waiting, index), usage, state);
  }
  return due;
}

const NO_QTY: Qty[] = [];
const NO_CENTS: number[] = [];

/** What the banks are worth after the cycle. */
export function bankCents(compiled: CompiledCycle, state: CompiledState): number {
  let total = 0;
  for (const bank of compiled.banks) total += bankCentsOf(bank, state);
  return total;
}

/** What an item by the kWh comes to, less what kWh banks have taken: they pay none that goes by period, since they keep one balance. */
function centsOf(
  { side, energy }: { side: Side; energy: CompiledEnergy },
  usage: CompiledUsage,
  used: Qty | null,
  each: ((amount: number) => void) | null = null,
): number {
  if (energy.byPeriod) {
    const parts = partsOf(side, usage) ?? refuse(`${energy.label} is priced by period: its kWh by period are needed.`);
    return periodCents(energy, parts, each);
  }
  const n = mustTotal(side, usage);
  return energyCents(energy, used ? minus(n, used) : n, each);
}

function amountOf(
  { cycle, energies }: CompiledCycle,
  charge: CompiledCharge,
  usage: CompiledUsage,
  amounts: readonly number[],
  paid: readonly number[],
  taken: readonly (Qty | null)[],
  isEarly: boolean,
): number {
  switch (charge.kind) {
    case 'fixed':
      return charge.amount;
    case 'energy':
      return centsOf(charge, usage, taken[charge.place] ?? null);
    case 'percent': {
      let base = 0;
      for (const place of charge.on) {
        base += isEarly && taken[place] ? unbanked(energies, place, usage) : keptAt(amounts, place);
        if (!isEarly) base -= keptAt(paid, place);
      }
      let sum = 0;
      const { money } = cycle.prepared.plan.rounding;
      for (const { days, rate } of charge.parts) {
        const isWhole = days === cycle.days;
        sum += priced(isWhole ? base * 10 : times(base * 10, days), isWhole ? 1 : cycle.days, rate, money);
      }
      return sum;
    }
    case 'floor': {
      let base = 0;
      for (const place of charge.on) base += keptAt(amounts, place) - keptAt(paid, place);
      let sum = 0;
      for (const part of charge.parts) sum += missingTo(cycle, part, base);
      return sum;
    }
  }
}

/** A charge as it would be had no kWh bank paid: what a percent before credits goes by. */
function unbanked(energies: readonly EnergyCharge[], place: number, usage: CompiledUsage): number {
  let sum = 0;
  for (const charge of energies) {
    if (charge.place === place) sum += centsOf(charge, usage, null);
  }
  return sum;
}

const ONE = rateOf('1');

/** What is missing to a floor over a part's days: (rate × days × times − base × days) / all days, rounded once. */
function missingTo(cycle: Cycle, part: FloorPart, base: number): number {
  const power = 10 ** part.rate.scale;
  const least = times(times(part.int, part.days * part.times), 1000);
  const missing = minus(least, times(times(base * 10, part.days), power));
  if (compare(missing, 0) <= 0) return 0;
  return priced(missing, times(cycle.days, power), ONE, cycle.prepared.plan.rounding.money);
}

function creditOf(credit: CompiledCredit, usage: CompiledUsage, state: CompiledState): number {
  const { cap } = credit;
  if (cap === null) return centsOf(credit, usage, null);
  const used = keptAt(state.capUsed, cap.at);
  let left = cap.amount - used;
  let earned = 0;
  centsOf(credit, usage, null, (full) => {
    const amount = full > left ? Math.max(left, 0) : full;
    left -= amount;
    earned += amount;
  });
  state.capUsed[cap.at] = used + earned;
  return earned;
}
