import type { CreditView } from '#shared/api/credit.ts';
import { type CreditSummary, creditSummary } from '#shared/books/credit-summary.ts';
import type { CreditVintage } from '#shared/books/credit-vintages.ts';
import type { CreditFacts } from '#shared/facts/finance.ts';
import type { Day } from '#shared/units/day.ts';
import { exact } from '#shared/units/rate.ts';
import type { Actor, Deps } from '../../deps.ts';
import { type HouseholdLedger, ledgerOf } from '../ledger-of.ts';
import { creditViewOf } from './view-credit.ts';

/** What both the file and the pages of the preparer's summary are made of: facts and the day alone, so that the same input gives the same paper. */
export type SummaryFacts = {
  household: string;
  place: string;
  madeOn: Day;
  madeBy: string;
  credit: CreditFacts | null;
  view: CreditView;
  summary: CreditSummary | null;
};

export function summaryFacts(
  deps: Pick<Deps, 'db' | 'clock'>,
  { householdId, name }: Pick<Actor, 'householdId' | 'name'>,
): SummaryFacts {
  return summaryFactsOf(ledgerOf(deps, householdId), name);
}

/** The same from facts and ledger alone. */
export function summaryFactsOf(household: Omit<HouseholdLedger, 'row'>, madeBy: string): SummaryFacts {
  const { facts, today } = household;
  return {
    household: facts.house.name,
    place: facts.house.place,
    madeOn: today,
    madeBy,
    credit: facts.credit,
    view: creditViewOf(household),
    summary: facts.credit === null ? null : creditSummary(facts.credit),
  };
}

/** "0.30" → "30 %" */
export function percentText(rate: string): string {
  return `${exact(rate).times(100).toString()} %`;
}

/** What became of the costs of one year. */
export const VINTAGE_STATES: Record<CreditVintage['state'], string> = {
  counts: 'enters line 1 of its year',
  noCredit: 'no credit in this year',
  inCarriedIn: 'inside what was carried in',
};

export const STATUS_WORDS: Record<'planned' | 'filed' | 'amended' | 'notListed', string> = {
  planned: 'planned, figures expected',
  filed: 'filed',
  amended: 'amended',
  notListed: 'return not entered',
};

/** Where a limit comes from: the worksheet as its owner named it, who typed it, and the kept return. */
export function limitWords(year: CreditSummary['years'][number], view: CreditView): string {
  if (year.lines.line14Cents === null) return 'not entered yet';
  const paper = view.papers.find(({ id }) => id === year.documentId);
  return [
    year.limitFrom ?? 'worksheet not named',
    year.limitTypedBy === null ? null : `typed by ${year.limitTypedBy}`,
    paper === undefined ? null : `paper: ${paper.fileName}`,
  ]
    .filter((part) => part !== null)
    .join('; ');
}
