import type * as z from 'zod/mini';
import type { costBody } from '#shared/api/money.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { dollarsText } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { readCosts } from '../../db/facts/read-money.ts';
import { deleteCost, insertCost } from '../../db/facts/write-money.ts';
import type { Actor, Deps } from '../../deps.ts';
import { newId } from '../../ids.ts';
import { fieldFault } from '../field-fault.ts';
import { writeHousehold } from '../write-household.ts';
import { unknownPaper } from './known-paper.ts';

type MoneyDeps = Pick<Deps, 'db' | 'clock'>;
type CostBody = z.infer<typeof costBody>;

/** Before it no roof was financed; it bounds how many entries one recurring sum can make. */
const FIRST_RECURRING = day('1970-01-01');

/** Records a cost or an income outside the other books, once or recurring. */
export function addCost(deps: MoneyDeps, actor: Actor, body: CostBody): Result<null> {
  const faults = costFaults(deps, actor, body);
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return writeHousehold(deps, actor, { action: 'cost-added', about: aboutOf(body) }, (tx) => {
    insertCost(tx, actor.householdId, { id: newId(), ...body });
    return succeed(null);
  });
}

/** Changes a cost or income: the day a recurring one ends, its paper, a slip of the pen. */
export function changeCost(deps: MoneyDeps, actor: Actor, id: string, body: CostBody): Result<null> {
  const faults = costFaults(deps, actor, body);
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return writeHousehold(deps, actor, { action: 'cost-changed', about: aboutOf(body) }, (tx) => {
    if (!deleteCost(tx, actor.householdId, id)) return fail('not-found', 'This entry is not there any more.');
    insertCost(tx, actor.householdId, { id, ...body });
    return succeed(null);
  });
}

export function removeCost(deps: MoneyDeps, actor: Actor, id: string): Result<null> {
  const known = readCosts(deps.db, actor.householdId).find((cost) => cost.id === id);
  const about = known === undefined ? id : aboutOf(known);
  return writeHousehold(deps, actor, { action: 'cost-removed', about }, (tx) =>
    deleteCost(tx, actor.householdId, id) ? succeed(null) : fail('not-found', 'This entry is not there any more.'),
  );
}

function costFaults(deps: MoneyDeps, actor: Actor, body: CostBody): Fault[] {
  const faults = unknownPaper(deps, actor, body.documentId);
  if (body.every === null) {
    if (body.until !== null) faults.push(fieldFault('until', 'A last day goes with a sum that comes again.'));
    return faults;
  }
  if (body.on < FIRST_RECURRING) {
    faults.push(fieldFault('on', 'A sum that comes again cannot begin before 1970.'));
  }
  if (body.until !== null && body.until < body.on) {
    faults.push(fieldFault('until', 'The last day cannot come before the first.'));
  }
  return faults;
}

function aboutOf({ on, kind, amountCents, every }: Pick<CostBody, 'on' | 'kind' | 'amountCents' | 'every'>): string {
  return `${on} ${kind} ${dollarsText(amountCents)}${every === null ? '' : ` every ${every}`}`;
}
