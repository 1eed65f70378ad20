import type { IncentiveReceipt } from '../facts/finance.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import { addDays, type Day } from '../units/day.ts';

/** What a cycle earned, in the programme's sign: below zero where the programme charges. */
export type EarnedCycle = { from: Day; to: Day; earnedCents: Cents };

/** A part of a receipt that pays a part of a cycle. `stated`: the receipt says that it covers the cycle; else it was matched oldest first. */
export type IncentivePart = { receipt: string; on: Day; cycle: Day; amountCents: Cents; stated: boolean };

export type Matched<T> = T & { parts: IncentivePart[]; owedCents: Cents };
export type MatchedReceipt = {
  id: string;
  on: Day;
  amountCents: Cents;
  /** The days it says it covers, brought to the cycles' own dates where it is a day off; null where it says none. */
  cover: { from: Day; to: Day } | null;
  parts: IncentivePart[];
  /** What pays no earned cycle: paid ahead, too much, or a correction downwards. */
  unmatchedCents: Cents;
};
export type IncentiveMatch<T = EarnedCycle> = {
  cycles: Matched<T>[];
  receipts: MatchedReceipt[];
  unmatchedCents: Cents;
};

/** A payer may print the read day or the day before it. */
const SNAP_DAYS = 1;

/**
 * Which receipt pays which cycle. Receipts that state the days they cover pay those cycles, oldest first; the others then pay what is left, oldest earned first.
 * Amounts against the programme's sign (a cycle that earned nothing, a correction) match nothing. Σ parts + unmatched = Σ received, and
 * Σ owed = Σ earned − Σ parts. Cycles in order of their dates, receipts in any.
 */
export function matchIncentive<T extends EarnedCycle>(
  earned: readonly T[],
  received: readonly Pick<IncentiveReceipt, 'id' | 'on' | 'amountCents' | 'from' | 'to'>[],
): IncentiveMatch<T> {
  const sign = sumCents(earned.map((cycle) => cycle.earnedCents)) < 0 ? -1 : 1;
  const cycles = earned.map((cycle) => ({ cycle, parts: [] as IncentivePart[], left: sign * cycle.earnedCents }));
  const order = [...received].sort((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : a.id < b.id ? -1 : 1));
  const receipts = order.map((receipt) => ({
    id: receipt.id,
    on: receipt.on,
    amountCents: receipt.amountCents,
    cover: coverOf(receipt, earned),
    parts: [] as IncentivePart[],
    left: sign * receipt.amountCents,
  }));
  for (const stated of [true, false]) {
    for (const receipt of receipts) {
      const { cover } = receipt;
      if ((cover !== null) !== stated) continue;
      for (const row of cycles) {
        const { from, to } = row.cycle;
        if (cover !== null && (to <= cover.from || from >= cover.to)) continue;
        const paid = Math.min(receipt.left, row.left);
        if (paid <= 0) continue;
        const amountCents = cents(sign * paid);
        const part = { receipt: receipt.id, on: receipt.on, cycle: to, amountCents, stated };
        receipt.parts.push(part);
        row.parts.push(part);
        receipt.left -= paid;
        row.left -= paid;
      }
    }
  }
  return {
    cycles: cycles.map(({ cycle, parts, left }) => ({ ...cycle, parts, owedCents: cents(sign * left) })),
    receipts: receipts.map(({ left, ...receipt }) => ({ ...receipt, unmatchedCents: cents(sign * left) })),
    unmatchedCents: cents(sign * receipts.reduce((sum, receipt) => sum + receipt.left, 0)),
  };
}

function coverOf(
  { from, to }: Pick<IncentiveReceipt, 'from' | 'to'>,
  cycles: readonly { from: Day; to: Day }[],
): { from: Day; to: Day } | null {
  if (from === null || to === null) return null;
  return {
    from: cycles.find((cycle) => isNear(cycle.from, from))?.from ?? from,
    to: cycles.find((cycle) => isNear(cycle.to, to))?.to ?? to,
  };
}

function isNear(a: Day, b: Day): boolean {
  return a >= addDays(b, -SNAP_DAYS) && a <= addDays(b, SNAP_DAYS);
}
