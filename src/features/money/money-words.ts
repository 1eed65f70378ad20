import type { CostKind } from '#shared/facts/house.ts';

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
