import type { Day } from '#shared/units/day.ts';
import { yearOf } from '#shared/units/day.ts';
import { dateWords, dayWords } from '#shared/units/words.ts';

/** "14 Aug – 14 Sep 2026", with both years where they differ. */
export function sayCycle({ from, to }: { from: Day; to: Day }): string {
  return `${yearOf(from) === yearOf(to) ? dayWords(from) : dateWords(from)} – ${dateWords(to)}`;
}
