import type { Levers } from '../facts/scenario.ts';
import { sayDate, sayDollars, sayKwh, sayMoney, sayMonth } from '../ledger/say.ts';
import { cents } from '../units/cents.ts';
import { type Day, yearOf } from '../units/day.ts';
import { Exact, exact } from '../units/rate.ts';
import type { DecimalText } from '../units/rate-text.ts';
import type { Outcome } from './outcome.ts';

/**
 * What is tried and what it does, in a sentence or two: "Paying $5,505 into the loan on 1 April 2027 and re-amortizing: even in May 2031 instead of January
 * 2032, $3,912 less interest, a payment of $201.10 instead of $244.93." Null where no lever is pulled.
 */
export function differenceSentence(levers: Levers, base: Outcome, changed: Outcome): string | null {
  const pulled = pulledWords(levers);
  if (pulled.length === 0) return null;
  const said = [
    evenWords(base, changed),
    interestWords(base, changed),
    paymentWords(base, changed),
    settledWords(levers, base, changed),
  ].filter((one) => one !== null);
  return `${capital(joined(pulled))}: ${said.join(', ')}.`;
}

function pulledWords(levers: Levers): string[] {
  const { paydown, refinance, exportCut, plan, moreUse, replacement, sale } = levers;
  const words: (string | null)[] = [
    levers.cash ? 'the roof bought with cash' : null,
    paydown &&
      `paying ${sayDollars(paydown.amountCents)} into the loan on ${sayDate(paydown.on)}${paydown.reamortize ? ' and re-amortizing' : ''}`,
    refinance &&
      `refinancing on ${sayDate(refinance.on)} at ${sayPercent(refinance.annualRate)} over ${refinance.termMonths} months`,
    levers.priceRise === null ? null : `prices rising ${sayPercent(levers.priceRise)} a year`,
    exportCut && `export worth ${sayPercent(exportCut.keep)} of today’s credit from ${sayDate(exportCut.from)}`,
    plan && `${plan.plan.name === '' ? 'another rate plan' : plan.plan.name} from ${sayDate(plan.from)}`,
    moreUse && `${sayKwh(moreUse.whPerDay)} kWh more a day from ${sayDate(moreUse.from)}`,
    levers.degradation === null ? null : `production falling ${sayPercent(levers.degradation)} a year`,
    replacement && `${sayDollars(replacement.costCents)} for a replacement on ${sayDate(replacement.on)}`,
    sale && `selling the house on ${sayDate(sale.on)}`,
  ];
  return words.filter((one) => one !== null);
}

function evenWords({ evenOn: before }: Outcome, { evenOn: after }: Outcome): string {
  if (before === null)
    return after === null
      ? 'still not even within the horizon'
      : `even in ${sayYearMonth(after)}, which it was not within the horizon`;
  if (before === after) return `still even in ${sayYearMonth(before)}`;
  if (after === null) return `not even within the horizon instead of in ${sayYearMonth(before)}`;
  return `even in ${sayYearMonth(after)} instead of ${sayYearMonth(before)}`;
}

function sayYearMonth(on: Day): string {
  return `${sayMonth(on)} ${yearOf(on)}`;
}

function interestWords(base: Outcome, changed: Outcome): string | null {
  const less = base.interestCents - changed.interestCents;
  if (less === 0) return null;
  return `${sayDollars(cents(Math.abs(less)))} ${less > 0 ? 'less' : 'more'} interest`;
}

function paymentWords(base: Outcome, changed: Outcome): string | null {
  if (base.paymentCents === null || changed.paymentCents === null || base.paymentCents === changed.paymentCents)
    return null;
  return `a payment of ${sayMoney(changed.paymentCents)} instead of ${sayMoney(base.paymentCents)}`;
}

function settledWords(levers: Levers, base: Outcome, changed: Outcome): string | null {
  const more = changed.settledCents - base.settledCents;
  if (more === 0) return null;
  if (levers.sale) return `${sayDollars(changed.settledCents)} settled on the day of the sale`;
  return `${sayDollars(cents(Math.abs(more)))} ${more > 0 ? 'more' : 'less'} at the end`;
}

function sayPercent(fraction: DecimalText): string {
  return `${exact(fraction).times(100).toDecimalPlaces(3, Exact.ROUND_HALF_UP).toString().replace('-', '−')} %`;
}

function joined(parts: readonly string[]): string {
  return [parts.slice(0, -1).join(', '), ...parts.slice(-1)].filter((part) => part !== '').join(' and ');
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
