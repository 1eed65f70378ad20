import { sayCount, sayDate, sayDay } from '../ledger/say.ts';
import { type Day, daysBetween } from '../units/day.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareText, nothingToCompare } from './make-check.ts';

/** This statement begins on the day the last one ended (net-metering.md §4 "read continuity"). */
export function datesChainCheck({ paper }: CheckContext): Check {
  const title = 'Dates follow on from the last cycle';
  const { previous, statement } = paper;
  if (previous === null) {
    return nothingToCompare('datesChain', '', 'date', {
      title,
      stated: statement.from,
      cause: 'This is the first statement.',
    });
  }
  const difference = String(daysBetween(previous.to, statement.from));
  const sides = { stated: statement.from, found: previous.to, difference, unit: 'date' as const };
  return compareText('datesChain', '', title, sides, () => chainTexts(previous.to, statement.from));
}

function chainTexts(ended: Day, begins: Day): { cause: string; advice: string } {
  const days = daysBetween(ended, begins);
  if (days > 0) {
    return {
      cause: `${sayCount(days, 'day is', 'days are')} on no statement: the last one ended ${sayDate(ended)}, this one begins ${sayDate(begins)}.`,
      advice: 'A statement may be missing. Upload it, or ask the utility for it.',
    };
  }
  return {
    cause: `${sayCount(-days, 'day is', 'days are')} billed twice: the last statement ended ${sayDay(ended)}, this one begins ${sayDay(begins)}.`,
    advice: 'Compare the service dates with both statements, and correct the one that was typed wrong.',
  };
}

/** The printed number of days is `to − from`; whether so many are usual is a check of its own. */
export function daysCheck({ paper }: CheckContext): Check {
  const title = 'Days match the dates';
  const { statement } = paper;
  const days = daysBetween(statement.from, statement.to);
  if (statement.printedDays === null) {
    return nothingToCompare('days', '', 'days', {
      title,
      found: String(days),
      cause: 'The statement prints no number of days.',
    });
  }
  const sides = {
    stated: String(statement.printedDays),
    found: String(days),
    difference: String(statement.printedDays - days),
    unit: 'days' as const,
  };
  return compareText('days', '', title, sides, () => ({
    cause: `The dates make ${days} days; the statement counts ${statement.printedDays}.`,
    advice: 'Charges by the day may be wrong with it. Compare the dates with the meter reads.',
  }));
}
