import {
  saveBefore,
  saveCash,
  saveCredit,
  saveHouse,
  saveIncentive,
  saveLoan,
  saveMortgage,
  savePlans,
  saveRoof,
} from '#server/services/save-step.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { must, type TestHousehold, type TestServer } from './test-server.ts';

/** Saves every step of the set-up from a household's facts, through the services. */
export function setUpFrom({ deps }: TestServer, { actor }: TestHousehold, facts: HouseholdFacts): void {
  const { arrays, inverterAcWatts, expectedMonthlyWh, meters, aggregation, ...house } = facts.house;
  must(saveHouse(deps, actor, house));
  must(saveRoof(deps, actor, { arrays, inverterAcWatts, expectedMonthlyWh, meters, aggregation }));
  must(savePlans(deps, actor, { plans: facts.plans, opening: facts.opening }));
  must(saveBefore(deps, actor, { usageBefore: facts.usageBefore }));
  if (facts.loan !== null) {
    const { payments: _, ...loan } = facts.loan;
    must(saveLoan(deps, actor, { loan }));
  }
  must(saveMortgage(deps, actor, { mortgage: facts.mortgage }));
  if (facts.credit !== null) {
    const { years: _, ...credit } = facts.credit;
    must(saveCredit(deps, actor, { credit }));
  }
  if (facts.incentive !== null) {
    const { received: _, ...incentive } = facts.incentive;
    must(saveIncentive(deps, actor, { incentive }));
  }
  must(
    saveCash(deps, actor, {
      costs: facts.costs.filter(({ kind }) => kind === 'signing' || kind === 'permit'),
      upkeepYearlyCents: facts.assumptions.upkeepYearlyCents,
    }),
  );
}
