import { type Cents, cents, dollarsText } from '../units/cents.ts';
import type { Working, WorkingInput } from '../working.ts';
import { type BankState, centsOfQty, type Pocket, take } from './bank-state.ts';
import { seasonOf } from './calendar.ts';
import type { Cycle } from './cycle-flows.ts';
import type { PreparedTrueUp } from './prepare.ts';
import { compare, exactText, lesser, minus, priced, type Qty, qtyText } from './quantity.ts';
import { priceAt } from './rates-in-force.ts';
import { refuse } from './refused.ts';
import type { Payout, SettledLine } from './settlement.ts';

export type TrueUpResult = { lines: SettledLine[]; payouts: Payout[] };

/** A money movement of a true-up: positive to the customer. */
type Payment = {
  label: string;
  period: string | null;
  quantity: string | null;
  rate: string | null;
  amount: Cents;
  working: Working;
};

/** A balance below zero: billed whole in USD, dropped in kWh. */
export function billDebts(state: BankState, result: TrueUpResult): void {
  const { bank } = state.prepared;
  for (const pocket of state.pockets) {
    if (compare(pocket.balance, 0) >= 0) continue;
    if (bank.unit === 'kWh') {
      take(pocket, pocket.balance, 'expired');
      continue;
    }
    const debt = centsOfQty(pocket.balance);
    take(pocket, pocket.balance, 'paid');
    const working = amountWorking(`${bank.label} below zero, billed`, 'balance', 'Balance', debt, bank.id, 'balance');
    result.lines.push(
      lineOf(bank.id, {
        label: `${bank.label}, billed at true-up`,
        period: null,
        quantity: null,
        rate: null,
        amount: debt,
        working,
      }),
    );
  }
}

/** Takes what is over out of the bank, in the order its balances stand, and pays it where the true-up says so. */
export function takeOver(cycle: Cycle, state: BankState, item: PreparedTrueUp, over: Qty, result: TrueUpResult): void {
  const { trueUp } = item;
  const payments: Payment[] = [];
  let left = over;
  for (const pocket of state.pockets) {
    const part = lesser(pocket.balance, left);
    if (compare(part, 0) <= 0) continue;
    const before = pocket.balance;
    left = minus(left, part);
    take(pocket, part, trueUp.action === 'pay' ? 'paid' : 'expired');
    if (trueUp.action === 'pay') payments.push(paymentOf(cycle, state, item, pocket, part, before));
  }
  const paid = payments.reduce((sum, payment) => sum + payment.amount, 0);
  const fee = centsOfQty(item.fee);
  if (fee > 0 && paid > 0) payments.push(feeOf(state, fee, cents(paid)));
  for (const payment of payments) {
    if (payment.amount === 0) continue;
    const { id } = state.prepared.bank;
    if (trueUp.to === 'separate') result.payouts.push(payoutOf(id, payment));
    else result.lines.push(lineOf(id, payment));
  }
}

function paymentOf(
  cycle: Cycle,
  state: BankState,
  item: PreparedTrueUp,
  pocket: Pocket,
  part: Qty,
  before: Qty,
): Payment {
  const { bank } = state.prepared;
  const label = `${bank.label}, paid at true-up`;
  if (bank.unit === 'USD') {
    const amount = centsOfQty(part);
    const kept = centsOfQty(minus(before, part));
    const working = amountWorking(
      `${bank.label} at the true-up`,
      'balance',
      'Balance',
      cents(amount + kept),
      bank.id,
      'balance',
    );
    if (kept !== 0) {
      working.formula = 'balance - kept';
      working.inputs.push(usdInput('kept', 'Stays in the bank', kept, bank.id));
    }
    return { label, period: pocket.period, quantity: null, rate: null, amount, working };
  }
  const { plan, round } = cycle.prepared;
  const price = priceAt(item.pricing, cycle.to, seasonOf(plan.calendar, cycle.to), pocket.period, null);
  if (!price) return refuse(`${bank.label} has no true-up rate in force on ${cycle.to}.`);
  const quantity = qtyText(part);
  const kWh: WorkingInput = {
    name: 'kWh',
    label: `${bank.label}, paid`,
    value: exactText(part),
    unit: 'kWh',
    source: { kind: 'figure', name: bank.id },
  };
  return {
    label,
    period: pocket.period,
    quantity,
    rate: price.rate.text,
    amount: priced(part, 1, price.rate, plan.rounding.money),
    working: {
      words: `${quantity} kWh × $${price.rate.text}, rounded to the cent`,
      formula: `${round}(kWh * ${price.formula})`,
      inputs: [kWh, ...price.inputs],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

function feeOf(state: BankState, fee: Cents, paid: Cents): Payment {
  const { bank } = state.prepared;
  const working = amountWorking(
    'the true-up fee, no more than the payment',
    'fee',
    'Fee',
    fee,
    bank.id,
    '-min(fee, payment)',
  );
  working.inputs.push(usdInput('payment', 'True-up payment', paid, bank.id));
  return {
    label: `${bank.label}, true-up fee`,
    period: null,
    quantity: null,
    rate: null,
    amount: cents(-Math.min(fee, paid)),
    working,
  };
}

function usdInput(name: string, label: string, amount: Cents, bankId: string): WorkingInput {
  return { name, label, value: dollarsText(amount), unit: 'USD', source: { kind: 'figure', name: bankId } };
}

function amountWorking(
  words: string,
  name: string,
  label: string,
  amount: Cents,
  bankId: string,
  formula: string,
): Working {
  return { words, formula, inputs: [usdInput(name, label, amount, bankId)], unit: 'USD', basis: 'computed' };
}

function payoutOf(component: string, payment: Payment): Payout {
  const { label, quantity, rate, amount, working } = payment;
  return {
    component,
    kind: 'trueup',
    label,
    quantity,
    unit: quantity === null ? null : 'kWh',
    rate,
    amountCents: amount,
    working,
  };
}

/** On the bill what is positive to the customer is negative. */
function lineOf(component: string, payment: Payment): SettledLine {
  const { period, working, amount, ...said } = payment;
  return {
    ...said,
    component,
    kind: 'trueup',
    period,
    tier: null,
    from: null,
    to: null,
    unit: said.quantity === null ? null : 'kWh',
    amountCents: cents(-amount),
    inDue: true,
    working: { ...working, formula: `-(${working.formula})` },
  };
}
