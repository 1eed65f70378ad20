import { addDays, daysBetween } from '../units/day.ts';
import type { Need } from './need.ts';
import type { NeedsInput } from './needs.ts';
import { sayDate, sayDay, sayMonth } from './say.ts';

/** A statement is asked for from this many days before its usual day, and called late this many after. */
const STATEMENT_EARLY_DAYS = 3;
const STATEMENT_LATE_DAYS = 14;
const USUAL_CYCLE_DAYS = 30;
const USUAL_POST_DAYS = 3;

/** The next statement, from three days before its usual day; called late two weeks after it. */
export function nextStatement({ facts, assembled, today }: NeedsInput): Need[] {
  const last = assembled.at(-1);
  if (!last) {
    if (facts.house.switchOn === null) return [];
    return [
      {
        key: 'first-statement',
        tone: 'note',
        title: 'Log the first statement',
        detail: `The record begins at switch-on, ${sayDate(facts.house.switchOn)}.`,
        link: 'log',
      },
    ];
  }
  const recent = assembled.slice(-5);
  const cycleDays = median(recent.map((one) => one.cycle.days)) ?? USUAL_CYCLE_DAYS;
  const posted = recent.flatMap(({ cycle }) =>
    cycle.statement.statementOn ? [daysBetween(cycle.to, cycle.statement.statementOn)] : [],
  );
  const ends = addDays(last.cycle.to, cycleDays);
  const due = addDays(ends, median(posted) ?? USUAL_POST_DAYS);
  if (today < addDays(due, -STATEMENT_EARLY_DAYS)) return [];
  const late = today > addDays(due, STATEMENT_LATE_DAYS);
  const came = recent.flatMap(({ cycle }) => (cycle.statement.statementOn ? [cycle.statement.statementOn] : []));
  const days = came.map((on) => Number(on.slice(8))).sort((a, b) => a - b);
  const [least] = days;
  const most = days.at(-1);
  const usual =
    least !== undefined && most !== undefined && days.length > 1 && most - least <= 10
      ? least === most
        ? `The last ${days.length} came on the ${ordinal(least)}.`
        : `The last ${days.length} came between the ${ordinal(least)} and the ${ordinal(most)}.`
      : `The last one ended on ${sayDay(last.cycle.to)}.`;
  return [
    {
      key: 'next-statement',
      tone: late ? 'bad' : 'note',
      title: late ? `${sayMonth(ends)} statement is late` : `${sayMonth(ends)} statement is due about now`,
      detail: usual,
      link: 'log',
    },
  ];
}

function median(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? null;
}

function ordinal(count: number): string {
  const tens = count % 100;
  if (tens >= 11 && tens <= 13) return `${count}th`;
  return `${count}${['th', 'st', 'nd', 'rd'][count % 10] ?? 'th'}`;
}
