import { type Cents, cents, dollarsText, parseDollars } from '../units/cents.ts';
import { yearOf } from '../units/day.ts';
import type { Working, WorkingInput } from '../working.ts';
import { centsOfQty } from './bank-state.ts';
import type { Cycle } from './cycle-flows.ts';
import { energyPieces } from './energy-pieces.ts';
import { type Piece, pieceCents, pieceQuantity, pieceWords, pieceWorking } from './piece.ts';
import type { Credit } from './plan.ts';
import type { PreparedCredit } from './prepare.ts';
import { qtyOfText } from './quantity.ts';
import { refuse } from './refused.ts';
import type { Payout, SettledLine } from './settlement.ts';
import { termPieces } from './term-pieces.ts';

export type CreditResult = { lines: SettledLine[]; payouts: Payout[]; earned: Cents };

/** USD earned under caps so far, by credit and year (or `term`); a settlement adds to a copy of the opening's. */
export type CapUsed = Record<string, Record<string, string>>;

/** The kWh a credit earns on, priced: a piece for each part and period, within its term. */
export function creditPieces(cycle: Cycle, item: PreparedCredit): Piece[] {
  const { credit, pricing, netting } = item;
  const energy = { label: credit.label, basis: credit.basis, netting, pricing, lessBank: null };
  return credit.term ? termPieces(cycle, energy, credit.term) : energyPieces(cycle, energy);
}

/** A credit in a cycle: lines for the bill or its bank, or payouts; worked out positive, rounded, capped, then negated. */
export function settleCredit(cycle: Cycle, item: PreparedCredit, capUsed: CapUsed): CreditResult {
  const { credit } = item;
  const result: CreditResult = { lines: [], payouts: [], earned: cents(0) };
  const cap = credit.cap ? capOf(cycle, credit, credit.cap, capUsed) : null;
  for (const piece of creditPieces(cycle, item)) {
    const quantity = pieceQuantity(piece);
    const full = pieceCents(cycle, piece);
    const amount = cap && full > cap.left ? cents(Math.max(cap.left, 0)) : full;
    const separate = credit.to === 'separate';
    const working =
      cap && full > 0
        ? cappedWorking(cycle, piece, quantity, cap, !separate)
        : pieceWorking(cycle, piece, quantity, !separate);
    if (cap) cap.left -= amount;
    result.earned = cents(result.earned + amount);
    if (separate) {
      if (amount !== 0) result.payouts.push(payoutOf(credit, quantity, piece.price.rate.text, amount, working));
      continue;
    }
    result.lines.push({
      component: credit.id,
      kind: credit.kind,
      label: credit.label,
      period: piece.period,
      tier: null,
      from: piece.split ? piece.part.from : null,
      to: piece.split ? piece.part.to : null,
      quantity,
      unit: 'kWh',
      rate: piece.price.rate.text,
      amountCents: cents(-amount),
      inDue: credit.to === 'bill',
      working,
    });
  }
  if (cap) capUsed[credit.id] = { ...capUsed[credit.id], [cap.key]: dollarsText(cents(cap.used + result.earned)) };
  return result;
}

function payoutOf(credit: Credit, quantity: string, rate: string, amountCents: Cents, working: Working): Payout {
  return {
    component: credit.id,
    kind: credit.kind,
    label: credit.label,
    quantity,
    unit: 'kWh',
    rate,
    amountCents,
    working,
  };
}

type Cap = { key: string; amount: Cents; used: Cents; left: number };

function capOf(cycle: Cycle, credit: Credit, cap: NonNullable<Credit['cap']>, capUsed: CapUsed): Cap {
  const { id, label } = credit;
  const key = cap.per === 'year' ? String(yearOf(cycle.to)) : 'term';
  const amount = centsOfQty(qtyOfText(cap.amount));
  const used =
    parseDollars(capUsed[id]?.[key] ?? '0') ?? refuse(`What ${label} has earned under its cap is not an amount.`);
  return { key, amount, used, left: amount - used };
}

function cappedWorking(cycle: Cycle, piece: Piece, quantity: string, cap: Cap, negative: boolean): Working {
  const { name, round } = cycle.prepared;
  const left: WorkingInput = {
    name: 'capLeft',
    label: 'Still to be earned under the cap',
    value: dollarsText(cents(Math.max(cap.left, 0))),
    unit: 'USD',
    source: { kind: 'rule', name, version: piece.part.rateDay },
  };
  return {
    words: `${pieceWords(piece, quantity)}, rounded to the cent, no more than $${left.value} still to be earned under the cap`,
    formula: `${negative ? '-' : ''}min(${round}(${piece.formula}), capLeft)`,
    inputs: [...piece.inputs, left],
    unit: 'USD',
    basis: 'computed',
  };
}
