import type { DayCount } from '../facts/finance.ts';
import { type Cents, cents } from '../units/cents.ts';
import { type Day, daysBetween } from '../units/day.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { days360, type InterestRule, interestRule } from './interest.ts';

/** How a loan's contract counts the days between two dates, and how many make a year. */
export type DayRule = { yearDays: 360 | 365; between(from: Day, to: Day): number };

const RULES: Record<DayCount, DayRule> = {
  '30/360': { yearDays: 360, between: days360 },
  'actual/365': { yearDays: 365, between: daysBetween },
  'actual/360': { yearDays: 360, between: daysBetween },
};

export function dayRule(dayCount: DayCount): DayRule {
  return RULES[dayCount];
}

const interestRules = new Map<DecimalText, InterestRule>();

/** The interest of some days on a balance; none on what is overpaid, and none for days that ran backward. */
export function interestOfDays(balance: Cents, annualRate: DecimalText, dayCount: DayCount, days: number): Cents {
  return ruleOf(annualRate).days(cents(Math.max(0, balance)), Math.max(0, days), dayRule(dayCount).yearDays);
}

/** The interest of a whole month on a balance; none on what is overpaid. */
export function interestOfMonth(balance: Cents, annualRate: DecimalText): Cents {
  return ruleOf(annualRate).month(cents(Math.max(0, balance)));
}

/** Rates are few and asked for by every month of every schedule. */
function ruleOf(annualRate: DecimalText): InterestRule {
  const known = interestRules.get(annualRate);
  if (known) return known;
  const made = interestRule(annualRate);
  if (interestRules.size < 256) interestRules.set(annualRate, made);
  return made;
}
