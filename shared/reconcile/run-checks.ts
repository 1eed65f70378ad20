import type { AcceptedDifference } from '../facts/papers.ts';
import { bankChainChecks } from './bank-checks.ts';
import { amountDueCheck, balanceChainCheck, linesAddUpCheck } from './bill-checks.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { datesChainCheck, daysCheck } from './dates.ts';
import { channelCheck, exportWithinProductionCheck, productionAgainstMonitorCheck } from './energy-checks.ts';
import { linePriceChecks } from './line-checks.ts';
import { readTypeCheck, registersFollowChecks } from './reads.ts';

/** Every check of a cycle, in the order shown, with what the owner accepted. */
export function runChecks(context: CheckContext, accepted: readonly AcceptedDifference[]): Check[] {
  const checks = [
    datesChainCheck(context),
    daysCheck(context),
    ...registersFollowChecks(context),
    readTypeCheck(context),
    channelCheck(context, 'import'),
    channelCheck(context, 'export'),
    exportWithinProductionCheck(context),
    productionAgainstMonitorCheck(context),
    ...linePriceChecks(context),
    ...bankChainChecks(context),
    balanceChainCheck(context),
    linesAddUpCheck(context),
  ];
  checks.push(amountDueCheck(context, checks));
  const own = accepted.filter((one) => one.cycleTo === context.paper.to);
  if (own.length === 0) return checks;
  return checks.map((check) => {
    const found = check.verdict === 'differs' ? own.find((one) => one.check === check.key) : undefined;
    return found ? { ...check, accepted: { note: found.note, by: found.by, on: found.on } } : check;
  });
}
