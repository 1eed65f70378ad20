import { type Cents, cents, dollarsText } from '../units/cents.ts';
import type { Working } from '../working.ts';
import { centsOfQty, enter, type Pocket, take } from './bank-state.ts';
import type { Cycle } from './cycle-flows.ts';
import { floorCents } from './floors.ts';
import { UNSAID } from './piece.ts';
import type { PreparedBank } from './prepare.ts';
import type { SettledLine } from './settlement.ts';

/** The cents of each charge's lines, and what USD banks have paid of them. */
export type Ledgered = { amounts: Map<string, number>; paid: Map<string, number> };

/**
 * A USD bank in a cycle: it earns the credits sent to it and pays what its `offsets` lines still owe, in their order; credit stops where the
 * floor of `keepMinimum` would be undercut. Under `belowZero` it takes the lines whole. Gives its `credit` line, if it has one.
 */
export function moveUsdBank(
  cycle: Cycle,
  prepared: PreparedBank,
  pocket: Pocket,
  earned: Cents,
  ledgered: Ledgered,
): SettledLine | null {
  const { bank, floor } = prepared;
  if (bank.sameCycle) enter(pocket, earned * 10, bank.lotLife?.cycles ?? null, cycle.to);
  else pocket.waiting = earned * 10;

  const balance = centsOfQty(pocket.balance);
  let left = bank.belowZero ? Number.POSITIVE_INFINITY : Math.max(balance, 0);
  let room = floor
    ? Math.max(owedOn(floor.charge.on, ledgered) - floorCents(cycle, floor), 0)
    : Number.POSITIVE_INFINITY;
  let used = 0;
  let owed = 0;
  for (const id of bank.offsets) {
    const counted = floor?.charge.on.includes(id) === true;
    const owes = owedOn([id], ledgered);
    const payable = Math.min(bank.belowZero ? owes : Math.max(owes, 0), counted ? room : Number.POSITIVE_INFINITY);
    const pays = Math.min(payable, left);
    owed += payable;
    if (pays === 0) continue;
    ledgered.paid.set(id, (ledgered.paid.get(id) ?? 0) + pays);
    used += pays;
    left -= pays;
    if (counted) room -= pays;
  }
  take(pocket, used * 10, 'used');
  if (bank.offsets.length === 0 || bank.belowZero) return null;
  return {
    component: bank.id,
    kind: 'credit',
    label: bank.label,
    period: null,
    tier: null,
    from: null,
    to: null,
    quantity: null,
    unit: null,
    rate: null,
    amountCents: cents(-used),
    inDue: true,
    working: cycle.says ? paidWorking(prepared, balance, cents(owed)) : UNSAID,
  };
}

function paidWorking({ bank, floor }: PreparedBank, balance: Cents, owed: Cents): Working {
  return {
    words: `the smaller of the bank, $${dollarsText(balance)}, and what it may pay, $${dollarsText(owed)}`,
    formula: '-max(min(balance, owed), 0)',
    inputs: [
      {
        name: 'balance',
        label: `${bank.label}, at hand`,
        value: dollarsText(balance),
        unit: 'USD',
        source: { kind: 'figure', name: bank.id },
      },
      {
        name: 'owed',
        label: floor ? `Owed down to ${floor.charge.label}` : 'Owed by the lines it may pay',
        value: dollarsText(owed),
        unit: 'USD',
        source: { kind: 'figure', name: bank.offsets.join(', ') },
      },
    ],
    unit: 'USD',
    basis: 'computed',
  };
}

/** What a charge's lines come to; nothing for one that is worked out only later. */
export function amountOf(ledgered: Ledgered, id: string): number {
  return ledgered.amounts.get(id) ?? 0;
}

function owedOn(ids: readonly string[], ledgered: Ledgered): number {
  let owed = 0;
  for (const id of ids) owed += amountOf(ledgered, id) - (ledgered.paid.get(id) ?? 0);
  return owed;
}
