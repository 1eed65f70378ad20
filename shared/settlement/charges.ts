import { type Cents, cents, dollarsText, sumCents } from '../units/cents.ts';
import type { WorkingInput } from '../working.ts';
import type { Cycle } from './cycle-flows.ts';
import type { LessBank } from './energy-figures.ts';
import { energyPieces } from './energy-pieces.ts';
import { dayInputs, mustPrice } from './energy-share.ts';
import { splitCycle } from './parts.ts';
import { NO_INPUTS, type Piece, pieceCents, pieceQuantity, pieceWorking } from './piece.ts';
import type { PreparedCharge } from './prepare.ts';
import { ONE_UNIT, type Qty, qtyOfText, times } from './quantity.ts';
import { refuse } from './refused.ts';
import type { SettledLine } from './settlement.ts';

/** What other lines come to, for a percent or a floor: USD by charge, and what credits have paid of it. */
export type Owed = { ids: readonly string[]; amounts: readonly Cents[]; paid: Cents };

/** For a charge that goes by no other lines. */
export const NOTHING_OWED: Owed = { ids: [], amounts: [], paid: cents(0) };

/** The pieces of a charge that is a quantity × a rate: kWh, cycle, day, kW, or a percent of other lines. */
function chargePieces(cycle: Cycle, item: PreparedCharge, lessBank: LessBank | null, base: Owed): Piece[] {
  const { charge, pricing, netting } = item;
  const { label } = charge;
  switch (charge.basis) {
    case 'import':
    case 'export':
    case 'production':
    case 'load':
      return energyPieces(cycle, { label, basis: charge.basis, netting, pricing, lessBank });
    case 'cycle':
      return dayShared(cycle, item, ONE_UNIT, '', []);
    case 'day':
      return perDay(cycle, item);
    case 'kW': {
      const kW =
        (charge.kWOf && cycle.usage.kW[charge.kWOf]) ||
        refuse(`${label} goes by kW: the ${charge.kWOf} rating is needed.`);
      const input: WorkingInput = {
        name: 'kW',
        label: `kW (${charge.kWOf})`,
        value: kW,
        unit: 'kW',
        source: { kind: 'figure', name: 'kW' },
      };
      return dayShared(cycle, item, qtyOfText(kW), 'kW * ', [input]);
    }
    // A floor's lines are not a quantity × a rate (`floorLines`), so only a percent is left.
    default:
      return percentOf(cycle, item, base);
  }
}

/** Pieces of a percent of a base in cents, shared by days where the cycle is split. */
export function percentOf(cycle: Cycle, item: PreparedCharge, base: Owed): Piece[] {
  const due = sumCents(base.amounts) - base.paid;
  const inputs = cycle.says ? owedInputs(base) : NO_INPUTS;
  return dayShared(cycle, item, due * 10, base.paid === 0 ? 'sum(lines) * ' : '(sum(lines) - paid) * ', inputs);
}

/** The inputs `lines` and, where credits have paid some, `paid`. */
export function owedInputs(base: Owed): WorkingInput[] {
  const lines: WorkingInput = {
    name: 'lines',
    label: 'Lines it is worked out on',
    value: base.amounts.map(dollarsText),
    unit: 'USD',
    source: { kind: 'figure', name: base.ids.join(', ') },
  };
  if (base.paid === 0) return [lines];
  const source = { kind: 'figure', name: 'credits' } as const;
  return [lines, { name: 'paid', label: 'Paid by credits', value: dollarsText(base.paid), unit: 'USD', source }];
}

/** Pieces of an amount in thousandths that is shared by days between the parts of a split cycle. */
export function dayShared(
  cycle: Cycle,
  item: PreparedCharge,
  amount: Qty,
  before: string,
  inputs: WorkingInput[],
): Piece[] {
  const parts = splitCycle(cycle, item.pricing, false);
  return parts.map((part): Piece => {
    const price = mustPrice(item, item.charge.label, part, null, null);
    const whole = part.days === cycle.days;
    return {
      part,
      split: parts.length > 1,
      period: null,
      tier: null,
      n: whole ? amount : times(amount, part.days),
      d: whole ? 1 : cycle.days,
      unit: item.unit,
      price,
      formula: whole ? before + price.formula : `${before}${price.formula} * days / allDays`,
      inputs: cycle.says ? inputs.concat(price.inputs, whole ? [] : dayInputs(part.days, cycle.days)) : NO_INPUTS,
    };
  });
}

/** Pieces of a charge by the day. */
export function perDay(cycle: Cycle, item: PreparedCharge): Piece[] {
  const parts = splitCycle(cycle, item.pricing, false);
  return parts.map((part): Piece => {
    const price = mustPrice(item, item.charge.label, part, null, null);
    const days: WorkingInput = {
      name: 'days',
      label: 'Days',
      value: String(part.days),
      unit: 'days',
      source: { kind: 'figure', name: 'days' },
    };
    return {
      part,
      split: parts.length > 1,
      period: null,
      tier: null,
      n: part.days * ONE_UNIT,
      d: 1,
      unit: 'day',
      price,
      formula: `days * ${price.formula}`,
      inputs: [days, ...price.inputs],
    };
  });
}

/** The lines of a charge, in order of part, period and tier. */
export function chargeLines(cycle: Cycle, item: PreparedCharge, lessBank: LessBank | null, base: Owed): SettledLine[] {
  const { charge } = item;
  const inDue = !cycle.prepared.taken.has(charge.id);
  return chargePieces(cycle, item, lessBank, base).map((piece): SettledLine => {
    const quantity = pieceQuantity(piece);
    return {
      component: charge.id,
      kind: charge.kind,
      label: charge.label,
      period: piece.period,
      tier: piece.tier,
      from: piece.split ? piece.part.from : null,
      to: piece.split ? piece.part.to : null,
      quantity,
      unit: piece.unit,
      rate: piece.price.rate.text,
      amountCents: pieceCents(cycle, piece),
      inDue,
      working: pieceWorking(cycle, piece, quantity, false),
    };
  });
}
