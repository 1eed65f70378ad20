import type { LoanFacts, MortgageFacts } from '../facts/finance.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { type Day, daysBetween } from '../units/day.ts';
import type { Condition, CurrentValueRule } from './mortgage-current-value.ts';

/** A line of the checklist toward asking for the removal: what is known and what to do next. */
export type ChecklistLine = {
  id: 'value' | 'balance' | 'payments' | 'liens' | 'letter';
  label: string;
  state: 'ready' | 'open' | 'trouble';
  known: string;
  next: string | null;
};

/** A lender's statement older than this says too little of today's balance (common practice, no source). */
const STATEMENT_DAYS = 62;

/**
 * What a request to take the insurance off rests on (12 U.S.C. 4902(a): written request, good payment history, current; evidence of value and that no
 * subordinate lien encumbers the equity where the holder asks for it).
 */
export function removalChecklist(
  mortgage: MortgageFacts,
  current: CurrentValueRule,
  balance: Figure,
  given: { today: Day; security: LoanFacts['security'] | null },
): ChecklistLine[] {
  const of = (id: Condition['id']) => current.conditions.find((one) => one.id === id);
  return [
    fromCondition('value', 'Appraisal or opinion of value', of('value')),
    balanceLine(mortgage, balance, given.today),
    fromCondition('payments', 'Payment record', of('payments')),
    liensLine(mortgage, given.security),
    letterLine(mortgage),
  ];
}

const STATES = { met: 'ready', notMet: 'trouble', notStated: 'open' } as const;

function fromCondition(id: ChecklistLine['id'], label: string, one: Condition | undefined): ChecklistLine {
  if (one === undefined) throw new Error(`no condition behind the line ${id}`);
  return { id, label, state: STATES[one.state], known: one.words, next: one.next };
}

function balanceLine(mortgage: MortgageFacts, balance: Figure, today: Day): ChecklistLine {
  const last = mortgage.balances
    .filter(({ on }) => on <= today)
    .reduce<Day | null>((latest, { on }) => (latest === null || on > latest ? on : latest), null);
  const owed = sayMoney(balance.amountCents);
  const fresh = last !== null && daysBetween(last, today) <= STATEMENT_DAYS;
  return {
    id: 'balance',
    label: 'Balance',
    state: fresh ? 'ready' : 'open',
    known: last === null ? `${owed} by the schedule` : `${owed}, from the lender’s statement of ${sayDate(last)}`,
    next: fresh ? null : 'Enter the balance of the last mortgage statement: the servicer’s figure decides',
  };
}

/** How the solar loan is secured, in words. */
export const SECURITY_WORDS: Record<LoanFacts['security'], string> = {
  unknown: 'how the solar loan is secured is not stated',
  unsecured: 'the solar loan is unsecured',
  personalProperty: 'the solar loan is secured by the equipment as personal property',
  fixtureFiling: 'the solar loan is secured by a fixture filing',
  secondMortgage: 'the solar loan is secured by a second mortgage',
  propertyAssessment: 'the solar money is repaid with the property tax',
};

/** Securities that can stand on the home's title. */
export const ON_TITLE: readonly LoanFacts['security'][] = ['fixtureFiling', 'secondMortgage', 'propertyAssessment'];

function liensLine({ otherLien }: MortgageFacts, security: LoanFacts['security'] | null): ChecklistLine {
  const line = { id: 'liens', label: 'No other lien on the home' } as const;
  const solar = security === null ? null : SECURITY_WORDS[security];
  if (otherLien === true || (security !== null && ON_TITLE.includes(security))) {
    const known = [otherLien === true ? 'another lien is stated' : null, solar].filter((part) => part !== null);
    const next =
      'A servicer may refuse on a subordinate lien. Ask the lender whether it can be released or subordinated, and the servicer what it accepts';
    return { ...line, state: 'trouble', known: capital(known.join('; ')), next };
  }
  if (otherLien === null || security === 'unknown') {
    const known = [otherLien === null ? 'other liens are not stated' : 'no other lien is stated', solar];
    const next = 'Say below whether there is another lien, and under the loan how it is secured';
    return { ...line, state: 'open', known: capital(known.filter((part) => part !== null).join('; ')), next };
  }
  const known = ['no other lien is stated', solar].filter((part) => part !== null);
  return { ...line, state: 'ready', known: capital(known.join('; ')), next: null };
}

function letterLine({ requestedOn }: MortgageFacts): ChecklistLine {
  return {
    id: 'letter',
    label: 'Request in writing',
    state: requestedOn === null ? 'open' : 'ready',
    known: requestedOn === null ? 'Not sent yet' : `Sent on ${sayDate(requestedOn)}`,
    next:
      requestedOn === null
        ? 'The law asks for it in writing. A letter made from this page comes later; write to the servicer and keep a copy'
        : null,
  };
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
