import { sayCount, sayDate } from '../../ledger/say.ts';
import { openCycle } from '../../settlement/cycle-flows.ts';
import type { TrueUp } from '../../settlement/plan.ts';
import { preparePlan } from '../../settlement/prepare.ts';
import { isDue } from '../../settlement/true-up.ts';
import { addMonths, dayOf } from '../../units/day.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { withBank } from './plan-edit.ts';

const MONTHS_EARLY = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11];
/** A year without 29 February: a yearly day of it exists in every year. */
const ORDINARY_YEAR = 2025;

/** A bank is trued up one to eleven months before its month or day, or before service ends (net-metering.md §4, "true-up": month = elected). */
export const trueUpEarly = hypothesis('trueUpEarly', editsOf);

/** The least early first: of those that come to the same it is the likeliest. */
function editsOf({ cycle: { plan, usage } }: Place): Edit[] {
  const cycle = openCycle(preparePlan(plan), usage);
  const due = plan.banks.flatMap((bank) =>
    bank.trueUps.flatMap((trueUp, index) =>
      isDue(trueUp.at, cycle)
        ? []
        : earlier(trueUp.at)
            .filter(({ at }) => isDue(at, cycle))
            .map((early) => ({ bank, index, ...early })),
    ),
  );
  due.sort((a, b) => a.months - b.months);
  return due.map(({ bank, index, at, said }) => {
    const trueUps = bank.trueUps.map((one, other) => (other === index ? { ...one, at } : one));
    return edit(
      `${bank.id}:${index}:${said}`,
      { plan: withBank(plan, bank.id, (one) => ({ ...one, trueUps })) },
      `${bank.label} was trued up on ${sayDate(usage.to)}, ${said}.`,
      { bank: bank.id, early: said },
    );
  });
}

type Earlier = { at: TrueUp['at']; months: number; said: string };

/** What is due at every close is never asked: it cannot be early. */
function earlier(at: TrueUp['at']): Earlier[] {
  if (typeof at === 'string') return [{ at: 'everyCycle', months: 0, said: 'before service ended' }];
  return MONTHS_EARLY.map((months) => ({
    at: earlierBy(at, months),
    months,
    said: `${sayCount(months, 'month', 'months')} early`,
  }));
}

function earlierBy(at: { months: number[] } | { date: string }, count: number): TrueUp['at'] {
  if ('months' in at) return { months: at.months.map((month) => ((month + 11 - count) % 12) + 1) };
  const day = dayOf(ORDINARY_YEAR, Number(at.date.slice(0, 2)), Number(at.date.slice(3)));
  return { date: addMonths(day, -count).slice(5) };
}
