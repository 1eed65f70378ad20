import { wholeBalance } from './bank-state.ts';
import { type Qty, qtyOfText } from './quantity.ts';
import type { Opening } from './settlement.ts';

/**
 * Where a compiled settlement keeps what the utility's books hold: every bank, average and cap has a place of its own in a `CompiledState`, the
 * same for all cycles compiled with these slots.
 */
export type Slots = { banks: Map<string, number>; caps: Map<string, number> };

/** The utility's books in plain numbers: balances in thousandths of their unit, caps in cents. */
export type CompiledState = {
  balances: Qty[];
  usageCycles: number[];
  usageKwh: Qty[];
  capUsed: number[];
};

export function newSlots(): Slots {
  return { banks: new Map(), caps: new Map() };
}

export function slotOf(places: Map<string, number>, name: string): number {
  const known = places.get(name);
  if (known !== undefined) return known;
  places.set(name, places.size);
  return places.size - 1;
}

/** The name of a cap's place: a credit's, over a year or its whole term. */
export function capName(creditId: string, key: string): string {
  return `${creditId} ${key}`;
}

/** The state an opening says, for the slots given out so far. */
export function stateOf(slots: Slots, opening: Opening): CompiledState {
  const state: CompiledState = { balances: [], usageCycles: [], usageKwh: [], capUsed: [] };
  for (const [id, at] of slots.banks) {
    state.balances[at] = wholeBalance(opening.banks[id] ?? '0');
    state.usageCycles[at] = opening.usageSinceTrueUp[id]?.cycles ?? 0;
    state.usageKwh[at] = qtyOfText(opening.usageSinceTrueUp[id]?.kWh ?? '0');
  }
  for (const [name, at] of slots.caps) {
    const [credit = '', key = ''] = name.split(' ');
    state.capUsed[at] = Number(qtyOfText(opening.capUsed[credit]?.[key] ?? '0')) / 10;
  }
  return state;
}
