import { earnedKwh } from './bank-kwh.ts';
import { centsOfQty } from './bank-state.ts';
import { seasonOf } from './calendar.ts';
import { type CompiledEnergy, compileEnergy, energyCents } from './compile-energy.ts';
import { type CompiledState, type Slots, slotOf } from './compile-state.ts';
import { type CompiledUsage, type Side, totalOf } from './compile-usage.ts';
import type { Cycle } from './cycle-flows.ts';
import { floorCents } from './floors.ts';
import { keptAt, knownAs } from './place.ts';
import type { Netting } from './plan.ts';
import type { PreparedBank, PreparedTrueUp } from './prepare.ts';
import {
  compare,
  greater,
  lesser,
  minus,
  plus,
  priced,
  type Qty,
  qtyOfText,
  qtyText,
  type Rate,
  rateOf,
  roundedCents,
} from './quantity.ts';
import { priceAt } from './rates-in-force.ts';
import { refuse } from './refused.ts';
import { isDue, keptOf } from './true-up.ts';

type CompiledTrueUp = { item: PreparedTrueUp; rate: Rate | null; fee: number; pays: boolean };

/** A bank compiled for one cycle: where its balance is kept, what it pays and what its true-ups do at the close. */
export type CompiledBank = {
  at: number;
  prepared: PreparedBank;
  netting: Netting;
  /** Places of the charges it pays. */
  offsets: readonly number[];
  /** USD: the charges a floor counts, and what it must leave of them; null without one. */
  floor: { on: readonly number[]; least: number } | null;
  counted: readonly boolean[];
  trueUps: readonly CompiledTrueUp[];
  /** kWh: how what it holds is priced (`bankCentsOf`); null where it is worth nothing. */
  worth: { charges: readonly CompiledEnergy[]; payout: Rate | null };
  isIncentiveOnly: boolean;
};

/** Null where the bank does what only a full settlement can: balances by period, or lots that die. */
export function compileBank(
  cycle: Cycle,
  prepared: PreparedBank,
  slots: Slots,
  places: ReadonlyMap<string, number>,
): CompiledBank | null {
  const { bank, netting, floor } = prepared;
  const { plan } = cycle.prepared;
  if (bank.byPeriod || bank.lotLife !== null) return null;
  const trueUps: CompiledTrueUp[] = [];
  for (const item of prepared.trueUps) {
    if (!isDue(item.trueUp.at, cycle)) continue;
    const pays = item.trueUp.action === 'pay';
    const price =
      pays && bank.unit === 'kWh'
        ? priceAt(item.pricing, cycle.to, seasonOf(plan.calendar, cycle.to), null, null)
        : null;
    if (pays && bank.unit === 'kWh' && price === null) return null;
    trueUps.push({ item, rate: price?.rate ?? null, fee: centsOfQty(item.fee), pays });
  }
  const charges: CompiledEnergy[] = [];
  if (bank.unit === 'kWh') {
    for (const id of bank.offsets) {
      const { charge, netting, pricing } = knownAs(cycle.prepared.charge, id);
      const made = compileEnergy(
        cycle,
        { label: charge.label, basis: 'import', netting, pricing, lessBank: null },
        null,
      );
      if (made === null) return null;
      charges.push(made);
    }
  }
  const placesOf = (ids: readonly string[]) => ids.map((id) => knownAs(places, id));
  const floorOn = floor?.charge.on ?? [];
  const fed = plan.credits.filter((credit) => credit.to === bank.id);
  return {
    at: slotOf(slots.banks, bank.id),
    prepared,
    netting,
    offsets: placesOf(bank.offsets),
    floor: floor ? { on: placesOf(floorOn), least: floorCents(cycle, floor) } : null,
    counted: bank.offsets.map((id) => floorOn.includes(id)),
    trueUps,
    worth: { charges, payout: payoutRate(prepared, cycle) },
    isIncentiveOnly: bank.unit === 'USD' && fed.length > 0 && fed.every((credit) => credit.kind === 'incentive'),
  };
}

function payoutRate({ bank }: PreparedBank, cycle: Cycle): Rate | null {
  const paying = bank.trueUps.find((trueUp) => trueUp.action === 'pay' && trueUp.rates !== null);
  const rate = paying?.rates?.filter((row) => row.from <= cycle.to).at(-1)?.rate;
  return rate === undefined ? null : rateOf(rate);
}

/** A kWh bank in a cycle: earns, and lowers the import of what it offsets (`moveKwhBank`). Gives what enters only at the close. */
export function moveCompiledKwh(
  cycle: Cycle,
  bank: CompiledBank,
  usage: CompiledUsage,
  state: CompiledState,
  taken: (Qty | null)[],
): Qty {
  const { prepared, at } = bank;
  const imported = mustTotal({ basis: 'import', netting: bank.netting }, usage);
  const earned = earnedKwh(cycle, prepared, mustTotal({ basis: 'export', netting: bank.netting }, usage));
  let waiting: Qty = 0;
  if (prepared.bank.sameCycle) state.balances[at] = plus(keptAt(state.balances, at), earned);
  else waiting = earned;
  if (bank.offsets.length === 0) {
    // Below zero without a charge to pay it still takes the import.
    if (prepared.bank.belowZero) state.balances[at] = minus(keptAt(state.balances, at), greater(imported, 0));
    return waiting;
  }
  let open: Qty = imported;
  for (const place of bank.offsets) open = lesser(open, minus(imported, taken[place] ?? 0));
  const used = greater(prepared.bank.belowZero ? open : lesser(keptAt(state.balances, at), open), 0);
  if (compare(used, 0) === 0) return waiting;
  state.balances[at] = minus(keptAt(state.balances, at), used);
  for (const place of bank.offsets) taken[place] = plus(taken[place] ?? 0, used);
  return waiting;
}

/** The Wh of a side in all; refused where the usage does not say what its netting needs. */
export function mustTotal(side: Side, usage: CompiledUsage): number {
  return totalOf(side, usage) ?? refuse('The plan nets inside the cycle: energy by period or clock hour is needed.');
}

/** A USD bank in a cycle (`moveUsdBank`). Gives what it takes off the amount due, and what enters only at the close. */
export function moveCompiledUsd(
  bank: CompiledBank,
  earned: number,
  state: CompiledState,
  amounts: readonly number[],
  paid: number[],
): { off: number; waiting: number } {
  const { at, floor } = bank;
  const { belowZero, sameCycle } = bank.prepared.bank;
  const held = Number(keptAt(state.balances, at)) / 10 + (sameCycle ? earned : 0);
  const owes = (place: number) => keptAt(amounts, place) - keptAt(paid, place);
  let left = belowZero ? Number.POSITIVE_INFINITY : Math.max(held, 0);
  let room = Number.POSITIVE_INFINITY;
  if (floor) {
    let owed = 0;
    for (const place of floor.on) owed += owes(place);
    room = Math.max(owed - floor.least, 0);
  }
  let used = 0;
  for (let index = 0; index < bank.offsets.length; index += 1) {
    const place = keptAt(bank.offsets, index);
    const counted = keptAt(bank.counted, index);
    const owed = owes(place);
    const payable = Math.min(belowZero ? owed : Math.max(owed, 0), counted ? room : Number.POSITIVE_INFINITY);
    const pays = Math.min(payable, left);
    if (pays === 0) continue;
    paid[place] = keptAt(paid, place) + pays;
    used += pays;
    left -= pays;
    if (counted) room -= pays;
  }
  state.balances[at] = (held - used) * 10;
  return { off: belowZero || bank.offsets.length === 0 ? 0 : used, waiting: sameCycle ? 0 : earned * 10 };
}

/** The close of a bank (`trueUpBank`): what waited enters, then its true-ups. Gives what they add to the amount due, negative when they pay. */
export function closeCompiled(
  cycle: Cycle,
  bank: CompiledBank,
  waiting: Qty,
  usage: CompiledUsage,
  state: CompiledState,
): number {
  const { at, prepared } = bank;
  let balance = plus(keptAt(state.balances, at), waiting);
  const averages = prepared.averages;
  const counted =
    averages && 'averageCycles' in averages
      ? {
          cycles: keptAt(state.usageCycles, at) + 1,
          kWh: plus(keptAt(state.usageKwh, at), usedOf(averages.usage, usage)),
        }
      : null;
  let due = 0;
  let happened = false;
  for (const { item, rate, fee, pays } of bank.trueUps) {
    if (compare(balance, 0) < 0) {
      if (prepared.bank.unit === 'USD') due -= centsOfQty(balance);
      balance = 0;
    }
    const over = greater(minus(balance, keptOf(cycle, item, counted)), 0);
    if (compare(over, item.atLeast) < 0) continue;
    happened = true;
    const part = lesser(balance, over);
    if (compare(part, 0) <= 0) continue;
    balance = minus(balance, part);
    if (!pays) continue;
    const amount = rate === null ? centsOfQty(part) : priced(part, 1, rate, cycle.prepared.plan.rounding.money);
    due -= amount;
    if (fee > 0 && amount > 0) due += Math.min(fee, amount);
  }
  // What does not end as a decimal is carried on as the books print it.
  state.balances[at] = typeof balance === 'number' ? balance : qtyOfText(qtyText(balance));
  if (counted) {
    state.usageCycles[at] = happened ? 0 : counted.cycles;
    state.usageKwh[at] = happened ? 0 : counted.kWh;
  }
  return due;
}

function usedOf(of: 'import' | 'load' | 'net', usage: CompiledUsage): number {
  if (of === 'import') return usage.importWh;
  return of === 'net' ? usage.importWh - usage.exportWh : usage.loadWh;
}

/** What a bank is worth after a cycle: dollars at face where they can be spent, kWh at what they will offset, else at what a true-up pays. */
export function bankCentsOf(bank: CompiledBank, state: CompiledState): number {
  const held = keptAt(state.balances, bank.at);
  if (bank.isIncentiveOnly || compare(held, 0) === 0) return 0;
  if (bank.prepared.bank.unit === 'USD') {
    const { offsets, trueUps } = bank.prepared.bank;
    return offsets.length > 0 || trueUps.some((trueUp) => trueUp.action === 'pay') ? roundedCents(held) : 0;
  }
  const { charges, payout } = bank.worth;
  if (charges.length > 0) return charges.reduce((sum, charge) => sum + energyCents(charge, held), 0);
  return payout === null ? 0 : priced(held, 1, payout, 'halfUp');
}
