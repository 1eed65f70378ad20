import { type Cents, cents, dollarsText } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { PreparedBank, PreparedPlan } from './prepare.ts';
import { compare, lesser, minus, plus, type Qty, qtyOfText, qtyText } from './quantity.ts';
import { refuse } from './refused.ts';
import type { Lot, Opening, OpeningBalance, SettledBank } from './settlement.ts';

type HeldLot = { earned: Day; amount: Qty; cyclesLeft: number; fresh: boolean };

/** One balance of a bank (of a period, where it keeps one for each) as it moves through a cycle, in thousandths of its unit. */
export type Pocket = {
  period: string | null;
  open: Qty;
  balance: Qty;
  earned: Qty;
  used: Qty;
  expired: Qty;
  paid: Qty;
  lots: HeldLot[] | null;
  /** Earned in this cycle but entering only at its close. */
  waiting: Qty;
};

export type BankState = { prepared: PreparedBank; pockets: Pocket[] };

/** A bank as the opening holds it; refused where the balance is of a shape the plan cannot keep. */
export function openBank(prepared: PreparedBank, plan: PreparedPlan, opening: Opening, from: Day): BankState {
  const { bank } = prepared;
  const held = opening.banks[bank.id] ?? '0';
  const life = bank.lotLife?.cycles ?? null;
  const open = (period: string | null, amount: Held) => pocketOf(period, amount, bank.unit, life, from);
  if (!bank.byPeriod) {
    if (typeof held === 'string') return { prepared, pockets: [open(null, held)] };
    return { prepared, pockets: [open(null, inLots(held) && life !== null ? held.lots : qtyText(wholeBalance(held)))] };
  }
  if (typeof held === 'string' || inLots(held)) {
    if (compare(wholeBalance(held), 0) !== 0)
      refuse(`${bank.label} keeps a balance for each period: say how much of its opening belongs to each.`);
    return { prepared, pockets: [...plan.period.keys()].map((period) => open(period, '0')) };
  }
  const byPeriod = new Map<string, string | { lots: Lot[] }>(Object.entries(held));
  for (const period of byPeriod.keys())
    if (!plan.period.has(period))
      refuse(`${bank.label} opens with the period ${period}, which the plan does not have.`);
  return {
    prepared,
    pockets: [...plan.period.keys()].map((period) => {
      const amount = byPeriod.get(period) ?? '0';
      if (typeof amount === 'string') return open(period, amount);
      return open(period, life === null ? qtyText(sumLots(amount.lots)) : amount.lots);
    }),
  };
}

type Held = string | readonly Lot[];

function inLots(held: Exclude<OpeningBalance, string>): held is { lots: Lot[] } {
  return Array.isArray(held.lots);
}

/** A balance as one sum: what a bank takes over that was kept by period or in lots under an earlier plan. */
export function wholeBalance(held: OpeningBalance): Qty {
  if (typeof held === 'string') return qtyOfText(held);
  if (inLots(held)) return sumLots(held.lots);
  let sum: Qty = 0;
  for (const amount of Object.values(held)) {
    sum = plus(sum, typeof amount === 'string' ? qtyOfText(amount) : sumLots(amount.lots));
  }
  return sum;
}

function sumLots(lots: readonly Lot[]): Qty {
  return lots.reduce<Qty>((sum, lot) => plus(sum, qtyOfText(lot.amount)), 0);
}

function pocketOf(period: string | null, held: Held, unit: 'kWh' | 'USD', life: number | null, from: Day): Pocket {
  const lots = typeof held === 'string' ? lotsOfBalance(held, life, from) : held.map(heldLot);
  const open = typeof held === 'string' ? qtyOfText(held) : sumLots(held);
  if (unit === 'USD' && (typeof open !== 'number' || open % 10 !== 0)) refuse('A bank in USD opens with whole cents.');
  return { period, open, balance: open, earned: 0, used: 0, expired: 0, paid: 0, lots, waiting: 0 };
}

function heldLot({ earned, amount, cyclesLeft }: Lot): HeldLot {
  return { earned, amount: qtyOfText(amount), cyclesLeft, fresh: false };
}

/** A balance without its lots' ages is taken as one lot that has its whole life before it; null where the bank keeps no lots. */
function lotsOfBalance(held: string, life: number | null, from: Day): HeldLot[] | null {
  if (life === null) return null;
  const amount = qtyOfText(held);
  return compare(amount, 0) === 0 ? [] : [{ earned: from, amount, cyclesLeft: life, fresh: false }];
}

/** Adds what a cycle earned to the balance, as a lot of its own where the bank keeps lots. */
export function enter(pocket: Pocket, amount: Qty, life: number | null, to: Day): void {
  if (compare(amount, 0) === 0) return;
  pocket.earned = plus(pocket.earned, amount);
  pocket.balance = plus(pocket.balance, amount);
  if (life !== null) pocket.lots?.push({ earned: to, amount, cyclesLeft: life, fresh: true });
}

/** Takes an amount out of the balance, oldest lots first. */
export function take(pocket: Pocket, amount: Qty, as: 'used' | 'expired' | 'paid'): void {
  if (compare(amount, 0) === 0) return;
  pocket[as] = plus(pocket[as], amount);
  pocket.balance = minus(pocket.balance, amount);
  if (!pocket.lots) return;
  let left = amount;
  for (const lot of pocket.lots) {
    const part = lesser(lot.amount, left);
    lot.amount = minus(lot.amount, part);
    left = minus(left, part);
  }
  pocket.lots = pocket.lots.filter((lot) => compare(lot.amount, 0) !== 0);
}

/** The close of a cycle: waiting earnings enter, older lots come a cycle nearer to their end and die at it. */
export function closeLots(state: BankState, to: Day): void {
  const life = state.prepared.bank.lotLife?.cycles ?? null;
  for (const pocket of state.pockets) {
    enter(pocket, pocket.waiting, life, to);
    pocket.waiting = 0;
    if (!pocket.lots) continue;
    for (const lot of pocket.lots) if (!lot.fresh) lot.cyclesLeft -= 1;
    for (const lot of pocket.lots) {
      if (lot.cyclesLeft > 0) continue;
      pocket.expired = plus(pocket.expired, lot.amount);
      pocket.balance = minus(pocket.balance, lot.amount);
    }
    pocket.lots = pocket.lots.filter((lot) => lot.cyclesLeft > 0);
  }
}

/** USD of a pocket in cents; a bank in USD holds whole cents. */
export function centsOfQty(value: Qty): Cents {
  return cents(Number(value) / 10);
}

export function settledBanks(state: BankState): SettledBank[] {
  const { bank } = state.prepared;
  const say = bank.unit === 'USD' ? (value: Qty) => dollarsText(centsOfQty(value)) : qtyText;
  return state.pockets.map((pocket) => ({
    bank: bank.id,
    label: bank.label,
    unit: bank.unit,
    period: pocket.period,
    move: {
      open: say(pocket.open),
      earned: say(pocket.earned),
      used: say(pocket.used),
      expired: say(pocket.expired),
      paid: say(pocket.paid),
      close: say(pocket.balance),
    },
    lots: pocket.lots
      ? pocket.lots.map(({ earned, amount, cyclesLeft }) => ({ earned, amount: say(amount), cyclesLeft }))
      : null,
  }));
}

/** What the next cycle opens with, from what this one says. */
export function closingBalance(banks: readonly SettledBank[]): OpeningBalance {
  const balances: Record<string, string> = {};
  const inLots: Record<string, { lots: Lot[] }> = {};
  for (const { period, move, lots } of banks) {
    if (period === null) return lots ? { lots } : move.close;
    if (lots) inLots[period] = { lots };
    else balances[period] = move.close;
  }
  return Object.keys(inLots).length > 0 ? inLots : balances;
}
