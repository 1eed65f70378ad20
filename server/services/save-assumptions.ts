import type { Assumptions } from '#shared/facts/household.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { exact } from '#shared/units/rate.ts';
import { writeAssumptions } from '../db/facts/write-house.ts';
import type { Actor, Deps } from '../deps.ts';
import { fieldFault } from './field-fault.ts';
import { writeHousehold } from './write-household.ts';

/** Puts the owner's assumptions of the projection in place of those that held. They change no figure of the record. */
export function saveAssumptions(deps: Pick<Deps, 'db' | 'clock'>, actor: Actor, body: Assumptions): Result<null> {
  const faults = faultsOf(body);
  if (faults.length > 0) return fail('invalid-fields', null, faults);
  return writeHousehold(deps, actor, { action: 'assumptions-changed', about: '' }, (tx) => {
    writeAssumptions(tx, actor.householdId, body);
    return succeed(null);
  });
}

function faultsOf(body: Assumptions): Fault[] {
  const faults: Fault[] = [];
  const within = (field: string, value: string, least: string, most: string, words: string) => {
    if (exact(value).lt(exact(least)) || exact(value).gt(exact(most))) faults.push(fieldFault(field, words));
  };
  within('degradation', body.degradation, '0', '0.1', 'Write a yearly loss from 0 to 10 percent.');
  within('priceRise', body.priceRise, '-0.1', '0.2', 'Write a yearly rise from \u221210 to 20 percent.');
  within('discountRate', body.discountRate, '0', '0.3', 'Write a discount rate from 0 to 30 percent.');
  within('grid.lbPerMwh', body.grid.lbPerMwh, '0', '4000', 'Write pounds of CO\u2082 per MWh from 0 to 4,000.');
  if (body.grid.year < 1990 || body.grid.year > 2100)
    faults.push(fieldFault('grid.year', 'Write a year such as 2022.'));
  return faults;
}
