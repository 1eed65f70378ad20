import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { Db } from '../db/client.ts';
import {
  type HouseholdRow,
  readAssumptions,
  readHouse,
  readHouseholdRow,
  readOpening,
  readPlans,
  readUsageBefore,
} from '../db/facts/read-house.ts';
import {
  readCosts,
  readCredit,
  readIncentive,
  readLease,
  readLoan,
  readMortgage,
  readOtherLoans,
  readScenarios,
} from '../db/facts/read-money.ts';
import { readAccepted, readDocuments, readIntervals, readStatements } from '../db/facts/read-papers.ts';

export type LoadedHousehold = { row: HouseholdRow; facts: HouseholdFacts };

/** Everything a household has stated or uploaded, read in one transaction; null when there is no such household. */
export function loadFacts(db: Db, householdId: string): LoadedHousehold | null {
  return db.transaction((tx) => {
    const row = readHouseholdRow(tx, householdId);
    if (row === null) return null;
    return {
      row,
      facts: {
        house: readHouse(tx, row),
        plans: readPlans(tx, householdId),
        opening: readOpening(row),
        loan: readLoan(tx, householdId),
        otherLoans: readOtherLoans(tx, householdId),
        lease: readLease(tx, householdId),
        mortgage: readMortgage(tx, householdId),
        credit: readCredit(tx, householdId),
        incentive: readIncentive(tx, householdId),
        costs: readCosts(tx, householdId),
        usageBefore: readUsageBefore(tx, householdId),
        documents: readDocuments(tx, householdId),
        statements: readStatements(tx, householdId),
        intervals: readIntervals(tx, householdId),
        accepted: readAccepted(tx, householdId),
        assumptions: readAssumptions(tx, householdId),
        scenarios: readScenarios(tx, householdId),
      },
    };
  });
}
