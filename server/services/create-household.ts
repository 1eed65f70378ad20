import type { HouseFacts } from '#shared/facts/house.ts';
import { DEFAULT_ASSUMPTIONS } from '#shared/facts/household.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { isTimeZone } from '../clock.ts';
import { insertHousehold, writeAssumptions } from '../db/facts/write-house.ts';
import { memberships } from '../db/schema/people.ts';
import type { Deps } from '../deps.ts';
import { newId } from '../ids.ts';
import { fieldFault } from './field-fault.ts';
import { writeHousehold } from './write-household.ts';

function emptyHouse(name: string, timeZone: string): HouseFacts {
  return {
    name,
    place: '',
    utility: '',
    timeZone,
    latitude: null,
    longitude: null,
    switchOn: null,
    arrays: [],
    inverterAcWatts: null,
    expectedMonthlyWh: null,
    meters: [],
    aggregation: 'none',
  };
}

/** A new household with this user as its owner; everything else is open. */
export function createHousehold(
  deps: Pick<Deps, 'db' | 'clock'>,
  user: { id: string; name: string },
  given: { name: string; timeZone: string },
  options: { sample: boolean } = { sample: false },
): Result<{ id: string }> {
  if (!isTimeZone(given.timeZone)) {
    return fail('invalid-fields', null, [fieldFault('timeZone', 'Choose a time zone such as America/New_York.')]);
  }
  const id = newId();
  const at = deps.clock().toISOString();
  const owner = { userId: user.id, name: user.name, householdId: id, role: 'owner' as const };
  return writeHousehold(deps, owner, { action: 'household-created', about: given.name }, (tx) => {
    insertHousehold(tx, {
      id,
      createdAt: at,
      sample: options.sample,
      house: emptyHouse(given.name, given.timeZone),
      opening: EMPTY_OPENING,
    });
    writeAssumptions(tx, id, DEFAULT_ASSUMPTIONS);
    tx.insert(memberships).values({ householdId: id, userId: user.id, role: 'owner', since: at }).run();
    return succeed({ id });
  });
}
