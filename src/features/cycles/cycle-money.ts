import { BOOKS, type Entry } from '#shared/books/book.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { type Cents, dollarsText, negateCents, subtractCents } from '#shared/units/cents.ts';
import type { Working } from '#shared/working.ts';
import { dayMonth, kwh } from '#src/lib/format.ts';

export type MoneyLine = {
  key: string;
  label: string;
  title: string;
  cents: Cents;
  working: Working;
  estimated: boolean;
};

/**
 * The lines of "Against the loan", which add up to what the cycle added: the bill avoided as the two bills it is the difference of, then every
 * other entry in the order of the books. `earned` are the memo entries, shown and not summed.
 */
export function cycleMoney(cycle: Cycle): { lines: MoneyLine[]; earned: Entry[] } {
  const counted = cycle.entries.filter((entry) => entry.basis !== 'memo');
  const bills = billLines(cycle, counted);
  const others = counted
    .filter((entry) => !bills.stands.has(entry.id))
    .sort((a, b) => BOOKS.indexOf(a.book) - BOOKS.indexOf(b.book) || (a.date < b.date ? -1 : a.date > b.date ? 1 : 0));
  const several = others.filter((entry) => entry.book === 'loan').length > 1;
  return {
    lines: [
      ...bills.lines,
      ...others.map((entry) => ({
        key: entry.id,
        label: labelOf(entry, several),
        title: labelOf(entry, several),
        cents: entry.amountCents,
        working: entry.working,
        estimated: entry.estimated,
      })),
    ],
    earned: cycle.entries.filter((entry) => entry.basis === 'memo'),
  };
}

/** An entry in words that stand by themselves; a receipt's own label may be only the note on its cheque. */
function labelOf(entry: Entry, several: boolean): string {
  if (entry.book === 'incentive' && !/incentive/i.test(entry.label)) return `Production incentive: ${entry.label}`;
  return several && entry.book === 'loan' ? `${entry.label}, ${dayMonth(entry.date)}` : entry.label;
}

/** The two bills, where their difference is one of the cycle's entries; that entry then stands for itself no more. */
function billLines(cycle: Cycle, counted: readonly Entry[]): { lines: MoneyLine[]; stands: Set<string> } {
  const { withoutRoof, asItWas } = cycle;
  if (!withoutRoof) return { lines: [], stands: new Set() };
  const difference = subtractCents(withoutRoof.amountCents, asItWas.amountCents);
  const entry = counted.find((one) => one.book === 'billAvoided' && one.amountCents === difference);
  if (!entry) return { lines: [], stands: new Set() };
  const same = withoutRoof.method === 'measured' ? 'same ' : '';
  return {
    stands: new Set([entry.id]),
    lines: [
      {
        key: 'without',
        label: `Bill without the roof, ${same}${kwh(withoutRoof.useWh)} kWh`,
        title: 'Bill without the roof',
        cents: withoutRoof.amountCents,
        working: withoutRoof.working,
        estimated: withoutRoof.method !== 'measured' || entry.estimated,
      },
      {
        key: 'asItWas',
        label: 'Bill as it was',
        title: 'Bill as it was, taken off',
        cents: negateCents(asItWas.amountCents),
        working: negated(asItWas.working, asItWas.amountCents),
        estimated: false,
      },
    ],
  };
}

/** The same working with its sign turned, since the bill is taken off. */
function negated(working: Working, amount: Cents): Working {
  return amount === 0 ? working : { ...working, formula: `-(${working.formula})` };
}

/** The working of what a cycle added: its counted entries, summed. */
export function addedWorking(cycle: Cycle): Working {
  const counted = cycle.entries.filter((entry) => entry.basis !== 'memo');
  return {
    words: 'Everything kept or received in this cycle, less everything paid.',
    formula: 'sum(entries)',
    inputs: [
      {
        name: 'entries',
        label: counted.length > 0 ? counted.map((entry) => entry.label).join(', ') : 'No entry falls in this cycle',
        value: counted.length > 0 ? counted.map((entry) => dollarsText(entry.amountCents)) : ['0.00'],
        unit: 'USD',
        source: { kind: 'figure', name: 'the entries of this cycle' },
      },
    ],
    unit: 'USD',
    basis: counted.some((entry) => entry.estimated) ? 'estimated' : 'computed',
  };
}
