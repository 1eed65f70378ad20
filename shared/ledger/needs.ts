import type { Entry } from '../books/book.ts';
import type { CreditLines } from '../books/credit-lines.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import type { Position } from '../position/position.ts';
import type { Day } from '../units/day.ts';
import type { AssembledCycle } from './cycles.ts';
import type { Need } from './need.ts';
import { carriedCredit, missingFacts, owedIncentive } from './needs-of-books.ts';
import { differingCycles, openCycles, productionGaps } from './needs-of-cycles.ts';
import { nextStatement } from './next-statement.ts';

/** As many as a person will look at; what is wrong comes first. */
const MOST_NEEDS = 6;

export type NeedsInput = {
  facts: HouseholdFacts;
  assembled: readonly AssembledCycle[];
  entries: readonly Entry[];
  creditLines: readonly CreditLines[];
  position: Pick<Position, 'settledParts'>;
  today: Day;
};

/** What asks for the owner: wrong things first, then what is next; six at most. */
export function needsOf(input: NeedsInput): Need[] {
  const needs = [
    ...differingCycles(input),
    ...owedIncentive(input),
    ...openCycles(input),
    ...nextStatement(input),
    ...productionGaps(input),
    ...carriedCredit(input),
    ...missingFacts(input),
  ];
  return [...needs.filter((need) => need.tone === 'bad'), ...needs.filter((need) => need.tone === 'note')].slice(
    0,
    MOST_NEEDS,
  );
}
