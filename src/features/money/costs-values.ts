import { type CostFacts, type CostKind, INCOME_KINDS } from '#shared/facts/house.ts';
import { type Cents, cents, dollarsText, negateCents, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';
import { fullDate } from '#src/lib/format.ts';
import type { CostBody } from './other-queries.ts';

export type CostValues = {
  on: string;
  kind: CostKind;
  label: string;
  amountCents: string;
  every: 'once' | 'month' | 'quarter' | 'year';
  until: string;
  documentId: string;
};

const NO_DATE = 'Write a date that exists.';
const SOME_DAY = '1970-01-01' as Day;

/** A cost as a person would type it; a new one is dated today. */
export function costValues(cost: CostFacts | null, today: string): CostValues {
  return {
    on: cost?.on ?? today,
    kind: cost?.kind ?? 'upkeep',
    label: cost?.label ?? '',
    amountCents: cost === null ? '' : dollarsText(cost.amountCents),
    every: cost?.every ?? 'once',
    until: cost?.until ?? '',
    documentId: cost?.documentId ?? '',
  };
}

export function readCost(values: CostValues): Reading<CostBody> {
  const list = new FaultList();
  const every = values.every === 'once' ? null : values.every;
  const on = list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY);
  const until = every === null ? null : list.optional(values.until, parseDay, 'until', NO_DATE);
  if (until !== null && until < on) list.add('until', 'The last day cannot come before the first.');
  return list.reading({
    on,
    kind: values.kind,
    label: list.needed(values.label, (text) => text.trim(), 'label', '', 'cost'),
    amountCents: list.needed(values.amountCents, aboveZero, 'amountCents', 'Write an amount such as 244.93.', cents(1)),
    every,
    until,
    documentId: values.documentId === '' ? null : values.documentId,
  });
}

function aboveZero(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount > 0 ? amount : null;
}

/** The amount with the sign its kind gives it. */
export function signedCents(cost: Pick<CostFacts, 'kind' | 'amountCents'>): Cents {
  return INCOME_KINDS.includes(cost.kind) ? cost.amountCents : negateCents(cost.amountCents);
}

/** "14 June 2025", or how often from then on. */
export function whenWords({ on, every, until }: Pick<CostFacts, 'on' | 'every' | 'until'>): string {
  if (every === null) return fullDate(on);
  const end = until === null ? '' : ` to ${fullDate(until)}`;
  return `every ${every} from ${fullDate(on)}${end}`;
}
