import type { MortgageView } from '#shared/api/money-mortgage.ts';
import type { Appraisal, InsuranceEndRule } from '#shared/facts/finance.ts';
import type { Cents } from '#shared/units/cents.ts';
import { fullDate, money } from '#src/lib/format.ts';

export const END_RULES: Record<InsuranceEndRule, string> = {
  prudent: 'the first of these',
  request80: '80 percent, on request',
  automatic78: '78 percent, by itself',
  midpoint: 'the middle of the term',
  appreciation: 'the value without the roof',
};

export const VALUE_KINDS: Record<Appraisal['how'], string> = {
  appraisal: 'appraisal',
  brokerOpinion: 'broker’s opinion',
  ownEstimate: 'own estimate',
};

/** Whether and why the insurance is gone, and until when its premium counts. */
export function insuranceStanding({ facts, governs }: MortgageView): string {
  const paid = facts.insurance;
  if (!paid) return 'This mortgage carries no insurance.';
  if (facts.kind === 'va') return 'A VA loan carries no monthly mortgage insurance.';
  if (paid.removedOn === null) return 'The insurance is still paid, so the roof has avoided none of it yet.';
  const gone = `Gone since ${fullDate(paid.removedOn)}`;
  if (!paid.becauseOfRoof) return `${gone}, though not because of the roof; nothing is counted.`;
  const until = governs?.on ? ` It counts until ${fullDate(governs.on)}, when it could have gone anyway.` : '';
  return `${gone} because of the roof.${until}`;
}

/** Percent of a value to two decimals and never downwards, as the server says it. */
export function percentOf(balance: Cents, value: Cents): string {
  return String(Math.ceil((balance * 10_000) / value) / 100);
}

/** What the chart shows, in one or two sentences. */
export function ltvSummary(view: MortgageView): string {
  const dayOf = (rule: InsuranceEndRule) => view.ends.find((end) => end.rule === rule)?.on ?? null;
  const at80 = dayOf('request80');
  const at78 = dayOf('automatic78');
  const parts = [`The balance is ${view.originalPercent} % of the original value.`];
  if (at80 && at78)
    parts.push(`It comes to 80 % on ${fullDate(at80)}, and to 78 % by the initial schedule on ${fullDate(at78)}.`);
  if (view.latest) {
    parts.push(
      `Of the last value stated, ${money(view.latest.valueCents)} on ${fullDate(view.latest.on)}, it is ${view.latest.percent} %.`,
    );
  }
  return parts.join(' ').replaceAll(' %', '\u00a0%');
}
