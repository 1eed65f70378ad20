import type { SetupStep } from '#shared/api/setup.ts';

export type StepWords = {
  title: string;
  /** One line for the task list: why it asks. */
  why: string;
  /** What it makes possible. */
  leadsTo: string;
  /** The page's own sentence or two. */
  lede: string;
  /** A one-line caution where licensed people or law are concerned. */
  caution: string | null;
};

export const STEP_WORDS: Record<SetupStep, StepWords> = {
  house: {
    title: 'The house',
    why: 'Says when the record begins and where midnight falls.',
    leadsTo: 'The first cycle',
    lede: 'The record begins on the day the utility gave permission to operate. Before that day the roof earned nothing.',
    caution: null,
  },
  roof: {
    title: 'The roof',
    why: 'Says how much the roof should make, so that a fault shows in weeks.',
    leadsTo: 'Energy checks',
    lede: 'Modules and watts give the rating every production figure is held against. The inverter plate gives the most it can send.',
    caution:
      'Read ratings from papers and plates at eye level; leave covers and the roof itself to a licensed electrician.',
  },
  plan: {
    title: 'The rate plan',
    why: 'Says how the utility settles a bill, so that each one can be worked out again.',
    leadsTo: 'The bill, recomputed',
    lede: 'With the utility’s rules in the book, every bill is worked out again and any difference shows, to the cent. The last statement and the rate sheet have all the answers.',
    caution: null,
  },
  before: {
    title: 'Use before the roof',
    why: 'Stands in for production where a month has none.',
    leadsTo: 'Bill avoided, estimated',
    lede: 'Old statements say what the house used before. Where a month has no production figure, its bill without the roof is estimated from these, and called an estimate. Energy only; old dollars are never used.',
    caution: null,
  },
  loan: {
    title: 'The loan',
    why: 'Says what is still owed, the largest figure against the roof.',
    leadsTo: 'Settled today',
    lede: 'The book takes each payment on its day and keeps the payoff balance. Take the figures from the note you signed.',
    caution: 'The lender’s own payoff quote governs; ask for one before you pay the loan off.',
  },
  mortgage: {
    title: 'Mortgage insurance',
    why: 'Counts the premiums you no longer pay because of the roof, and no more than those.',
    leadsTo: 'Insurance avoided',
    lede: 'Where the roof’s added value took mortgage insurance off early, the premiums saved count until the day it would have ended anyway.',
    caution: 'Rules differ by investor and loan. Your servicer decides; nothing here is lending advice.',
  },
  credit: {
    title: 'The tax credit',
    why: 'Carries the federal credit over the returns it takes to use it.',
    leadsTo: 'Tax credit lines',
    lede: 'What the roof cost, line by line, and the day its installation was completed. That day decides the rate, and whether there is a credit at all.',
    caution:
      'The book repeats your figures and does the form’s arithmetic. It is not tax advice and does not say whether you qualify: check against the form for the year, or ask a tax professional.',
  },
  incentive: {
    title: 'The production incentive',
    why: 'Keeps what was earned beside what was paid, until the term ends.',
    leadsTo: 'Incentive owed',
    lede: 'A programme that pays for every kWh the roof makes. What it earned and what arrived are kept apart, so that nothing owed is forgotten.',
    caution: 'Shown before income tax. Ask your preparer how such payments are taxed.',
  },
  cash: {
    title: 'Cash and upkeep',
    why: 'Counts what you paid yourself, at signing and each year since.',
    leadsTo: 'Cash so far',
    lede: 'Money paid at signing and for permits, and what a usual year of upkeep costs. Repairs and rebates are entered on the Money screen as they come.',
    caution: null,
  },
};

export const STATE_WORDS = { open: 'to do', done: 'done', skipped: 'skipped for now' } as const;

/** Steps without which no month can be settled. */
export const NEEDED_FIRST: readonly SetupStep[] = ['house', 'roof', 'plan'];
