import type { AcceptedDifference } from '../facts/papers.ts';
import { bankChainChecks } from './bank-checks.ts';
import { amountDueChecks, balanceChainCheck, linesAddUpCheck } from './bill-checks.ts';
import { budgetChainCheck } from './budget-checks.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { daysInRangeCheck } from './cycle-length.ts';
import { datesChainCheck, daysCheck } from './dates.ts';
import { channelCheck, exportWithinProductionCheck, productionAgainstMonitorCheck } from './energy-checks.ts';
import { fileGapsChecks } from './file-gaps.ts';
import { incentivePaidChecks } from './incentive-paid.ts';
import { incentiveQuantityChecks } from './incentive-quantity.ts';
import { linePriceChecks } from './line-checks.ts';
import { productionAtNightChecks } from './night-production.ts';
import { nothingLostChecks } from './nothing-lost.ts';
import { productionExpectedCheck } from './production-expected.ts';
import { readTypeCheck, registersFollowChecks } from './reads.ts';

/** Every check of a cycle, in the order shown, with what the owner accepted. */
export function runChecks(context: CheckContext, accepted: readonly AcceptedDifference[]): Check[] {
  const checks = [
    datesChainCheck(context),
    daysCheck(context),
    daysInRangeCheck(context),
    ...registersFollowChecks(context),
    readTypeCheck(context),
    ...fileGapsChecks(context),
    channelCheck(context, 'import'),
    channelCheck(context, 'export'),
    exportWithinProductionCheck(context),
    productionAgainstMonitorCheck(context),
    ...productionAtNightChecks(context),
    productionExpectedCheck(context),
    ...linePriceChecks(context),
    ...bankChainChecks(context),
    balanceChainCheck(context),
    ...[budgetChainCheck(context)].filter((check) => check !== null),
    linesAddUpCheck(context),
    ...incentiveQuantityChecks(context),
    ...incentivePaidChecks(context),
  ];
  checks.push(...nothingLostChecks(context, checks));
  checks.push(...amountDueChecks(context, checks));
  const own = accepted.filter((one) => one.cycleTo === context.paper.to);
  if (own.length === 0) return checks;
  return checks.map((check) => {
    const found = check.verdict === 'differs' ? own.find((one) => one.check === check.key) : undefined;
    return found ? { ...check, accepted: { note: found.note, by: found.by, on: found.on } } : check;
  });
}
