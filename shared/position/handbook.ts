import type { Entry } from '../books/book.ts';
import { plainInput, stated } from '../books/inputs.ts';
import { sayKwh } from '../ledger/say.ts';
import { keptAt } from '../settlement/place.ts';
import { cents, dollarsText } from '../units/cents.ts';
import { addDays, addMonths, type Day, monthsBetween } from '../units/day.ts';
import { kwhText, type Wh, wh } from '../units/energy.ts';
import { Exact, exact, roundToCents, usdOf } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';
import type { Working, WorkingInput } from '../working.ts';
import type { ProjectionBasis } from './basis.ts';
import { NO_CHANGES } from './changes.ts';
import { paybackYears, presentValue, rateOfReturn } from './economics.ts';
import { loansOf } from './loans.ts';
import { segmentsOf } from './month-heaps.ts';
import { energyOf, type MonthlyEnergy } from './monthly-energy.ts';
import type { Handbook, HandbookColumn, PlainFigure } from './outlook.ts';
import type { PositionPoint, ProjectedMonth } from './position.ts';
import { type ProjectionParts, projectParts } from './project.ts';

export type HandbookInput = {
  basis: ProjectionBasis;
  /** The position's points and its placed entries. */
  points: readonly PositionPoint[];
  entries: readonly Entry[];
};

/** The sums of one year: all of them, and those that are the roof's cost (loan, upkeep, costs, tax credit). */
type Year = { allCents: number; costCents: number };

/**
 * The handbook figures: everything recorded, and the base projection to its horizon, as yearly sums. Year 0 holds what was paid or came before the first cycle;
 * year n the twelve months that end n years after it, counted at their end. What is still owed to lenders at the horizon is paid then. As if cash: no payments to lenders,
 * the loans' principal less dealer fees in year 0. Null while nothing can be projected.
 */
export function handbookOf(input: HandbookInput): Handbook | null {
  const { basis } = input;
  const loans = loansOf(basis.facts);
  const parts = projectParts(basis);
  const cash =
    loans.length === 0 ? null : projectParts(basis, { ...NO_CHANGES, facts: { loan: null, otherLoans: [] } });
  const start = input.points.find((point) => point.cycle === 'before')?.on;
  if (!parts.ok || cash?.ok === false || start === undefined) return null;
  const rate = basis.facts.assumptions.discountRate;
  const energy = energyByYear(basis, parts, start);
  const bought = yearsOf(start, input, parts.months, { withLoans: true });
  const column = (years: readonly Year[], way: string) => columnOf(years, energy.wh, rate, way);
  let asCash: HandbookColumn | null = null;
  if (cash !== null) {
    const years = yearsOf(start, input, cash.months, { withLoans: false });
    const price = loans.reduce((sum, one) => sum + one.principalCents - one.dealerFeeCents, 0);
    addTo(years, 0, -price, -price);
    asCash = column(years, 'as if bought with cash');
  }
  return {
    discountRate: rate,
    years: bought.length - 1,
    estimatedCycles: energy.estimated,
    asBought: column(bought, 'as bought'),
    asCash,
  };
}

/** Which year a day from the start on lies in: n in the n-th twelve months. */
function yearOfDay(start: Day, on: Day): number {
  const years = Math.floor(monthsBetween(start, on) / 12);
  return addMonths(start, 12 * years) <= on ? years + 1 : years;
}

function addTo(years: Year[], at: number, allCents: number, costCents: number): void {
  while (years.length <= at) years.push({ allCents: 0, costCents: 0 });
  const year = keptAt(years, at);
  year.allCents += allCents;
  year.costCents += costCents;
}

function yearsOf(
  start: Day,
  { points, entries }: HandbookInput,
  months: readonly ProjectedMonth[],
  { withLoans }: { withLoans: boolean },
): Year[] {
  const years: Year[] = [];
  const loanPaid = new Map<string, number>();
  for (const entry of entries) {
    if (entry.basis === 'memo' || entry.book !== 'loan' || entry.id.startsWith('lease-')) continue;
    loanPaid.set(entry.cycle, (loanPaid.get(entry.cycle) ?? 0) + entry.amountCents);
  }
  const add = (at: number, { books, addedCents }: Pick<PositionPoint, 'books' | 'addedCents'>, off: number) => {
    addTo(years, at, addedCents - off, books.loan + books.upkeep + books.costs + books.credit - off);
  };
  // A sum of a cycle or month lies in the year that holds its last day.
  for (const point of points) {
    if (point.cycle === 'since') continue;
    const off = withLoans ? 0 : (loanPaid.get(point.cycle) ?? 0);
    add(point.cycle === 'before' ? 0 : yearOfDay(start, addDays(point.on, -1)), point, off);
  }
  for (const month of months) add(yearOfDay(start, addDays(month.on, -1)), month, 0);
  const owed = withLoans ? keptAt(months, months.length - 1).loanPayoffCents : 0;
  addTo(years, years.length - 1, owed, owed);
  return years;
}

/** Production by year in Wh, year 0 without any; a cycle whose production is not known at the record's mean for its days. */
function energyByYear(basis: ProjectionBasis, parts: ProjectionParts, start: Day): { wh: Wh[]; estimated: number } {
  const sums: number[] = [0];
  let estimated = 0;
  const add = (on: Day, amount: number) => {
    const at = yearOfDay(start, addDays(on, -1));
    while (sums.length <= at) sums.push(0);
    sums[at] = keptAt(sums, at) + amount;
  };
  for (const { from, to, productionWh } of basis.cycles) {
    if (productionWh === null) estimated += 1;
    add(to, productionWh ?? meanOver(parts.energy, from, to));
  }
  for (const [at, period] of parts.periods.entries()) add(period.to, keptAt(parts.energies, at).productionWh);
  return { wh: sums.map(wh), estimated };
}

function meanOver(energy: MonthlyEnergy, from: Day, to: Day): number {
  return segmentsOf(from, to).reduce(
    (sum, { month, days }) => sum + energyOf(keptAt(energy.productionPerDay, month), days, new Exact(1)),
    0,
  );
}

function columnOf(years: readonly Year[], energy: readonly Wh[], rate: DecimalText, way: string): HandbookColumn {
  const flows = years.map((year) => usdOf(cents(year.allCents)));
  const flowInput = yearly(
    'flows',
    `Kept or received less paid, ${way}, year 0 to ${years.length - 1}`,
    years,
    'allCents',
  );
  const rateInput = plainInput('rate', 'Discount rate a year', rate, 'fraction', stated('Assumptions'));
  const simple = paybackYears(new Exact(0), flows);
  const discounted = paybackYears(exact(rate), flows);
  const irr = rateOfReturn(flows);
  return {
    simplePayback: plain(
      simple,
      2,
      'years',
      'Years until the sums so far are at zero and stay there',
      'payback(0, flows)',
      [flowInput],
    ),
    discountedPayback: plain(
      discounted,
      2,
      'years',
      'The same with each year’s sum brought to today’s worth',
      'payback(rate, flows)',
      [rateInput, flowInput],
    ),
    rateOfReturn: plain(
      irr,
      4,
      'fraction',
      'The yearly rate at which all sums together are worth nothing today',
      'irr(flows)',
      [flowInput],
    ),
    netPresentValue: {
      amountCents: roundToCents(presentValue(exact(rate), flows)),
      working: working('Each year’s sum brought to the worth of year 0, added', 'roundCents(npv(rate, flows))', 'USD', [
        rateInput,
        flowInput,
      ]),
    },
    costPerKwh: costPerKwh(years, energy, rate, rateInput),
  };
}

function costPerKwh(
  years: readonly Year[],
  energy: readonly Wh[],
  rate: DecimalText,
  rateInput: WorkingInput,
): PlainFigure | null {
  const made = presentValue(
    exact(rate),
    energy.map((amount) => exact(kwhText(amount))),
  );
  if (made.lte(0)) return null;
  const paid = presentValue(
    exact(rate),
    years.map((year) => usdOf(cents(year.costCents))),
  );
  return plain(
    paid.negated().div(made),
    4,
    'USD/kWh',
    'What was paid for the roof, less tax credit and other income, over what it makes, both brought to the worth of year 0',
    '-npv(rate, costs) / npv(rate, production)',
    [
      rateInput,
      yearly('costs', 'Loan, upkeep, costs and tax credit by year', years, 'costCents'),
      {
        name: 'production',
        label: `Production by year, ${sayKwh(energy.reduce<Wh>((sum, one) => wh(sum + one), wh(0)))} kWh in all`,
        value: energy.map(kwhText),
        unit: 'kWh',
        source: stated('The record and the projection'),
      },
    ],
  );
}

function yearly(name: string, label: string, years: readonly Year[], key: keyof Year): WorkingInput {
  return {
    name,
    label,
    value: years.map((year) => dollarsText(cents(year[key]))),
    unit: 'USD',
    source: stated('The record and the projection, by year'),
  };
}

/** A figure rounded to some decimals by its working; null stays null. */
function plain(
  value: Exact | null,
  decimals: number,
  unit: string,
  words: string,
  formula: string,
  inputs: WorkingInput[],
): PlainFigure | null {
  if (value === null) return null;
  return {
    value: value.toDecimalPlaces(decimals, Exact.ROUND_HALF_UP).toString(),
    working: working(words, `roundTo(${formula}, ${decimals})`, unit, inputs),
  };
}

function working(words: string, formula: string, unit: string, inputs: WorkingInput[]): Working {
  return { words, formula, inputs, unit, basis: 'estimated' };
}
