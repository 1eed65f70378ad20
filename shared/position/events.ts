import { creditExpected } from '../books/credit-expected.ts';
import { loanClearedOn } from '../books/loan.ts';
import { governingEnd } from '../books/mortgage-insurance.ts';
import { creditEntries } from '../books/tax-credit.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import { type Day, daysBetween } from '../units/day.ts';
import type { PositionEvent } from './position.ts';

export type EventFacts = Pick<HouseholdFacts, 'plans' | 'loan' | 'mortgage' | 'credit' | 'incentive'>;

/** The days that bend the line, past and to come, in order of their dates. */
export function positionEvents(facts: EventFacts, today: Day): PositionEvent[] {
  const events = [
    ...creditEvents(facts, today),
    ...insuranceEvents(facts, today),
    ...loanEvents(facts, today),
    ...planEvents(facts, today),
  ];
  if (facts.incentive) {
    events.push(event(facts.incentive.lastDay, 'Incentive ends', 'incentiveEnd', today));
  }
  return events.sort((a, b) => daysBetween(b.on, a.on));
}

function event(on: Day, label: string, kind: PositionEvent['kind'], today: Day): PositionEvent {
  return { on, label, kind, projected: on > today };
}

function creditEvents({ credit }: EventFacts, today: Day): PositionEvent[] {
  if (!credit) return [];
  const came = creditEntries(credit, today).map((entry) => ({ on: entry.date, word: 'Tax credit' }));
  const toCome = creditExpected(credit, today).map((part) => ({ on: part.on, word: 'Tax credit' }));
  const parts = [...came, ...toCome].sort((a, b) => daysBetween(b.on, a.on));
  return parts.map((part, index) => event(part.on, `${part.word}${partName(index, parts.length)}`, 'credit', today));
}

/** ", first part" … ", last part"; nothing where the credit comes whole. */
function partName(index: number, count: number): string {
  if (count === 1) return '';
  if (index === count - 1) return ', last part';
  const names = ['first', 'second', 'third', 'fourth', 'fifth', 'sixth'];
  return `, ${names[index] ?? `${index + 1}th`} part`;
}

function insuranceEvents({ mortgage }: EventFacts, today: Day): PositionEvent[] {
  const insurance = mortgage?.insurance;
  if (!mortgage || !insurance || insurance.removedOn === null || !insurance.becauseOfRoof) return [];
  const events = [event(insurance.removedOn, 'Mortgage insurance off', 'insurance', today)];
  const end = governingEnd(mortgage);
  if (end.on !== null && end.on > insurance.removedOn) {
    events.push(event(end.on, 'Insurance would have ended', 'insuranceEnd', today));
  }
  return events;
}

function loanEvents({ loan }: EventFacts, today: Day): PositionEvent[] {
  if (!loan) return [];
  const clearedOn = loanClearedOn(loan);
  return clearedOn === null ? [] : [event(clearedOn, 'Loan paid off', 'loanEnd', today)];
}

function planEvents({ plans }: EventFacts, today: Day): PositionEvent[] {
  const inOrder = [...plans].sort((a, b) => daysBetween(b.from, a.from));
  return inOrder.slice(1).map((plan) => event(plan.from, 'New rate plan', 'planChange', today));
}
