import type { MortgageFacts } from '../facts/finance.ts';
import { sayCount, sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import type { Day } from '../units/day.ts';
import { plainInput, rule, stated, usdInput } from './inputs.ts';
import { mostCents } from './mortgage-balance.ts';
import { latestValue, ltvPercent, monthsSinceStart } from './mortgage-value.ts';
import type { PaperName } from './paper-source.ts';
import { sourceOfPaper } from './paper-source.ts';

export type ConditionState = 'met' | 'notMet' | 'notStated';

/** One thing an investor's rule asks: how it stands with the figures, and what to do where it is not met or not known. */
export type Condition = {
  id: 'kind' | 'seasoning' | 'value' | 'ratio' | 'payments';
  label: string;
  state: ConditionState;
  words: string;
  next: string | null;
};

/**
 * What an investor's servicing guide would ask to take the insurance off on the home's value of today. `most`: the most the balance may be; null where
 * no share applies yet or no value is stated.
 */
export type CurrentValueRule = {
  state: ConditionState;
  share: string | null;
  percent: string | null;
  most: Figure | null;
  conditions: Condition[];
};

/**
 * The current-value rules of reference/finance.md, table A (Servicing Guide B-8.1-04 and Guide 8203; stored copies of 2017–2023, so the servicer is
 * asked): seasoned two to five years at most 75 %, over five years 80 %, under two years only after improvements and at most 80 %; no payment 30 days
 * late in 12 months nor 60 in 24; two to four units or an investment at most 70 % and over two years. `balance` is what is owed today.
 */
export function currentValueRule(
  mortgage: MortgageFacts,
  balance: Figure,
  given: { today: Day; improvedOn: Day | null; papers: readonly PaperName[] },
): CurrentValueRule {
  const limit = limitOf(mortgage, given.today, given.improvedOn);
  const value = latestValue(mortgage, given.today, true);
  const share = limit.share;
  const most = value === null || share === null ? null : mostFigure(value, share, given.papers);
  const conditions = [
    kind(mortgage),
    seasoning(limit),
    valued(mortgage, given.today),
    ratio(balance, limit, value, most),
    payments(mortgage),
  ];
  return {
    state: worst(conditions),
    share,
    percent: value === null ? null : ltvPercent(balance.amountCents, value.valueCents),
    most,
    conditions,
  };
}

function worst(conditions: readonly Condition[]): ConditionState {
  if (conditions.some((one) => one.state === 'notMet')) return 'notMet';
  return conditions.some((one) => one.state === 'notStated') ? 'notStated' : 'met';
}

function kind(mortgage: MortgageFacts): Condition {
  const label = 'A conventional mortgage';
  if (mortgage.kind === 'conventional') return { id: 'kind', label, state: 'met', words: 'It is one', next: null };
  const words =
    mortgage.kind === 'fha'
      ? 'An FHA loan’s insurance does not come off on a new value'
      : 'A VA loan carries no monthly mortgage insurance';
  const next =
    mortgage.kind === 'fha' ? 'A refinance into a conventional loan ends it; ask a lender what that costs' : null;
  return { id: 'kind', label, state: 'notMet', words, next };
}

type Limit = { share: string | null; words: string; next: string | null };

/** The share that applies today, by age, use of the home and whether the roof is an improvement made since the mortgage began. */
function limitOf(mortgage: MortgageFacts, today: Day, improvedOn: Day | null): Limit {
  const age = monthsSinceStart(mortgage, today);
  const old = `The mortgage is ${sayCount(Math.max(0, age), 'month', 'months')} old`;
  if (mortgage.units > 1 || mortgage.occupancy === 'investment') {
    const use = mortgage.units > 1 ? `a home of ${mortgage.units} units` : 'an investment';
    return age > 24
      ? { share: '0.70', words: `${old}; ${use}: at most 70 %`, next: null }
      : { share: null, words: `${old}; ${use}: over two years are asked`, next: 'Ask again after two years' };
  }
  if (age > 60) return { share: '0.80', words: `${old}, over five years: at most 80 %`, next: null };
  const improved = improvedOn !== null && monthsSinceStart(mortgage, improvedOn) >= 0 && improvedOn <= today;
  if (age >= 24) {
    const next = improved
      ? 'Whether an improvement allows 80 % at this age is not clear from the texts read: ask the servicer'
      : null;
    return { share: '0.75', words: `${old}, two to five years: at most 75 %`, next };
  }
  return improved
    ? {
        share: '0.80',
        words: `${old}, and the roof was added on ${sayDate(improvedOn)}: at most 80 % after an improvement`,
        next: 'Describe the roof to the servicer and ask whether it counts as an improvement',
      }
    : {
        share: null,
        words: `${old}: under two years only an improvement allows it`,
        next: 'Ask again after two years',
      };
}

function seasoning(limit: Limit): Condition {
  return {
    id: 'seasoning',
    label: 'Old enough',
    state: limit.share === null ? 'notMet' : 'met',
    words: limit.words,
    next: limit.next,
  };
}

const HOW = {
  appraisal: 'by an appraisal',
  brokerOpinion: 'by a broker’s opinion',
  ownEstimate: 'by your own estimate',
};

function valued(mortgage: MortgageFacts, today: Day): Condition {
  const label = 'A value the servicer accepts';
  const evidence = latestValue(mortgage, today, true);
  const next = 'Ask the servicer which valuation it accepts, who orders it and what it costs, before you pay for one';
  if (evidence !== null) {
    const words = `${sayMoney(evidence.valueCents)} on ${sayDate(evidence.on)}, ${HOW[evidence.how]}`;
    return { id: 'value', label, state: 'met', words, next: null };
  }
  const own = latestValue(mortgage, today);
  const words =
    own === null ? 'No value is entered' : `${sayMoney(own.valueCents)} is your own estimate, which is no evidence`;
  return { id: 'value', label, state: 'notStated', words, next };
}

function ratio(
  balance: Figure,
  limit: Limit,
  value: { valueCents: Figure['amountCents'] } | null,
  most: Figure | null,
): Condition {
  const id = 'ratio';
  const label = 'Loan-to-value';
  if (limit.share === null) return { id, label, state: 'notStated', words: 'No share applies yet', next: null };
  if (value === null || most === null) {
    return { id, label, state: 'notStated', words: 'Not known without a value', next: null };
  }
  const met = balance.amountCents <= most.amountCents;
  const percent = ltvPercent(balance.amountCents, value.valueCents);
  const words = `${sayMoney(balance.amountCents)} is ${percent} % of ${sayMoney(value.valueCents)}; at most ${limit.share.slice(2)} % is ${sayMoney(most.amountCents)}`;
  const over = sayMoney((balance.amountCents - most.amountCents) as Figure['amountCents']);
  return {
    id,
    label,
    state: met ? 'met' : 'notMet',
    words,
    next: met ? null : `${over} more of principal, or a higher value, would bring it there`,
  };
}

function payments({ latePayments: late }: MortgageFacts): Condition {
  const id = 'payments';
  const label = 'Payment record';
  if (late === null) {
    const next = 'Say below how many payments were late, or ask the servicer for the payment history';
    return { id, label, state: 'notStated', words: 'Not stated', next };
  }
  const met = late.thirtyIn12 === 0 && late.sixtyIn24 === 0;
  const words = met
    ? 'None 30 days late in 12 months, none 60 days late in 24'
    : `${late.thirtyIn12} of 30 days or more in 12 months, ${late.sixtyIn24} of 60 or more in 24; none is allowed`;
  return { id, label, state: met ? 'met' : 'notMet', words, next: met ? null : 'Ask again once the record is clean' };
}

function mostFigure(
  value: { valueCents: Figure['amountCents']; on: Day; documentId: string | null },
  share: string,
  papers: readonly PaperName[],
): Figure {
  const amountCents = mostCents(value.valueCents, share);
  return {
    amountCents,
    working: {
      words: `${share.slice(2)} % of ${sayMoney(value.valueCents)}, the value of ${sayDate(value.on)}`,
      // Half a cent less, rounded: whole cents downwards.
      formula: 'roundCents(value * share - 0.005)',
      inputs: [
        usdInput(
          'value',
          'Value',
          value.valueCents,
          sourceOfPaper(value.documentId, papers, stated('Value as entered')),
        ),
        plainInput('share', 'Share', share, 'fraction', rule('An investor’s servicing guide', 'current-value rule')),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}
