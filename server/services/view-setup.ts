import type { SetupView } from '#shared/api/setup.ts';
import { readSteps } from '../db/facts/read-house.ts';
import type { Deps } from '../deps.ts';
import { loadFacts } from './load-facts.ts';

/** The set-up as it stands. Throws when there is no such household. */
export function viewSetup({ db }: Pick<Deps, 'db'>, householdId: string): SetupView {
  const loaded = loadFacts(db, householdId);
  if (loaded === null) throw new Error(`no household ${householdId}`);
  const { facts } = loaded;
  return {
    steps: readSteps(db, householdId),
    house: facts.house,
    plans: facts.plans,
    opening: facts.opening,
    usageBefore: facts.usageBefore,
    loan: facts.loan,
    mortgage: facts.mortgage,
    credit: facts.credit,
    incentive: facts.incentive,
    costs: facts.costs,
    assumptions: facts.assumptions,
    dcWatts: facts.house.arrays.reduce((sum, array) => sum + array.modules * array.moduleWatts, 0),
  };
}
