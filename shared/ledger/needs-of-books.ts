import { daysBetween } from '../units/day.ts';
import type { Need } from './need.ts';
import type { NeedsInput } from './needs.ts';
import { sayDate, sayDollars } from './say.ts';

/** A programme is given this long to pay before it is asked after. */
const INCENTIVE_PATIENCE_DAYS = 60;

/** Incentive earned more than two months ago and not received. */
export function owedIncentive({ facts, position, entries, today }: NeedsInput): Need[] {
  const owed = position.settledParts.incentiveOwed.amountCents;
  if (facts.incentive === null || owed <= 0) return [];
  // What came settles the oldest first; the day of the oldest entry not yet covered says how long it is owed.
  let covered = entries
    .filter((entry) => entry.book === 'incentive' && entry.basis === 'cash' && entry.date <= today)
    .reduce((sum, entry) => sum + entry.amountCents, 0);
  for (const entry of entries) {
    if (entry.book !== 'incentive' || entry.basis !== 'memo') continue;
    covered -= entry.amountCents;
    if (covered >= 0) continue;
    const waited = daysBetween(entry.date, today);
    if (waited <= INCENTIVE_PATIENCE_DAYS) return [];
    const payer = facts.incentive.payer === '' ? 'the payer' : facts.incentive.payer;
    return [
      {
        key: 'incentive-owed',
        tone: 'bad',
        title: `${sayDollars(owed)} of production incentive is owed`,
        detail: `The oldest of it was earned by ${sayDate(entry.date)}. Record what came, or ask ${payer}.`,
        link: 'money',
      },
    ];
  }
  return [];
}

/** Tax credit still carried, or a planned return without its limit. */
export function carriedCredit({ facts, creditLines, position }: NeedsInput): Need[] {
  const owed = position.settledParts.creditStillToCome.amountCents;
  if (facts.credit === null) return [];
  const carried = creditLines.findLast((lines) => lines.line16Cents !== null && lines.line16Cents > 0);
  const planned = facts.credit.years
    .filter((year) => year.status === 'planned')
    .sort((a, b) => a.taxYear - b.taxYear)[0];
  if (carried?.line16Cents != null && owed > 0) {
    const next = planned && planned.taxYear > carried.taxYear ? planned.taxYear : carried.taxYear + 1;
    return [
      {
        key: 'credit-carried',
        tone: 'note',
        title: `${sayDollars(carried.line16Cents)} of tax credit is still carried forward`,
        detail: `Planned for tax year ${next}. The summary for your preparer is ready.`,
        link: 'credit',
      },
    ];
  }
  if (planned && planned.limitCents === null && owed > 0) {
    return [
      {
        key: 'credit-limit',
        tone: 'note',
        title: `Tax year ${planned.taxYear} needs its limit, line 14`,
        detail: 'Type it from the return’s worksheet; it is never estimated here.',
        link: 'credit',
      },
    ];
  }
  return [];
}

/** What the set-up lacks without which no cycle can be assembled or settled. Steps left for later are the screen's to name. */
export function missingFacts({ facts }: NeedsInput): Need[] {
  const missing: string[] = [];
  if (facts.house.switchOn === null) missing.push('the switch-on day');
  if (facts.plans.length === 0) missing.push('the rate plan');
  if (missing.length === 0) return [];
  return [
    {
      key: 'set-up',
      tone: 'note',
      title: `The set-up lacks ${missing.join(' and ')}`,
      detail: 'Without it no bill can be worked out again.',
      link: 'setup',
    },
  ];
}
