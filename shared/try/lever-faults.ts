import type { Levers } from '../facts/scenario.ts';
import { sayDate } from '../ledger/say.ts';
import type { ProjectionBasis } from '../position/basis.ts';
import { addMonths, type Day, latestDay } from '../units/day.ts';
import { exact } from '../units/rate.ts';

/** `field` names the lever and its part, `paydown.on`. */
export type LeverFault = { field: string; message: string };

/** Every lever that cannot be pulled on this household, or not on that day, with what to do. */
export function leverFaults(basis: ProjectionBasis, levers: Levers): LeverFault[] {
  const faults: LeverFault[] = [];
  const fault = (field: string, message: string) => faults.push({ field, message });
  const first = latestDay(basis.today, basis.close.on);
  const horizon = addMonths(basis.close.on, basis.facts.assumptions.horizonMonths);
  const day = (field: string, on: Day | undefined) => {
    if (on === undefined) return;
    if (on < first) fault(field, `What was is in the record. Choose a day from ${sayDate(first)} on.`);
    if (on >= horizon) fault(field, `Choose a day before ${sayDate(horizon)}, where the projection ends.`);
  };
  day('paydown.on', levers.paydown?.on);
  day('refinance.on', levers.refinance?.on);
  day('exportCut.from', levers.exportCut?.from);
  day('plan.from', levers.plan?.from);
  day('moreUse.from', levers.moreUse?.from);
  day('replacement.on', levers.replacement?.on);
  day('sale.on', levers.sale?.on);

  const hasLoan = basis.facts.loan !== null;
  if (!hasLoan && levers.paydown) fault('paydown', 'There is no loan to pay down.');
  if (!hasLoan && levers.refinance) fault('refinance', 'There is no loan to refinance.');
  if (!hasLoan && levers.cash) fault('cash', 'There is no loan: the roof was bought with cash.');
  if (levers.cash && levers.paydown) fault('paydown', 'Without the loan there is nothing to pay down.');
  if (levers.cash && levers.refinance) fault('refinance', 'Without the loan there is nothing to refinance.');
  between(fault, 'priceRise', levers.priceRise, '-0.2', '0.2', 'Choose a rise between −20 % and 20 % a year.');
  between(fault, 'degradation', levers.degradation, '0', '0.1', 'Choose a loss between 0 % and 10 % a year.');
  between(fault, 'exportCut.keep', levers.exportCut?.keep ?? null, '0', '1', 'Choose a share between 0 % and 100 %.');
  between(
    fault,
    'refinance.annualRate',
    levers.refinance?.annualRate ?? null,
    '0',
    '0.4',
    'Choose a rate between 0 % and 40 %.',
  );
  if (levers.moreUse && levers.moreUse.whPerDay < 0) fault('moreUse.whPerDay', 'Write the use a day without a minus.');
  return faults;
}

function between(
  fault: (field: string, message: string) => void,
  field: string,
  value: string | null,
  least: string,
  most: string,
  message: string,
): void {
  if (value === null) return;
  const given = exact(value);
  if (given.lt(exact(least)) || given.gt(exact(most))) fault(field, message);
}
