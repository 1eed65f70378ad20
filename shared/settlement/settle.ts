import { type Result, succeed } from '../problem.ts';
import { type Cents, cents, dollarsText, sumCents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import { lessBank, moveKwhBank, type TakenByCharge } from './bank-kwh.ts';
import { closeLots, closingBalance, openBank, settledBanks } from './bank-state.ts';
import { amountOf, type Ledgered, moveUsdBank } from './bank-usd.ts';
import { chargeLines, NOTHING_OWED, type Owed } from './charges.ts';
import { type CapUsed, settleCredit } from './credits.ts';
import { type Cycle, openCycle } from './cycle-flows.ts';
import { floorLines } from './floors.ts';
import type { RatePlan } from './plan.ts';
import { type PreparedCharge, preparePlan } from './prepare.ts';
import { qtyText } from './quantity.ts';
import { orRefusal } from './refused.ts';
import type { CycleUsage, Opening, Payout, SettledBank, SettledLine, Settlement } from './settlement.ts';
import { countUsage, trueUpBank } from './true-up.ts';

export type SettledCycle = { settlement: Settlement; closing: Opening };

/** A settlement without the workings of its lines. */
export type SettledAmounts = {
  settlement: Omit<Settlement, 'lines' | 'payouts'> & {
    lines: readonly Omit<SettledLine, 'working'>[];
    payouts: readonly Omit<Payout, 'working'>[];
  };
  closing: Opening;
};

/**
 * Settles one billing cycle: lines, banks, payouts and the amount due, and what the next cycle opens with. A pure function of the plan (see
 * the rate plan's own page, “Order in a cycle”), the opening and the usage. Refused (`plan-invalid`, a sentence in `detail`) where the plan
 * cannot hold or the usage lacks what it asks for. A plan object is looked up once and must not be changed in place.
 */
export function settleCycle(plan: RatePlan, opening: Opening, usage: CycleUsage): Result<SettledCycle> {
  return orRefusal(() => settleOpen(openCycle(preparePlan(plan), usage), opening));
}

/** The same by the same arithmetic, without saying how each line came about: for bills nobody reads line by line, as in a projection. */
export function settleAmounts(plan: RatePlan, opening: Opening, usage: CycleUsage): Result<SettledAmounts> {
  return orRefusal(() => settleOpen(openCycle(preparePlan(plan), usage, false), opening));
}

/** Settles cycles one after another, each opening with what the one before closed with. */
export function settle(
  plan: RatePlan,
  opening: Opening,
  usages: readonly CycleUsage[],
): Result<{ settlements: Settlement[]; closing: Opening }> {
  const settlements: Settlement[] = [];
  let held = opening;
  for (const usage of usages) {
    const settled = settleCycle(plan, held, usage);
    if (!settled.ok) return settled;
    settlements.push(settled.value.settlement);
    held = settled.value.closing;
  }
  return succeed({ settlements, closing: held });
}

function settleOpen(cycle: Cycle, opening: Opening): SettledCycle {
  const { prepared, from, to, days } = cycle;
  const states = prepared.banks.map((bank) => openBank(bank, prepared, opening, from));
  const lines: SettledLine[] = [];
  const payouts: Payout[] = [];

  const taken: TakenByCharge = new Map();
  for (const state of states) if (state.prepared.bank.unit === 'kWh') moveKwhBank(cycle, state, taken);

  const ledgered: Ledgered = { amounts: new Map(), paid: new Map() };
  for (const item of prepared.early) {
    const base = item.charge.basis === 'percent' ? baseBefore(cycle, item, ledgered, taken) : NOTHING_OWED;
    const made = chargeLines(cycle, item, lessBank(taken, item.charge.id), base);
    enterLines(item, made, ledgered, lines);
  }

  const capUsed: CapUsed = { ...opening.capUsed };
  const earned = new Map<string, number>();
  for (const item of prepared.credits) {
    const made = settleCredit(cycle, item, capUsed);
    lines.push(...made.lines);
    payouts.push(...made.payouts);
    earned.set(item.credit.to, (earned.get(item.credit.to) ?? 0) + made.earned);
  }

  for (const state of states) {
    const { bank } = state.prepared;
    if (bank.unit !== 'USD') continue;
    for (const pocket of state.pockets) {
      const line = moveUsdBank(cycle, state.prepared, pocket, cents(earned.get(bank.id) ?? 0), ledgered);
      if (line) lines.push(line);
    }
  }

  for (const item of prepared.late) {
    const base = baseAfter(item, ledgered);
    const made = item.charge.basis === 'floor' ? floorLines(cycle, item, base) : chargeLines(cycle, item, null, base);
    enterLines(item, made, ledgered, lines);
  }

  const usageSinceTrueUp = { ...opening.usageSinceTrueUp };
  const banks: SettledBank[] = [];
  const closing: Opening['banks'] = { ...opening.banks };
  for (const state of states) closeLots(state, to);
  for (const state of states) {
    const { id } = state.prepared.bank;
    const usage = countUsage(cycle, state, opening);
    const made = trueUpBank(cycle, state, usage);
    lines.push(...made.lines);
    payouts.push(...made.payouts);
    if (usage) usageSinceTrueUp[id] = { cycles: usage.cycles, kWh: qtyText(usage.kWh) };
    const settled = settledBanks(state);
    banks.push(...settled);
    closing[id] = closingBalance(settled);
  }

  if (opening.balanceCents !== null) lines.push(...accountLines(cycle, opening.balanceCents));
  let due = 0;
  for (const line of lines) if (line.inDue) due += line.amountCents;
  const amountDueCents = cents(due);
  return {
    settlement: { from, to, days, lines, banks, payouts, amountDueCents },
    closing: {
      banks: closing,
      usageSinceTrueUp,
      capUsed,
      balanceCents: opening.balanceCents === null ? null : amountDueCents,
    },
  };
}

function enterLines(
  item: PreparedCharge,
  made: readonly SettledLine[],
  ledgered: Ledgered,
  lines: SettledLine[],
): void {
  let sum = 0;
  for (const line of made) {
    sum += line.amountCents;
    lines.push(line);
  }
  ledgered.amounts.set(item.charge.id, sum);
}

/** What a percent before credits goes by: its lines as they would be had no kWh bank paid. */
function baseBefore(cycle: Cycle, item: PreparedCharge, ledgered: Ledgered, taken: TakenByCharge): Owed {
  const ids = item.charge.on;
  const amounts = ids.map((id) => {
    const of = cycle.prepared.charge.get(id);
    if (!of || !taken.has(id)) return cents(amountOf(ledgered, id));
    return sumCents(chargeLines(cycle, of, null, NOTHING_OWED).map((line) => line.amountCents));
  });
  return { ids, amounts, paid: cents(0) };
}

/** What a percent after credits, or a floor, goes by: its lines less what USD banks have paid of them. */
function baseAfter(item: PreparedCharge, ledgered: Ledgered): Owed {
  const ids = item.charge.on;
  let paid = 0;
  for (const id of ids) paid += ledgered.paid.get(id) ?? 0;
  return { ids, amounts: ids.map((id) => cents(amountOf(ledgered, id))), paid: cents(paid) };
}

/** The account's previous balance and the payments received. */
function accountLines(cycle: Cycle, balance: Cents): SettledLine[] {
  const line = (
    kind: 'previousBalance' | 'payment',
    label: string,
    amount: Cents,
    formula: string,
    on: Day,
  ): SettledLine => ({
    component: 'account',
    kind,
    label,
    period: null,
    tier: null,
    from: null,
    to: null,
    quantity: null,
    unit: null,
    rate: null,
    amountCents: cents(kind === 'payment' ? -amount : amount),
    inDue: true,
    working: {
      words: kind === 'payment' ? `paid on ${on}` : 'amount due of the cycle before',
      formula,
      inputs: [
        { name: 'amount', label, value: dollarsText(amount), unit: 'USD', source: { kind: 'figure', name: 'account' } },
      ],
      unit: 'USD',
      basis: 'computed',
    },
  });
  return [
    line('previousBalance', 'Previous balance', balance, 'amount', cycle.from),
    ...cycle.usage.payments.map(({ on, amountCents }) => line('payment', `Payment, ${on}`, amountCents, '-amount', on)),
  ];
}
