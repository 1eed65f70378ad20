import type { MoneyView } from '#shared/api/money.ts';
import type { InsuranceEndRule } from '#shared/facts/finance.ts';
import type { CostKind } from '#shared/facts/house.ts';
import { fullDate } from '#src/lib/format.ts';

export const COST_KINDS: Record<CostKind, string> = {
  signing: 'cash at signing',
  permit: 'permit',
  repair: 'repair',
  upkeep: 'upkeep',
  insurance: 'home insurance',
  propertyTax: 'property tax',
  appraisal: 'appraisal',
  depositLost: 'deposit lost',
  otherCost: 'other cost',
  rebate: 'rebate',
  stateCredit: 'state credit',
  srec: 'certificate sale (SREC)',
  patronage: 'co-operative patronage',
  otherIncome: 'other income',
};

export const END_RULES: Record<InsuranceEndRule, string> = {
  prudent: 'the first of these',
  request80: '80 percent, on request',
  automatic78: '78 percent, by itself',
  midpoint: 'the middle of the term',
  appreciation: 'the value without the roof',
};

/** Whether and why the insurance is gone, and until when its premium counts. */
export function insuranceStanding(insurance: NonNullable<MoneyView['insurance']>): string {
  const paid = insurance.facts.insurance;
  if (!paid) return 'This mortgage carries no insurance.';
  if (paid.removedOn === null) return 'The insurance is still paid, so the roof has avoided none of it yet.';
  if (!paid.becauseOfRoof)
    return `Gone since ${fullDate(paid.removedOn)}, though not because of the roof; nothing is counted.`;
  const governing = insurance.ends.find((end) => end.rule === insurance.governs);
  const until = governing?.on ? ` It counts until ${fullDate(governing.on)}, when it could have gone anyway.` : '';
  return `Gone since ${fullDate(paid.removedOn)} because of the roof.${until}`;
}
