import type { SetupView } from '#shared/api/setup.ts';
import { dcWattsOf } from '#shared/facts/dc-rating.ts';
import {
  readAssumptions,
  readHouse,
  readHouseholdRow,
  readOpening,
  readPlans,
  readSteps,
  readUsageBefore,
} from '../db/facts/read-house.ts';
import { readCosts, readCredit, readIncentive, readLoan, readMortgage } from '../db/facts/read-money.ts';
import type { Deps } from '../deps.ts';

/** The set-up as it stands, read without the papers. Throws when there is no such household. */
export function viewSetup({ db }: Pick<Deps, 'db'>, householdId: string): SetupView {
  return db.transaction((tx) => {
    const row = readHouseholdRow(tx, householdId);
    if (row === null) throw new Error(`no household ${householdId}`);
    const house = readHouse(tx, row);
    return {
      steps: readSteps(tx, householdId),
      house,
      plans: readPlans(tx, householdId),
      opening: readOpening(row),
      usageBefore: readUsageBefore(tx, householdId),
      loan: readLoan(tx, householdId),
      mortgage: readMortgage(tx, householdId),
      credit: readCredit(tx, householdId),
      incentive: readIncentive(tx, householdId),
      costs: readCosts(tx, householdId),
      assumptions: readAssumptions(tx, householdId),
      dcWatts: dcWattsOf(house.arrays),
    };
  });
}
