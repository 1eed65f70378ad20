import type * as z from 'zod/mini';
import type { leaseBody } from '#shared/api/money-other.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { readLease } from '../../db/facts/read-money.ts';
import { writeLease } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { fieldFault } from '../field-fault.ts';
import { writeHousehold } from '../write-household.ts';
import { unknownPaper } from './known-paper.ts';

type MoneyDeps = Pick<Deps, 'db' | 'clock'>;
type LeaseBody = z.infer<typeof leaseBody>;

/** Sets the lease or power-purchase agreement the roof is on. */
export function putLease(deps: MoneyDeps, actor: Actor, body: LeaseBody): Result<null> {
  const faults = [...unknownPaper(deps, actor, body.documentId), ...leaseFaults(body)];
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return writeHousehold(deps, actor, { action: 'lease-set', about: body.company || body.kind }, (tx) => {
    writeLease(tx, actor.householdId, body);
    return succeed(null);
  });
}

export function removeLease(deps: MoneyDeps, actor: Actor): Result<null> {
  return writeHousehold(deps, actor, { action: 'lease-removed', about: '' }, (tx) => {
    if (readLease(tx, actor.householdId) === null) return fail('not-found', 'No lease is entered.');
    writeLease(tx, actor.householdId, null);
    return succeed(null);
  });
}

/** A rise of one half a year is no contract's; beyond it the sums leave what can be counted in cents. */
const MOST_RISE = 0.5;

function leaseFaults({ kind, monthlyCents, ratePerKwh, yearlyRise }: LeaseBody): Fault[] {
  const faults: Fault[] = [];
  if (kind === 'lease') {
    if (monthlyCents === 0) faults.push(fieldFault('monthlyCents', 'Write the payment a month.'));
    if (ratePerKwh !== null) faults.push(fieldFault('ratePerKwh', 'A lease has no price per kWh.'));
  } else {
    if (monthlyCents !== 0) faults.push(fieldFault('monthlyCents', 'Power is paid by the kWh, not by the month.'));
    if (ratePerKwh === null) faults.push(fieldFault('ratePerKwh', 'Write the price per kWh.'));
    else if (Number(ratePerKwh) < 0 || Number(ratePerKwh) > 10) {
      faults.push(fieldFault('ratePerKwh', 'Write a price from 0 to 10 dollars per kWh.'));
    }
  }
  if (Math.abs(Number(yearlyRise)) > MOST_RISE) {
    faults.push(fieldFault('yearlyRise', 'Write a rise a year between −50 and 50 percent.'));
  }
  return faults;
}
