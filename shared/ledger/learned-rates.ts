import type { PlanInForce } from '../facts/household.ts';
import type { PrintedLine } from '../facts/papers.ts';
import type { Charge, RatePlan } from '../settlement/plan.ts';
import type { Day } from '../units/day.ts';
import { decimalTextOf, Exact, exact, usdOf } from '../units/rate.ts';

/** Prices read from bills so far, by charge id: exact decimal text. */
export type LearnedRates = Readonly<Record<string, string>>;

export const NOTHING_LEARNED: LearnedRates = {};

/** Decimals to which a price is worked out from an amount where the bill prints none: enough to come back to the cent. */
const DERIVED_DECIMALS = 10;

/**
 * The prices this bill prints for the plan's riders (`learned` charges); else, where a rider is printed without a price, its amount over its
 * quantity. A rider printed in several parts at different prices is not learned: its parts cannot be told apart from here. What an earlier bill
 * taught holds where this one says nothing.
 */
export function learnRates(
  plan: RatePlan,
  lines: readonly PrintedLine[],
  components: readonly (string | null)[],
  before: LearnedRates,
): LearnedRates {
  let learned: Record<string, string> | null = null;
  for (const charge of plan.charges) {
    if (!charge.learned) continue;
    const rates = new Set(
      lines.flatMap((line, at) => {
        const rate = components[at] === charge.id ? rateOfLine(line) : null;
        return rate === null ? [] : [rate];
      }),
    );
    const [only] = rates;
    if (only === undefined || rates.size > 1 || before[charge.id] === only) continue;
    learned ??= { ...before };
    learned[charge.id] = only;
  }
  return learned ?? before;
}

function rateOfLine(line: PrintedLine): string | null {
  if (line.rate !== null) return decimalTextOf(exact(line.rate));
  if (line.quantity === null || exact(line.quantity).isZero()) return null;
  const rate = usdOf(line.amountCents).div(exact(line.quantity)).toDecimalPlaces(DERIVED_DECIMALS);
  return new Exact(rate).toString();
}

/** The plan with the prices learned in force from a day on; the same object where none of its riders has one. */
export function withLearnedRates(inForce: PlanInForce, learned: LearnedRates, from: Day): PlanInForce {
  const plan = pricedAsLearned(inForce.plan, learned, from);
  const withoutRoof = inForce.withoutRoof === null ? null : pricedAsLearned(inForce.withoutRoof, learned, from);
  if (plan === inForce.plan && withoutRoof === inForce.withoutRoof) return inForce;
  return { ...inForce, plan, withoutRoof };
}

/** One plan with the prices learned for its riders in force from a day on; the same object where it has none of them. */
export function pricedAsLearned(plan: RatePlan, learned: LearnedRates, from: Day): RatePlan {
  if (!plan.charges.some((charge) => charge.learned && learned[charge.id] !== undefined)) return plan;
  return { ...plan, charges: plan.charges.map((charge) => pricedCharge(charge, learned[charge.id], from)) };
}

/** Rows of later days are dropped: a price read from a bill is the one that was charged, whatever was expected. */
function pricedCharge(charge: Charge, rate: string | undefined, from: Day): Charge {
  if (!charge.learned || rate === undefined) return charge;
  return { ...charge, rates: [...charge.rates.filter((row) => row.from < from), { from, rate }] };
}
