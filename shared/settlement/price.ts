import { type Cents, cents, parseDollars } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import { ZERO_WH } from '../units/energy.ts';
import type { Working, WorkingInput } from '../working.ts';
import { seasonOf } from './calendar.ts';
import { dayShared, percentOf, perDay } from './charges.ts';
import { type Cycle, openCycle } from './cycle-flows.ts';
import { energyPieces } from './energy-pieces.ts';
import type { EnergyItem } from './energy-share.ts';
import { NO_INPUTS, type Piece, pieceCents, pieceQuantity, pieceWorking, UNSAID } from './piece.ts';
import type { RatePlan } from './plan.ts';
import { type PreparedBank, type PreparedCharge, type PreparedCredit, preparePlan } from './prepare.ts';
import { ONE_UNIT, priced, qtyOfText } from './quantity.ts';
import { priceAt } from './rates-in-force.ts';
import { orRefusal } from './refused.ts';

export type PricedQuantity = { amountCents: Cents; rate: string | null; working: Working };

/** Which of a charge's prices a billed line is at, where the statement says it. */
export type PriceOf = { period: string | null; tier: number | null };

const ANY_PRICE: PriceOf = { period: null, tier: null };

/**
 * What a charge, a credit or a kWh bank's true-up of the plan comes to for a *billed* quantity over `[from, to)`, signed as a line is (credits
 * negative), split by days where a price or season changes inside. `quantity` is in the unit of the charge: kWh, kW, days, cycles, or the base in
 * USD of a percent; null stands for one cycle or all its days. Null where the plan cannot say without more: a floor, kWh priced by a period that
 * is not named, a base or quantity that is missing, a day without a rate. A term or cap of a credit is not applied: the quantity is as billed.
 */
export function priceQuantity(
  plan: RatePlan,
  component: string,
  from: Day,
  to: Day,
  quantity: string | null,
  of: PriceOf = ANY_PRICE,
): PricedQuantity | null {
  return priceSaid(plan, component, from, to, quantity, of, true);
}

/** The same amount by the same arithmetic, without its working: for a check, which words only what differs. */
export function priceAmount(
  plan: RatePlan,
  component: string,
  from: Day,
  to: Day,
  quantity: string | null,
  of: PriceOf = ANY_PRICE,
): Cents | null {
  return priceSaid(plan, component, from, to, quantity, of, false)?.amountCents ?? null;
}

function priceSaid(
  plan: RatePlan,
  component: string,
  from: Day,
  to: Day,
  quantity: string | null,
  of: PriceOf,
  says: boolean,
): PricedQuantity | null {
  const made = orRefusal(() => {
    const prepared = preparePlan(plan);
    const cycle = openCycle(prepared, usageOf(from, to), says);
    const charge = prepared.charge.get(component);
    if (charge) return sumOf(cycle, chargePieces(cycle, charge, quantity, of), false);
    const credit = prepared.credits.find((item) => item.credit.id === component);
    if (credit) return quantity === null ? null : sumOf(cycle, creditPieces(cycle, credit, quantity, of), true);
    const bank = prepared.banks.find((item) => item.bank.id === component);
    return bank && quantity !== null ? trueUpPrice(cycle, bank, quantity, of) : null;
  });
  return made.ok ? made.value : null;
}

const NOTHING = {};
const NO_PAYMENTS: Cycle['usage']['payments'] = [];

function usageOf(from: Day, to: Day): Cycle['usage'] {
  return {
    from,
    to,
    importWh: ZERO_WH,
    exportWh: ZERO_WH,
    productionWh: null,
    loadWh: null,
    byPeriod: null,
    netted: NOTHING,
    kW: NOTHING,
    payments: NO_PAYMENTS,
    finalBill: false,
    intervals: null,
  };
}

function chargePieces(cycle: Cycle, item: PreparedCharge, quantity: string | null, of: PriceOf): Piece[] | null {
  const { basis, label } = item.charge;
  switch (basis) {
    case 'floor':
      return null;
    case 'percent': {
      const base = quantity === null ? null : parseDollars(quantity);
      return base === null ? null : percentOf(cycle, item, { ids: item.charge.on, amounts: [base], paid: cents(0) });
    }
    case 'cycle':
      if (quantity === null || Number(quantity) === 1) return dayShared(cycle, item, ONE_UNIT, '', []);
      return dayShared(cycle, item, qtyOfText(quantity), 'billed * ', [billedInput('billed', quantity, 'cycle')]);
    case 'day':
      if (quantity === null || Number(quantity) === cycle.days) return perDay(cycle, item);
      return dayShared(cycle, item, qtyOfText(quantity), 'billed * ', [billedInput('billed', quantity, 'days')]);
    case 'kW':
      if (quantity === null) return null;
      return dayShared(cycle, item, qtyOfText(quantity), 'kW * ', [billedInput('kW', quantity, 'kW')]);
    default:
      if (quantity === null) return null;
      return energyOf(
        cycle,
        { label, basis, netting: item.netting, pricing: item.pricing, lessBank: null },
        quantity,
        of,
      );
  }
}

function creditPieces(cycle: Cycle, item: PreparedCredit, quantity: string, of: PriceOf): Piece[] | null {
  const { label, basis } = item.credit;
  const energy = { label, basis, netting: item.netting, pricing: item.pricing, lessBank: null };
  return energyOf(cycle, energy, quantity, of);
}

function energyOf(cycle: Cycle, item: EnergyItem, quantity: string, of: PriceOf): Piece[] | null {
  if (item.pricing.byPeriod !== (of.period !== null)) return null;
  const inputs = cycle.says ? [billedInput('kWh', quantity, 'kWh')] : NO_INPUTS;
  const figure = {
    basis: item.basis,
    label: 'Billed',
    period: of.period,
    n: qtyOfText(quantity),
    d: 1,
    top: 'kWh',
    bottom: '',
    inputs,
  };
  return energyPieces(cycle, item, { figure, tier: of.tier });
}

function billedInput(name: string, value: string, unit: string): WorkingInput {
  return { name, label: 'As billed', value, unit, source: { kind: 'figure', name: 'billed quantity' } };
}

function trueUpPrice(cycle: Cycle, item: PreparedBank, quantity: string, of: PriceOf): PricedQuantity | null {
  const paying = item.trueUps.find(({ trueUp }) => trueUp.rates !== null || trueUp.ratesOf !== null);
  const { plan, round } = cycle.prepared;
  const price = paying && priceAt(paying.pricing, cycle.to, seasonOf(plan.calendar, cycle.to), of.period, null);
  if (!price) return null;
  return {
    amountCents: cents(-priced(qtyOfText(quantity), 1, price.rate, plan.rounding.money)),
    rate: price.rate.text,
    working: {
      words: `${quantity} kWh × $${price.rate.text}, rounded to the cent`,
      formula: `-${round}(kWh * ${price.formula})`,
      inputs: [billedInput('kWh', quantity, 'kWh'), ...price.inputs],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

/** Several pieces as one figure: each rounded as a line of its own, their workings added up. */
function sumOf(cycle: Cycle, pieces: readonly Piece[] | null, negative: boolean): PricedQuantity | null {
  const [first] = pieces ?? [];
  if (!pieces || !first) return null;
  const amount = pieces.reduce((sum, piece) => sum + pieceCents(cycle, piece), 0);
  const rate = pieces.every((piece) => piece.price.rate.text === first.price.rate.text) ? first.price.rate.text : null;
  const amountCents = cents(negative ? -amount : amount);
  if (!cycle.says) return { amountCents, rate, working: UNSAID };
  const workings = pieces.map((piece) => pieceWorking(cycle, piece, pieceQuantity(piece), negative));
  return { amountCents, rate, working: addUp(workings) };
}

function addUp(workings: readonly Working[]): Working {
  const [first] = workings;
  if (first && workings.length === 1) return first;
  const inputs: WorkingInput[] = [];
  const terms = workings.map((working, index) => {
    let formula = working.formula;
    for (const input of working.inputs) {
      const name = `${input.name}${index + 1}`;
      inputs.push({ ...input, name });
      formula = formula.replaceAll(new RegExp(`\\b${input.name}\\b`, 'g'), name);
    }
    return formula;
  });
  return {
    words: workings.map((working) => working.words).join(' + '),
    formula: terms.join(' + '),
    inputs,
    unit: 'USD',
    basis: 'computed',
  };
}
