import type { MortgageScheduleRow, MortgageView } from '#shared/api/money-mortgage.ts';
import { type Day, dayNumber } from '#shared/units/day.ts';

/** A numbered day above the chart. */
export type LtvFlag = { number: number; on: Day; words: string };

/** The days worth a flag, in their order, as far as they are drawn: when the insurance went, and when it could have gone anyway. */
export function ltvFlags(view: MortgageView): LtvFlag[] {
  const last = ltvRows(view).at(-1)?.on ?? view.balanceOn;
  const days: { on: Day | null; words: string }[] = [
    { on: view.facts.insurance?.removedOn ?? null, words: 'insurance gone' },
    ...view.ends.map((end) => ({ on: end.on, words: FLAG_WORDS[end.rule] ?? '' })),
  ];
  return days
    .filter((one): one is { on: Day; words: string } => one.on !== null && one.words !== '' && one.on <= last)
    .sort((a, b) => (a.on < b.on ? -1 : 1))
    .map((one, index) => ({ ...one, number: index + 1 }));
}

const FLAG_WORDS: Partial<Record<MortgageView['ends'][number]['rule'], string>> = {
  request80: '80 %, on request',
  automatic78: '78 %, by itself',
  midpoint: 'middle of the term',
  appreciation: 'value without the roof',
};

/** The months drawn: to two years after the last flag, since nothing of the insurance happens later. */
export function ltvRows(view: MortgageView): MortgageScheduleRow[] {
  const last = view.ends.reduce<Day | null>(
    (latest, { on, rule }) => (on !== null && rule !== 'midpoint' && (latest === null || on > latest) ? on : latest),
    null,
  );
  if (last === null) return view.schedule;
  const until = dayNumber(last) + 730;
  return view.schedule.filter((row) => dayNumber(row.on) <= until);
}
