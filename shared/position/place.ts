import type { CycleKey, Entry, UnplacedEntry } from '../books/book.ts';
import { keptAt } from '../settlement/place.ts';
import type { Day } from '../units/day.ts';

/**
 * What belongs to the cycle that ends on its date: the bill avoided, and the incentive as the cycle earned it or as its bill credited it. All other
 * money falls on its own day.
 */
function closesItsCycle(entry: UnplacedEntry): boolean {
  if (entry.book === 'billAvoided') return true;
  return entry.book === 'incentive' && (entry.kind === 'earned' || entry.kind === 'billCredit');
}

/**
 * Puts each entry in the cycle whose `[from, to)` holds its date (one that closes its cycle: whose `(from, to]` does); before the first and since
 * the last are keys of their own, as is everything while there is no cycle (`before`). A day that no cycle covers, in a gap of the record, falls to the next one.
 * Cycles are in order of their dates; entries come out in order of theirs.
 */
export function placeEntries(entries: readonly UnplacedEntry[], cycles: readonly { from: Day; to: Day }[]): Entry[] {
  return entries.map((entry) => ({ ...entry, cycle: keyFor(entry, cycles) })).sort(byDate);
}

function keyFor(entry: UnplacedEntry, cycles: readonly { from: Day; to: Day }[]): CycleKey {
  const first = cycles[0];
  if (first === undefined) return 'before';
  const closes = closesItsCycle(entry);
  if (entry.date < first.from || (closes && entry.date === first.from)) return 'before';
  let low = 0;
  let high = cycles.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    const to = keptAt(cycles, middle).to;
    if (closes ? to < entry.date : to <= entry.date) low = middle + 1;
    else high = middle;
  }
  return cycles[low]?.to ?? 'since';
}

function byDate(a: Entry, b: Entry): number {
  if (a.date !== b.date) return a.date < b.date ? -1 : 1;
  return a.id < b.id ? -1 : a.id > b.id ? 1 : 0;
}
