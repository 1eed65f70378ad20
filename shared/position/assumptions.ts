import { creditExpected } from '../books/credit-expected.ts';
import { creditStillToCome } from '../books/tax-credit.ts';
import { DEFAULT_ASSUMPTIONS } from '../facts/household.ts';
import { sayMoney } from '../ledger/say.ts';
import { cents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import { exact } from '../units/rate.ts';
import type { BasisFacts } from './basis.ts';
import type { MonthBasis, MonthlyEnergy } from './monthly-energy.ts';
import type { Projection } from './position.ts';
import { type SharedMonths, sharedAssumptions } from './shared-months.ts';

const OWN = 'Your own figure';

/** What the projection takes for granted, each with where it comes from. */
export function assumptionsOf(
  facts: BasisFacts,
  energy: MonthlyEnergy,
  shared: SharedMonths | null,
  today: Day,
): Projection['assumptions'] {
  const { assumptions } = facts;
  const isDefault = (name: 'degradation' | 'priceRise' | 'discountRate') =>
    exact(assumptions[name]).eq(exact(DEFAULT_ASSUMPTIONS[name]));
  const stated = [
    {
      name: 'degradation',
      label: 'Production lost each year',
      value: percent(assumptions.degradation),
      source: isDefault('degradation') ? 'Median of about 2,000 published rates (Jordan and Kurtz, 2013)' : OWN,
    },
    {
      name: 'priceRise',
      label: 'Rise of the utility’s prices each year, fixed charges and export credits included',
      value: percent(assumptions.priceRise),
      source: isDefault('priceRise') ? 'Near the mean rise of the US residential price, 2010 to 2024 (EIA)' : OWN,
    },
    {
      name: 'horizonMonths',
      label: 'Months projected',
      value: String(assumptions.horizonMonths),
      source:
        assumptions.horizonMonths === DEFAULT_ASSUMPTIONS.horizonMonths
          ? '25 years, the usual output warranty of modules'
          : OWN,
    },
    {
      name: 'upkeepYearlyCents',
      label: 'Upkeep each year',
      value: sayMoney(assumptions.upkeepYearlyCents),
      source: assumptions.upkeepYearlyCents === 0 ? 'None stated' : OWN,
    },
    {
      name: 'production',
      label: 'Production by calendar month',
      value: monthsWords(energy.productionBasis),
      source: 'Mean of your own record, brought to one age',
    },
    {
      name: 'use',
      label: 'Use by calendar month',
      value: monthsWords(energy.useBasis),
      source: 'Your own record of the last twelve months',
    },
    {
      name: 'export',
      label: 'Share of production sent out, by calendar month',
      value: 'as recorded',
      source: 'Export ÷ production of your own record',
    },
    {
      name: 'rules',
      label: 'The plan’s rules, taxes, tier limits and caps',
      value: 'as they are now',
      source: 'Rate plan in force',
    },
  ];
  if (shared) stated.push(...sharedAssumptions(shared));
  stated.push(
    {
      name: 'discountRate',
      label: 'Discount rate each year, for the handbook figures alone',
      value: percent(assumptions.discountRate),
      source: isDefault('discountRate') ? 'A customary rate for savings in buildings; set your own' : OWN,
    },
    {
      name: 'grid',
      label: 'CO₂ of the grid a kWh takes the place of',
      value: `${assumptions.grid.lbPerMwh} lb per MWh`,
      source: `${assumptions.grid.region}, ${assumptions.grid.basis}, ${assumptions.grid.year}`,
    },
  );
  if (facts.incentive) {
    stated.push({
      name: 'incentive',
      label: 'Incentive',
      value: 'what is owed is paid next, then each month’s in the month it is earned, to the end of the term',
      source: 'Incentive terms as entered',
    });
  }
  if (facts.credit) stated.push(creditAssumption(facts.credit, today));
  return stated;
}

function creditAssumption(credit: NonNullable<BasisFacts['credit']>, today: Day) {
  const expected = creditExpected(credit, today).reduce((sum, part) => sum + part.amountCents, 0);
  const left = cents(creditStillToCome(credit, today).amountCents - expected);
  const notPlanned =
    left > 0 ? `; ${sayMoney(left)} has no planned year with a limit and is not projected as cash` : '';
  return {
    name: 'credit',
    label: 'Tax credit',
    value: `${sayMoney(cents(expected))} in the years planned${notPlanned}`,
    source: 'Limits as entered; 15 April after the tax year where no day is entered',
  };
}

function monthsWords(basis: readonly MonthBasis[]): string {
  const count = (one: MonthBasis) => basis.filter((each) => each === one).length;
  const parts: string[] = [`${count('record')} months from the record`];
  if (count('installer') > 0) parts.push(`${count('installer')} from the installer’s estimate, scaled to the record`);
  if (count('before') > 0) parts.push(`${count('before')} from the bills before the roof`);
  if (count('mean') > 0) parts.push(`${count('mean')} at the record’s mean`);
  return parts.join(', ');
}

function percent(fraction: string): string {
  return `${exact(fraction).times(100).toString()} %`;
}
