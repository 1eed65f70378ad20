import { keptAt } from '../settlement/place.ts';
import { type Day, dayOfMonth, daysBetween, daysInMonth, monthOf, yearOf } from '../units/day.ts';

/** Wh and days gathered by year of age and calendar month. */
export type Heap = { energy: number; days: number };
export type Heaps = Map<number, Heap[]>;

/** Calendar months, January first. */
export const MONTHS = Array.from({ length: 12 }, (_, index) => index);

/** The days of a span that lie in one calendar month, and how many of its days are done with it. */
export type Segment = { month: number; days: number; done: number };

export function segmentsOf(from: Day, to: Day): Segment[] {
  const days = daysBetween(from, to);
  const segments: Segment[] = [];
  let year = yearOf(from);
  let month = monthOf(from);
  let left = daysInMonth(year, month) - dayOfMonth(from) + 1;
  let done = 0;
  while (done < days) {
    const part = Math.min(left, days - done);
    done += part;
    segments.push({ month: month - 1, days: part, done });
    month = month === 12 ? 1 : month + 1;
    if (month === 1) year += 1;
    left = daysInMonth(year, month);
  }
  return segments;
}

/** Shares a span's energy by days between its calendar months, in whole Wh that add up. */
export function gather(heaps: Heaps, age: number, segments: readonly Segment[], energy: number): void {
  let months = heaps.get(age);
  if (!months) {
    months = MONTHS.map(() => ({ energy: 0, days: 0 }));
    heaps.set(age, months);
  }
  const days = segments.at(-1)?.done ?? 0;
  let given = 0;
  for (const segment of segments) {
    const share = Math.round((energy * segment.done) / days);
    const heap = keptAt(months, segment.month);
    heap.energy += share - given;
    heap.days += segment.days;
    given = share;
  }
}

/** A calendar month over all ages. */
export function monthOfAll(heaps: Heaps, month: number): Heap {
  const total: Heap = { energy: 0, days: 0 };
  for (const months of heaps.values()) {
    const heap = keptAt(months, month);
    total.energy += heap.energy;
    total.days += heap.days;
  }
  return total;
}

/** All months over all ages. */
export function wholeYear(heaps: Heaps): Heap {
  const total: Heap = { energy: 0, days: 0 };
  for (const month of MONTHS) {
    const heap = monthOfAll(heaps, month);
    total.energy += heap.energy;
    total.days += heap.days;
  }
  return total;
}
