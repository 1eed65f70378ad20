import type { Cents } from '../units/cents.ts';
import type { Working, WorkingInput } from '../working.ts';
import type { Cycle } from './cycle-flows.ts';
import type { Part } from './parts.ts';
import type { ChargeUnit } from './prepare.ts';
import { priced, type Qty, ratioText } from './quantity.ts';
import type { Price } from './rates-in-force.ts';

/**
 * One quantity at one price: what a line is made of. `n / d` is the quantity in thousandths; `formula` gives quantity × rate in USD,
 * unrounded, from `inputs`.
 */
export type Piece = {
  part: Part;
  /** Whether the cycle is split, so that the line says which part it is. */
  split: boolean;
  period: string | null;
  tier: number | null;
  n: Qty;
  d: Qty;
  unit: ChargeUnit;
  price: Price;
  formula: string;
  inputs: WorkingInput[];
};

export function pieceCents(cycle: Cycle, piece: Piece): Cents {
  return priced(piece.n, piece.d, piece.price.rate, cycle.prepared.plan.rounding.money);
}

export function pieceQuantity(piece: Piece): string {
  return ratioText(piece);
}

/** "498 kWh × $0.1684": the multiplication in words. */
export function pieceWords(piece: Piece, quantity: string): string {
  const { text } = piece.price.rate;
  switch (piece.unit) {
    case 'USD':
      return `${text} of $${quantity}`;
    case 'cycle':
      return quantity === '1' ? `$${text} a cycle` : `$${text} a cycle × ${piece.part.days} days of the cycle’s`;
    case 'day':
      return `${quantity} days × $${text}`;
    default:
      return `${quantity} ${piece.unit} × $${text}`;
  }
}

/** Stands for a working where none is asked for (`Cycle.says`); never handed out. */
export const UNSAID: Working = { words: '', formula: '0', inputs: [], unit: 'USD', basis: 'computed' };

/** The inputs of what says nothing. */
export const NO_INPUTS: WorkingInput[] = [];

/** The working of a piece that is rounded to the cent and signed: credits negative. */
export function pieceWorking(cycle: Cycle, piece: Piece, quantity: string, negative: boolean): Working {
  if (!cycle.says) return UNSAID;
  const { round } = cycle.prepared;
  return {
    words: `${pieceWords(piece, quantity)}, rounded to the cent`,
    formula: negative ? `-${round}(${piece.formula})` : `${round}(${piece.formula})`,
    inputs: piece.inputs,
    unit: 'USD',
    basis: 'computed',
  };
}
