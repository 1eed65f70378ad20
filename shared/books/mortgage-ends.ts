import type { InsuranceEndRule, MortgageFacts } from '../facts/finance.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import type { Day } from '../units/day.ts';
import { plainInput, rule, stated, usdInput } from './inputs.ts';
import {
  amortizationMidpoint,
  lastPaymentBy,
  mortgageBook,
  mortgagePaymentDay,
  mostCents,
  paymentReaching,
} from './mortgage-balance.ts';

/**
 * A day on which the insurance could have gone without the roof. `payment`: the last premium would have been due with this payment of the
 * mortgage; 0 when the insurance was never due. Null where the rule does not apply or its day is not known.
 */
export type InsuranceEnd = {
  rule: InsuranceEndRule;
  on: Day | null;
  payment: number | null;
  /** What the day rests on: the schedule made at the start, or the payments as made. */
  by: 'schedule' | 'actual payments' | 'initial schedule' | null;
  words: string;
  /** Section of the law the rule stands in; null for the owner's own day. */
  source: string | null;
  /** The most the balance may be under the rule, of the original value; null where the rule has no such sum. */
  most: Figure | null;
};

/** The end that counts; `rule` is null where the mortgage's own end, or none of the rules, decides. */
export type GoverningEnd = { rule: InsuranceEndRule | null; on: Day | null; payment: number; words: string };

/** FHA insurance of a loan at or under 90 % of the value ends after eleven years (from memory; ask the servicer). */
const FHA_PERCENT = 90;
const FHA_PAYMENTS = 132;

/**
 * When each rule would have ended the insurance: 12 U.S.C. 4901(2) (balance first scheduled, or by actual payments, to reach 80 % of the original
 * value: on request), 4902(b) (78 % by the initial schedule: automatic; extra payments do not move it), 4902(c) (first of the month after the
 * midpoint of the amortization), and the owner's own day of appreciation. The Act covers conventional loans only.
 */
export function insuranceEnds(mortgage: MortgageFacts): InsuranceEnd[] {
  if (mortgage.kind !== 'conventional') return notCovered(mortgage.kind);
  return [request80(mortgage), automatic78(mortgage), midpoint(mortgage), appreciation(mortgage)];
}

function request80(mortgage: MortgageFacts): InsuranceEnd {
  const { initial, actual } = mortgageBook(mortgage);
  const scheduled = paymentReaching(mortgage, initial, '0.80');
  const paid = paymentReaching(mortgage, actual, '0.80');
  const byPayments = paid < scheduled;
  const how = byPayments ? 'by actual payments' : 'by the initial schedule';
  const words = `On request, when the balance reaches 80 % of the original value ${how}`;
  return byPayments
    ? end(mortgage, 'request80', paid, 'actual payments', words)
    : end(mortgage, 'request80', scheduled, 'schedule', words);
}

function automatic78(mortgage: MortgageFacts): InsuranceEnd {
  const payment = paymentReaching(mortgage, mortgageBook(mortgage).initial, '0.78');
  const words = 'By itself, when the initial schedule reaches 78 % of the original value';
  return end(mortgage, 'automatic78', payment, 'initial schedule', words);
}

function midpoint(mortgage: MortgageFacts): InsuranceEnd {
  const middle = amortizationMidpoint(mortgage);
  return {
    rule: 'midpoint',
    on: middle.firstOfNextMonth,
    payment: middle.payment,
    by: 'initial schedule',
    source: '12 U.S.C. 4902(c)',
    most: null,
    words: `In any case on ${sayDate(middle.firstOfNextMonth)}, the first of the month after the middle of the term`,
  };
}

function appreciation(mortgage: MortgageFacts): InsuranceEnd {
  const on = mortgage.insurance?.appreciationOn ?? null;
  return {
    rule: 'appreciation',
    on,
    payment: on === null ? null : lastPaymentBy(mortgage, on),
    by: null,
    source: null,
    most: null,
    words:
      on === null
        ? 'No day stated on which the home’s value alone, without the roof, would have been enough'
        : `On ${sayDate(on)}, when the home’s value alone would have been enough, as you stated`,
  };
}

type Basis = NonNullable<InsuranceEnd['by']>;
type ShareRule = 'request80' | 'automatic78';

const SHARES: Record<ShareRule, { share: string; source: string }> = {
  request80: { share: '0.80', source: '12 U.S.C. 4901(2), 4902(a)' },
  automatic78: { share: '0.78', source: '12 U.S.C. 4902(b)' },
};

function end(mortgage: MortgageFacts, ruleId: ShareRule, payment: number, by: Basis, reached: string): InsuranceEnd {
  const on = mortgagePaymentDay(mortgage, payment);
  const when = payment === 0 ? 'at the start' : `with payment ${payment} on ${sayDate(on)}`;
  return {
    rule: ruleId,
    on,
    payment,
    by,
    words: `${reached}: ${when}`,
    source: SHARES[ruleId].source,
    most: mostFigure(mortgage, ruleId, payment, by),
  };
}

/** The threshold in dollars, with the balances around it: whole cents not above the share of the original value. */
function mostFigure(mortgage: MortgageFacts, ruleId: ShareRule, payment: number, by: Basis): Figure {
  const { share, source } = SHARES[ruleId];
  const value = mortgage.originalValueCents;
  const amountCents = mostCents(value, share);
  const rows = by === 'actual payments' ? mortgageBook(mortgage).actual : mortgageBook(mortgage).initial;
  const after = (number: number) => rows[number - 1]?.balanceCents ?? mortgage.principalCents;
  const around =
    payment === 0
      ? ''
      : `. The balance is ${sayMoney(after(payment - 1))} before payment ${payment} and ${sayMoney(after(payment))} after it`;
  return {
    amountCents,
    working: {
      words: `${share.slice(2)} % of the original value ${sayMoney(value)}, not above ${sayMoney(amountCents)}${around}`,
      // Half a cent less, rounded: whole cents downwards.
      formula: 'roundCents(value * share - 0.005)',
      inputs: [
        usdInput('value', 'Original value', value, stated('Mortgage as entered')),
        plainInput('share', 'Share', share, 'fraction', rule('Homeowners Protection Act', source)),
        usdInput('after', `Balance after payment ${payment}`, after(payment), stated('Mortgage schedule')),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

function notCovered(kind: 'fha' | 'va'): InsuranceEnd[] {
  const words =
    kind === 'va'
      ? 'A VA loan carries no monthly mortgage insurance'
      : 'The law on cancelling mortgage insurance does not cover FHA loans';
  const rules: InsuranceEndRule[] = ['request80', 'automatic78', 'midpoint', 'appreciation'];
  return rules.map((one) => ({
    rule: one,
    on: null,
    payment: null,
    by: null,
    source: null,
    most: null,
    words:
      kind === 'fha' && one === 'appreciation'
        ? 'An appraisal does not take FHA insurance off; a refinance does (from memory; ask the servicer)'
        : words,
  }));
}

/**
 * The day to which the insurance avoided is counted: the owner's rule, or the prudent one (the first of all that apply; also where the chosen rule
 * has no day), and never past a refinance, sale or payoff.
 */
export function governingEnd(mortgage: MortgageFacts): GoverningEnd {
  const byRule = ruleEnd(mortgage);
  const endedOn = mortgage.endedOn;
  if (endedOn === null) return byRule;
  const payment = lastPaymentBy(mortgage, endedOn);
  if (byRule.payment <= payment) return byRule;
  return {
    rule: null,
    on: endedOn,
    payment,
    words: `The mortgage ended on ${sayDate(endedOn)}, and its insurance with it`,
  };
}

function ruleEnd(mortgage: MortgageFacts): GoverningEnd {
  if (mortgage.kind === 'va') {
    return { rule: null, on: null, payment: 0, words: 'A VA loan carries no monthly mortgage insurance' };
  }
  if (mortgage.kind === 'fha') return fhaEnd(mortgage);
  const chosen = mortgage.insurance?.endRule ?? 'prudent';
  const ends = insuranceEnds(mortgage).flatMap((one): GoverningEnd[] =>
    one.payment === null ? [] : [{ ...one, payment: one.payment }],
  );
  const picked = ends.find((one) => one.rule === chosen);
  if (picked) return picked;
  // There is always a midpoint, so that there is always a first.
  const first = ends.reduce((least, one) => (one.payment < least.payment ? one : least));
  return chosen === 'prudent' ? first : { ...first, words: `${first.words}. The rule you chose has no day yet` };
}

function fhaEnd(mortgage: MortgageFacts): GoverningEnd {
  const atMost90 = mortgage.principalCents * 100 <= mortgage.originalValueCents * FHA_PERCENT;
  const payment = atMost90 ? Math.min(FHA_PAYMENTS, mortgage.termMonths) : mortgage.termMonths;
  return {
    rule: null,
    on: mortgagePaymentDay(mortgage, payment),
    payment,
    words: atMost90
      ? 'FHA insurance on a loan that began at or under 90 % of the value ends after eleven years (from memory; ask the servicer)'
      : 'FHA insurance on a loan that began over 90 % of the value stays for its whole term (from memory; ask the servicer)',
  };
}
