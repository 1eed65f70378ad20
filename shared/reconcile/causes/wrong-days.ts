import { sayCount } from '../../ledger/say.ts';
import { addDays, daysBetween } from '../../units/day.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';

const OFF_BY = [1, -1, 2, -2, 3, -3];

/**
 * What goes by the day is counted for up to three days too many or too few, from either end of the cycle (net-metering.md §4, "days"). The number
 * of days printed may be the right one all the same.
 */
export const wrongDays = hypothesis('wrongDays', editsOf, { days: true });

function editsOf({ cycle: { usage } }: Place): Edit[] {
  const days = daysBetween(usage.from, usage.to);
  return OFF_BY.filter((off) => days + off > 0).flatMap((off) => {
    const words = `It was counted as ${sayCount(days + off, 'day', 'days')}; the cycle has ${days}.`;
    const found = { days: String(days + off), trueDays: String(days) };
    return [
      edit(`to ${off}`, { usage: { ...usage, to: addDays(usage.to, off) } }, words, found),
      edit(`from ${off}`, { usage: { ...usage, from: addDays(usage.from, -off) } }, words, found),
    ];
  });
}
